/**
 * Density of moist air by CIPM-2007: A. Picard, R. S. Davis, M. Glaeser, K. Fujii, Metrologia 45 (2008) 149-155, equations (1)-(3) and
 * Appendix A. Stated range 600-1100 hPa and 15-27 degC; outside those temperatures it is an extrapolation that stays within 0.06 % of an
 * ideal-gas mixture over 5-42 degC (tests/unit/air/density.test.ts).
 */

import { given, type Maybe } from '../given';
import { ZERO_C_IN_K } from '../units';

/** As printed, for the reference 400 micromol/mol of CO2; 100 micromol/mol more would raise density by 0.004 %. */
export const CIPM_2007 = {
  A: 1.2378847e-5,
  B: -1.9121316e-2,
  C: 33.93711047,
  D: -6.3431645e3,
  alpha: 1.00062,
  beta: 3.14e-8,
  gamma: 5.6e-7,
  a0: 1.58123e-6,
  a1: -2.9331e-8,
  a2: 1.1043e-10,
  b0: 5.707e-6,
  b1: -2.051e-8,
  c0: 1.9898e-4,
  c1: -2.376e-6,
  d: 1.83e-11,
  e: -7.65e-9,
  /** Ma/R at that xCO2, kg K/J, and 1 - Mv/Ma: rounded as in the printed working equation, 1e-6 of density from the unrounded. */
  maOverR: 3.48374e-3,
  oneMinusMvOverMa: 0.378,
} as const;

/** Mole fraction of water, compressibility and what they are made of: the intermediate results of CIPM-2007. */
export interface CipmParts {
  saturationPa: number;
  enhancement: number;
  moleFraction: number;
  compressibility: number;
}

/** Unguarded: `pressurePa` must be above zero. */
export function cipmParts(tempC: number, pressurePa: number, relativeHumidity: number): CipmParts {
  const { A, B, C, D, alpha, beta, gamma } = CIPM_2007;
  const k = tempC + ZERO_C_IN_K;
  const saturationPa = Math.exp(A * k * k + B * k + C + D / k);
  const enhancement = alpha + beta * pressurePa + gamma * tempC * tempC;
  const moleFraction = (relativeHumidity * enhancement * saturationPa) / pressurePa;
  return { saturationPa, enhancement, moleFraction, compressibility: compressibility(tempC, pressurePa, moleFraction) };
}

function compressibility(tempC: number, pressurePa: number, x: number): number {
  const { a0, a1, a2, b0, b1, c0, c1, d, e } = CIPM_2007;
  const pOverT = pressurePa / (tempC + ZERO_C_IN_K);
  const first = a0 + a1 * tempC + a2 * tempC * tempC + (b0 + b1 * tempC) * x + (c0 + c1 * tempC) * x * x;
  return 1 - pOverT * first + pOverT * pOverT * (d + e * x * x);
}

/**
 * Density of moist air, kg/m3, from air temperature, STATION pressure (never an altimeter setting) and relative humidity (0-1).
 * Null when an input is missing, the pressure is not above the vapour pressure or the humidity is outside 0-1.
 */
export function airDensityKgM3(tempC: Maybe, stationPressurePa: Maybe, relativeHumidity: Maybe): number | null {
  return given([tempC, stationPressurePa, relativeHumidity], (t, p, rh) => {
    if (p <= 0 || rh < 0 || rh > 1 || t <= -ZERO_C_IN_K) return null;
    const { moleFraction: x, compressibility: z } = cipmParts(t, p, rh);
    if (x >= 1) return null;
    const { maOverR, oneMinusMvOverMa } = CIPM_2007;
    return ((p * maOverR) / (z * (t + ZERO_C_IN_K))) * (1 - x * oneMinusMvOverMa);
  });
}
