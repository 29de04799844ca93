/**
 * Humidity. Relative humidity is a fraction of saturation over water (WMO-No. 8). The wet bulb is the thermodynamic one: ASHRAE Handbook -
 * Fundamentals (2017), chapter 1, equations (33) and (35); a ventilated psychrometer reads within about 1 % RH of it.
 */

import { given, type Maybe, rootOfIncreasing } from '../given';
import { humidityRatioToGrains } from '../units';
import { overWaterPa, saturationOverWaterPa, saturationPa } from './saturation';

/** Ratio of the molar masses of water and dry air: ASHRAE 2017 chapter 1, equation (20). */
const MOLAR_MASS_RATIO = 0.621945;
const LOWEST_DEW_POINT_C = -95;
const LOWEST_WET_BULB_C = -95;

const isFraction = (rh: number): boolean => rh >= 0 && rh <= 1;

/** Partial pressure of water vapour, Pa. Null when the humidity is outside 0-1. */
export function vapourPressurePa(tempC: Maybe, relativeHumidity: Maybe): number | null {
  return given([saturationOverWaterPa(tempC), relativeHumidity], (es, rh) => (isFraction(rh) ? rh * es : null));
}

/** Dew point, degC, of a vapour pressure. Null for dry air, which has none. */
export function dewPointOfVapourC(vapourPa: Maybe): number | null {
  return given([vapourPa], (e) => {
    if (e < overWaterPa(LOWEST_DEW_POINT_C) || e > overWaterPa(200)) return null;
    return rootOfIncreasing((t) => overWaterPa(t) - e, LOWEST_DEW_POINT_C, 200);
  });
}

/** Dew point, degC, from air temperature and relative humidity. */
export function dewPointC(tempC: Maybe, relativeHumidity: Maybe): number | null {
  return dewPointOfVapourC(vapourPressurePa(tempC, relativeHumidity));
}

/** Relative humidity (0-1) from air temperature and dew point. Null when the dew point is above the air temperature. */
export function humidityFromDewPoint(tempC: Maybe, dewPoint: Maybe): number | null {
  return given([saturationOverWaterPa(tempC), saturationOverWaterPa(dewPoint)], (es, e) => (e <= es ? e / es : null));
}

/** Humidity ratio, kg of water per kg of DRY air. Null when the vapour pressure is not below the station pressure. */
export function humidityRatio(vapourPa: Maybe, stationPressurePa: Maybe): number | null {
  return given([vapourPa, stationPressurePa], (e, p) => (e >= 0 && e < p ? (MOLAR_MASS_RATIO * e) / (p - e) : null));
}

/** Grains of water per pound of dry air. */
export function grainsPerLb(vapourPa: Maybe, stationPressurePa: Maybe): number | null {
  return given([humidityRatio(vapourPa, stationPressurePa)], humidityRatioToGrains);
}

/** Vapour pressure, Pa, of a humidity ratio. */
export function vapourPressureOfRatioPa(ratio: Maybe, stationPressurePa: Maybe): number | null {
  return given([ratio, stationPressurePa], (w, p) => (w >= 0 && p > 0 ? (p * w) / (MOLAR_MASS_RATIO + w) : null));
}

/** Humidity ratio from air temperature and wet bulb. Null when no air could show that pair at that pressure. */
export function humidityRatioFromWetBulb(tempC: Maybe, wetBulb: Maybe, stationPressurePa: Maybe): number | null {
  return given([tempC, wetBulb, stationPressurePa], (t, tw, p) => {
    if (tw > t || tw < LOWEST_WET_BULB_C || saturationPa(tw) >= p) return null;
    const ratio = ratioAtWetBulb(t, tw, p);
    return ratio >= 0 ? ratio : null;
  });
}

// Equation (33) for a wet bulb above freezing, (35) for one covered with ice. Specific heats in kJ/(kg K), as printed.
function ratioAtWetBulb(t: number, tw: number, p: number): number {
  const es = saturationPa(tw);
  const saturated = (MOLAR_MASS_RATIO * es) / (p - es);
  if (tw >= 0) return ((2501 - 2.326 * tw) * saturated - 1.006 * (t - tw)) / (2501 + 1.86 * t - 4.186 * tw);
  return ((2830 - 0.24 * tw) * saturated - 1.006 * (t - tw)) / (2830 + 1.86 * t - 2.1 * tw);
}

/** Relative humidity (0-1) from air temperature, wet bulb and station pressure. Null when the three cannot occur together. */
export function humidityFromWetBulb(tempC: Maybe, wetBulb: Maybe, stationPressurePa: Maybe): number | null {
  const vapourPa = vapourPressureOfRatioPa(
    humidityRatioFromWetBulb(tempC, wetBulb, stationPressurePa),
    stationPressurePa,
  );
  // Rounding alone can carry saturated air (wet bulb equal to air temperature) a hair above 1.
  return given([vapourPa, saturationOverWaterPa(tempC)], (e, es) => Math.min(1, e / es));
}

/** Thermodynamic wet bulb, degC, from air temperature, relative humidity and station pressure. */
export function wetBulbC(tempC: Maybe, relativeHumidity: Maybe, stationPressurePa: Maybe): number | null {
  const ratio = humidityRatio(vapourPressurePa(tempC, relativeHumidity), stationPressurePa);
  return given([tempC, ratio, stationPressurePa], (t, w, p) =>
    saturationPa(t) < p ? rootOfIncreasing((tw) => ratioAtWetBulb(t, tw, p) - w, LOWEST_WET_BULB_C, t) : null,
  );
}
