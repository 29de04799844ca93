/**
 * International standard atmosphere, 0-11 km layer: ISO 2533:1975 / ICAO Doc 7488 / U.S. Standard Atmosphere 1976. Altitudes are
 * geopotential; taking a geometric altitude for one changes pressure by less than 0.003 % per km below 3 km.
 */
import { given, type Maybe } from '../given';

export const ISA = {
  seaLevelTempK: 288.15,
  seaLevelPressurePa: 101_325,
  lapseKPerM: 0.0065,
  gravityMps2: 9.80665,
  gasConstantDryAir: 287.05287,
} as const;

export const ISA_PRESSURE_EXPONENT = ISA.gravityMps2 / (ISA.gasConstantDryAir * ISA.lapseKPerM);
export const ISA_DENSITY_EXPONENT = ISA_PRESSURE_EXPONENT - 1;
export const ISA_SEA_LEVEL_DENSITY = ISA.seaLevelPressurePa / (ISA.gasConstantDryAir * ISA.seaLevelTempK);

const ZERO_TEMP_ALTITUDE_M = ISA.seaLevelTempK / ISA.lapseKPerM;
const TROPOPAUSE_M = 11_000;
const LOWEST_M = -5000;

/** Standard temperature, K, at an altitude. Null outside -5000..11000 m. */
export function isaTempK(altitudeM: Maybe): number | null {
  return given([altitudeM], (h) => (h < LOWEST_M || h > TROPOPAUSE_M ? null : ISA.seaLevelTempK - ISA.lapseKPerM * h));
}

/** Standard pressure, Pa, at an altitude. */
export function isaPressurePa(altitudeM: Maybe): number | null {
  return given([isaTempK(altitudeM)], (k) => ISA.seaLevelPressurePa * (k / ISA.seaLevelTempK) ** ISA_PRESSURE_EXPONENT);
}

/** Standard density, kg/m3, at an altitude. */
export function isaDensityKgM3(altitudeM: Maybe): number | null {
  return given([isaTempK(altitudeM)], (k) => ISA_SEA_LEVEL_DENSITY * (k / ISA.seaLevelTempK) ** ISA_DENSITY_EXPONENT);
}

/** Altitude, m, at which the standard atmosphere has this density. */
export function densityAltitudeM(densityKgM3: Maybe): number | null {
  return given([densityKgM3], (rho) => altitudeOfRatio(rho / ISA_SEA_LEVEL_DENSITY, ISA_DENSITY_EXPONENT));
}

/** Altitude, m, at which the standard atmosphere has this station pressure. */
export function pressureAltitudeM(stationPressurePa: Maybe): number | null {
  return given([stationPressurePa], (p) => altitudeOfRatio(p / ISA.seaLevelPressurePa, ISA_PRESSURE_EXPONENT));
}

function altitudeOfRatio(ratio: number, exponent: number): number | null {
  return ratio > 0 ? ZERO_TEMP_ALTITUDE_M * (1 - ratio ** (1 / exponent)) : null;
}

/** Density relative to the standard atmosphere at sea level (1.225 kg/m3): name the reference wherever it is shown. */
export function relativeDensityIsa(densityKgM3: Maybe): number | null {
  return given([densityKgM3], (rho) => (rho > 0 ? rho / ISA_SEA_LEVEL_DENSITY : null));
}
