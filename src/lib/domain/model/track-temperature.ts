import { minutesBetween, parseInstant } from '../air/instant';
import { sunElevationDeg } from '../air/sun';
import { MS_PER_HOUR, type Place, sunDrive } from './sun-drive';
import { type DrivenPoint, type DrivenReading, foretell, type SunDrivenPriors } from './sun-driven';

/** A reading as this forecast needs it. */
export interface TrackReading extends Place {
  track: string;
  /** UTC, ISO 8601. */
  time: string;
  airTempC: number | null;
  trackTempC: number | null;
  /** Fraction 0-1. */
  cloud: number | null;
}

export interface TrackTempQuestion extends Place {
  track: string;
  /** When the run is planned: UTC, ISO 8601. */
  time: string;
  /** Fraction 0-1; null: as in the latest reading of the day, or not known. */
  cloud: number | null;
}

/** What a reading taken at the planned time would show: normal, degC. */
export interface TrackTempForecast {
  meanC: number;
  /** One sd, the scatter of a single reading included. */
  sdC: number;
  airMeanC: number;
  airSdC: number;
  sunElevationDeg: number;
  /** Hours from the latest track temperature read here, if one was read within a day. */
  leadHours: number | null;
  /** The reading the forecast starts from; null: nothing read here within a day. */
  latest: TrackReading | null;
  readingsUsed: number;
}

/**
 * Track above air temperature. Assumptions of ours, loose on purpose, no published source: a dark strip stands about 22 degC above
 * the air under full overhead sun and close to it at night, warms within the hour, and a day's departure fades over about 5 hours.
 */
export const TRACK_ABOVE_AIR: SunDrivenPriors & { hoursToWarm: number } = {
  offset: 1,
  offsetSd: 3,
  gain: 22,
  gainSd: 8,
  trackGainSd: 4,
  driftSd: 4,
  driftHours: 5,
  readingSd: 1.5,
  hoursToWarm: 1,
};

/**
 * Air temperature, assumptions likewise: the sun of the last hours lifts it, by some 12 degC on a clear day, and weather changes over
 * days. A lag of 4 hours puts the warmest air 2 hours after noon, as measured by Parton & Logan, Agricultural Meteorology 23 (1981)
 * 205-216 (1.9 h) and Wann et al., Agricultural and Forest Meteorology 34 (1985) 121-128 (2.6 h).
 */
export const AIR: SunDrivenPriors & { hoursToWarm: number } = {
  offset: 13,
  offsetSd: 8,
  gain: 17,
  gainSd: 6,
  trackGainSd: 0,
  driftSd: 8,
  driftHours: 60,
  readingSd: 0.6,
  hoursToWarm: 4,
};

/** The newest readings say all there is to say; more would only cost time. */
const MOST_READINGS = 80;
const SAME_DAY_HOURS = 18;

/**
 * Track temperature at the planned time of a run: the air temperature expected then plus how far the track stands above the air, both
 * from the team's own readings up to that time and where the sun stands. Without readings the assumptions alone answer, widely.
 * Null when the place or the time is not known.
 */
export function trackTempAt(question: TrackTempQuestion, readings: readonly TrackReading[]): TrackTempForecast | null {
  const sun = sunElevationDeg(question.time, question.latitudeDeg, question.longitudeDeg);
  if (sun === null) return null;
  const past = newest(readings, question.time);
  const latest = latestHere(past, question);
  const sky = { ...question, cloud: question.cloud ?? latest?.cloud ?? null };
  const above = driven(sky, past, TRACK_ABOVE_AIR, aboveAir);
  const air = driven(sky, past, AIR, (r) => r.airTempC);
  return {
    meanC: air.meanC + above.meanC,
    sdC: Math.hypot(air.sdC, above.sdC),
    airMeanC: air.meanC,
    airSdC: air.sdC,
    sunElevationDeg: sun,
    leadHours: latest ? minutesBetween(latest.time, question.time)! / 60 : null,
    latest,
    readingsUsed: above.used,
  };
}

const aboveAir = (r: TrackReading): number | null =>
  r.trackTempC === null || r.airTempC === null ? null : r.trackTempC - r.airTempC;

const instant = (time: string): number => parseInstant(time)?.getTime() ?? Number.NaN;

function newest(readings: readonly TrackReading[], time: string): TrackReading[] {
  return readings
    .filter((r) => instant(r.time) <= instant(time))
    .sort((a, b) => instant(a.time) - instant(b.time))
    .slice(-MOST_READINGS);
}

function latestHere(past: readonly TrackReading[], { track, time }: TrackTempQuestion): TrackReading | null {
  const recent = (r: TrackReading): boolean => minutesBetween(r.time, time)! <= SAME_DAY_HOURS * 60;
  return past.findLast((r) => r.track === track && r.trackTempC !== null && recent(r)) ?? null;
}

function driven(
  at: TrackTempQuestion,
  past: readonly TrackReading[],
  priors: SunDrivenPriors & { hoursToWarm: number },
  read: (r: TrackReading) => number | null,
): { meanC: number; sdC: number; used: number } {
  const known = past.flatMap((r): DrivenReading[] => {
    const value = read(r);
    const point = value === null ? null : pointOf(r, priors.hoursToWarm);
    return value === null || !point ? [] : [{ ...point, valueC: value }];
  });
  return { ...foretell(known, pointOf(at, priors.hoursToWarm)!, priors), used: known.length };
}

function pointOf(r: TrackTempQuestion, hoursToWarm: number): DrivenPoint | null {
  const drive = sunDrive(r.time, r, r.cloud, hoursToWarm);
  return drive && { track: r.track, hours: instant(r.time) / MS_PER_HOUR, drive };
}
