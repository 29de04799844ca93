/**
 * Saturation vapour pressure of Hyland and Wexler (1983), ASHRAE Trans. 89(2A) 500-519, as equations (5) and (6) of ASHRAE
 * Handbook - Fundamentals (2017), chapter 1. Relative humidity and dew point are over WATER at every temperature, also below
 * 0 degC, as WMO-No. 8 defines them and hygrometers report them; ice counts only for a frozen wet bulb.
 */

import { given, type Maybe } from '../given';
import { ZERO_C_IN_K } from '../units';

const LOWEST_C = -100; // stated range of equation (5), over ice
const HIGHEST_C = 200; // stated range of equation (6), over water

/** Pressure of saturated vapour over water, Pa. Below 0 degC: supercooled water, an extrapolation. Null outside -100..200 degC. */
export function saturationOverWaterPa(tempC: Maybe): number | null {
  return given([tempC], (t) => (inRange(t) ? overWaterPa(t) : null));
}

/** Pressure of saturated vapour, Pa: over ice below 0 degC, over water from 0 degC on. Null outside -100..200 degC. */
export function saturationVapourPressurePa(tempC: Maybe): number | null {
  return given([tempC], (t) => (inRange(t) ? saturationPa(t) : null));
}

const inRange = (t: number): boolean => t >= LOWEST_C && t <= HIGHEST_C;

/** Unguarded form for use inside this folder; `tempC` must be within the stated range. */
export const saturationPa = (tempC: number): number => (tempC < 0 ? overIcePa(tempC) : overWaterPa(tempC));

/** Unguarded form for use inside this folder; `tempC` must be within the stated range. */
export function overWaterPa(tempC: number): number {
  const k = tempC + ZERO_C_IN_K;
  const polynomial = 1.3914993 + k * (-4.8640239e-2 + k * (4.1764768e-5 - k * 1.4452093e-8));
  return Math.exp(-5.8002206e3 / k + polynomial + 6.5459673 * Math.log(k));
}

function overIcePa(tempC: number): number {
  const k = tempC + ZERO_C_IN_K;
  const polynomial = 6.3925247 + k * (-9.677843e-3 + k * (6.2215701e-7 + k * (2.0747825e-9 - k * 9.484024e-13)));
  return Math.exp(-5.6745359e3 / k + polynomial + 4.1635019 * Math.log(k));
}
