/**
 * Limits of a reading, in one place: forms and checks import them. SI. The hard limits lie just outside what has been measured on earth at
 * places people race; the usual ones are judgment (common practice, no published source) and only ever raise a question.
 */
export interface Limit {
  low: number;
  high: number;
}

/** Outside these a reading is refused. */
export const HARD_LIMITS = {
  airTempC: { low: -40, high: 60 },
  trackTempC: { low: -40, high: 95 },
  /** Fraction. */
  relativeHumidity: { low: 0, high: 1 },
  dewPointC: { low: -60, high: 40 },
  wetBulbC: { low: -40, high: 45 },
  stationPressurePa: { low: 60_000, high: 108_500 },
  altimeterPa: { low: 90_000, high: 108_500 },
  altitudeM: { low: -450, high: 4500 },
  latitudeDeg: { low: -90, high: 90 },
  longitudeDeg: { low: -180, high: 180 },
  windMps: { low: 0, high: 60 },
  windDirDeg: { low: 0, high: 360 },
  cloudPct: { low: 0, high: 100 },
} as const satisfies Record<string, Limit>;

/** Outside these a reading is questioned. */
export const USUAL_LIMITS = {
  airTempC: { low: 5, high: 46 },
  trackTempC: { low: 5, high: 70 },
  /** Fraction. */
  relativeHumidity: { low: 0.03, high: 1 },
  dewPointC: { low: -25, high: 29 },
  wetBulbC: { low: -10, high: 31 },
  /** Altimeter settings seen at events. */
  altimeterPa: { low: 97_500, high: 105_000 },
} as const satisfies Record<string, Limit>;

/** A humidity this low (1 %) is more likely a fraction typed as percent. */
export const FRACTION_AS_PERCENT_MAX = 0.01;

/** Below this altitude, m, station pressure and altimeter setting are too alike to tell apart. */
export const KIND_TELLS_FROM_M = 150;

/** A station pressure within this of 1013.25 hPa at a track above that altitude is taken for sea-level corrected, Pa. */
export const SEA_LEVEL_NEAR_PA = 300;

/** How far, Pa, an altimeter setting usually strays from 1013.25 hPa when cars can race. */
export const ALTIMETER_SPREAD_PA = 1700;

/** Track against air temperature, degC. */
export const TRACK_AGAINST_AIR = { sunnyBelowC: 6, anyTimeBelowC: 15, aboveC: 40, highSunDeg: 20 } as const;

/** Changes that are unlikely between two readings this close in time. */
export const JUMP = {
  withinMinutes: 90,
  airTempC: 8,
  trackTempC: 20,
  relativeHumidity: 0.3,
  stationPressurePa: 400,
} as const;

/** Altitude of a reading against that of the track, m. */
export const ALTITUDE_MISMATCH_M = 60;

/** Two humidities of one reading may differ by this much (fraction) before they are said to disagree. */
export const HUMIDITY_DISAGREES = 0.05;
