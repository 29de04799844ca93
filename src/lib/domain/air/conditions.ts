/** From a reading as it was entered to the conditions the model and the screens use. Derived on the fly, never stored as truth. */

import { given, isFiniteNumber, type Maybe } from '../given';
import type { Conditions } from '../types';
import { airIndex } from './air-index';
import { airDensityKgM3 } from './density';
import {
  dewPointC,
  grainsPerLb,
  humidityFromDewPoint,
  humidityFromWetBulb,
  humidityRatio,
  vapourPressurePa,
  wetBulbC,
} from './humidity';
import { type PressureKind, stationPressureOf } from './pressure';
import { densityAltitudeM, pressureAltitudeM, relativeDensityIsa } from './standard-atmosphere';

export { sunElevationDeg } from './sun';

/** A reading as entered, SI. Null is "not measured". One of the three humidities, or none. */
export interface RawReading {
  airTempC: number | null;
  /** Fraction 0-1. */
  relativeHumidity: number | null;
  dewPointC: number | null;
  wetBulbC: number | null;
  pressurePa: number | null;
  pressureKind: PressureKind | null;
  /** Altitude of the track; needed for an altimeter setting. */
  altitudeM: number | null;
  trackTempC: number | null;
}

/**
 * Conditions of a reading: an altimeter setting becomes station pressure, a dew point or wet bulb becomes relative humidity. What cannot be
 * derived is null. Should more than one humidity be given, the first of relative humidity, dew point, wet bulb is used.
 */
export function conditionsFromReading(reading: RawReading): Conditions {
  const stationPressurePa = stationPressureOf(reading.pressurePa, reading.pressureKind, reading.altitudeM);
  return {
    airTempC: finiteOrNull(reading.airTempC),
    relativeHumidity: relativeHumidityOf(reading, stationPressurePa),
    stationPressurePa,
    trackTempC: finiteOrNull(reading.trackTempC),
  };
}

const finiteOrNull = (value: Maybe): number | null => (isFiniteNumber(value) ? value : null);

function relativeHumidityOf(reading: RawReading, stationPressurePa: number | null): number | null {
  const { airTempC, relativeHumidity, dewPointC: dewPoint, wetBulbC: wetBulb } = reading;
  if (relativeHumidity !== null) return given([relativeHumidity], (rh) => (rh >= 0 && rh <= 1 ? rh : null));
  if (dewPoint !== null) return humidityFromDewPoint(airTempC, dewPoint);
  return humidityFromWetBulb(airTempC, wetBulb, stationPressurePa);
}

/** Everything the screens show about the air; each is null when the conditions do not give it. */
export interface AirSummary {
  vapourPressurePa: number | null;
  densityKgM3: number | null;
  densityAltitudeM: number | null;
  pressureAltitudeM: number | null;
  grainsPerLb: number | null;
  dewPointC: number | null;
  wetBulbC: number | null;
  /** kg of water per kg of dry air. */
  humidityRatio: number | null;
  /** SAE J1349 factor as an index of the air; above 1 is poorer air. Never a power prediction. */
  airIndex: number | null;
  /** Density over 1.225 kg/m3 (standard atmosphere at sea level). */
  relativeDensity: number | null;
}

/** The derived numbers of the air, SI unless a name says otherwise. */
export function airSummary(conditions: Conditions): AirSummary {
  const { airTempC, relativeHumidity, stationPressurePa } = conditions;
  const vapourPa = vapourPressurePa(airTempC, relativeHumidity);
  const density = airDensityKgM3(airTempC, stationPressurePa, relativeHumidity);
  return {
    vapourPressurePa: vapourPa,
    densityKgM3: density,
    densityAltitudeM: densityAltitudeM(density),
    pressureAltitudeM: pressureAltitudeM(stationPressurePa),
    grainsPerLb: grainsPerLb(vapourPa, stationPressurePa),
    dewPointC: dewPointC(airTempC, relativeHumidity),
    wetBulbC: wetBulbC(airTempC, relativeHumidity, stationPressurePa),
    humidityRatio: humidityRatio(vapourPa, stationPressurePa),
    airIndex: airIndex(airTempC, dryPressurePa(vapourPa, stationPressurePa)),
    relativeDensity: relativeDensityIsa(density),
  };
}

const dryPressurePa = (vapourPa: Maybe, stationPa: Maybe): number | null =>
  given([vapourPa, stationPa], (e, p) => p - e);
