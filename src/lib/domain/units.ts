/**
 * Unit factors and conversions. Stored values are SI (degC, Pa, m, m/s, s, kg); these functions are used at the edges only.
 * Source of every factor: A. Thompson, B. N. Taylor, NIST Special Publication 811 (2008), Appendix B.8.
 */

/** Conventional inch of mercury (32 degF), Pa. The 60 degF inch (3376.85 Pa) is 0.28 % smaller and is not used. */
export const PA_PER_INHG = 3386.389;
export const PA_PER_HPA = 100;
export const PA_PER_KPA = 1000;
export const PA_PER_PSI = 6894.757;
export const KG_M3_PER_LB_FT3 = 16.01846;
export const KG_PER_LB = 0.45359237;
export const M_PER_FT = 0.3048;
export const M_PER_IN = 0.0254;
export const MPS_PER_MPH = 0.44704;
export const MPS_PER_KMH = 1 / 3.6;
/** 7000 grains are one pound (NIST Handbook 44, Appendix C). */
export const GRAINS_PER_LB = 7000;
export const ZERO_C_IN_K = 273.15;

export const fToC = (f: number): number => ((f - 32) * 5) / 9;
export const cToF = (c: number): number => (c * 9) / 5 + 32;
/** A temperature DIFFERENCE, degF to degC: no offset. */
export const fDeltaToC = (f: number): number => (f * 5) / 9;
export const cDeltaToF = (c: number): number => (c * 9) / 5;
export const inHgToPa = (inHg: number): number => inHg * PA_PER_INHG;
export const paToInHg = (pa: number): number => pa / PA_PER_INHG;
export const hPaToPa = (hPa: number): number => hPa * PA_PER_HPA;
export const paToHPa = (pa: number): number => pa / PA_PER_HPA;
export const kPaToPa = (kPa: number): number => kPa * PA_PER_KPA;
export const ftToM = (ft: number): number => ft * M_PER_FT;
export const mToFt = (m: number): number => m / M_PER_FT;
export const mphToMps = (mph: number): number => mph * MPS_PER_MPH;
export const mpsToMph = (mps: number): number => mps / MPS_PER_MPH;
export const kmhToMps = (kmh: number): number => kmh * MPS_PER_KMH;
export const mpsToKmh = (mps: number): number => mps / MPS_PER_KMH;
export const kgM3ToLbFt3 = (rho: number): number => rho / KG_M3_PER_LB_FT3;
export const lbFt3ToKgM3 = (rho: number): number => rho * KG_M3_PER_LB_FT3;
/** Humidity ratio, kg water per kg dry air, to grains per pound of dry air. */
export const humidityRatioToGrains = (w: number): number => w * GRAINS_PER_LB;
