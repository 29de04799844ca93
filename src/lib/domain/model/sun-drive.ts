import { parseInstant } from '../air/instant';
import { sunElevationDeg } from '../air/sun';

export interface Place {
  latitudeDeg: number | null;
  longitudeDeg: number | null;
}

/**
 * Share of clear-sky sun that reaches the ground under a cloud cover of 0-1.
 * Source: F. Kasten, G. Czeplak, Solar Energy 24 (1980) 177-189, G / G0 = 1 - 0.75 N^3.4.
 */
export const clearShare = (cloud: number): number => 1 - 0.75 * Math.min(1, Math.max(0, cloud)) ** 3.4;

/** Mean and sd of `clearShare` when any cloud cover is as likely as any other: 1 - 0.75 / 4.4, and 0.75 sqrt(1/7.8 - 1/4.4^2). */
export const UNKNOWN_SKY = { mean: 1 - 0.75 / 4.4, sd: 0.75 * Math.sqrt(1 / 7.8 - 1 / 4.4 ** 2) } as const;

/** How hard the sun drives a temperature at a moment: 0 at night, 1 under a sun that stands overhead in a clear sky. */
export interface SunDrive {
  /** Expected drive, and its sd where the cloud is not known. */
  mean: number;
  sd: number;
}

/** The hours before are looked at in steps of half a time constant; sun older than four of them (under 2 % of the weight) is left out. */
const STEPS = 8;
const STEP = 0.5;

/**
 * The sine of the sun's elevation, averaged over the hours before with weights that fall off with the time constant (ground and
 * air warm up late), times what the cloud lets through. Null when the time or the place is missing or impossible.
 */
export function sunDrive(time: string, place: Place, cloud: number | null, hoursToWarm: number): SunDrive | null {
  const end = parseInstant(time);
  if (!end || sunElevationDeg(time, place.latitudeDeg, place.longitudeDeg) === null) return null;
  let weights = 0;
  let sum = 0;
  for (let k = 0; k <= STEPS; k++) {
    const weight = Math.exp(-k * STEP);
    const earlier = end.getTime() - k * STEP * hoursToWarm * MS_PER_HOUR;
    weights += weight;
    sum += weight * sineOfSun(new Date(earlier).toISOString(), place);
  }
  const clear = sum / weights;
  return cloud === null
    ? { mean: clear * UNKNOWN_SKY.mean, sd: clear * UNKNOWN_SKY.sd }
    : { mean: clear * clearShare(cloud), sd: 0 };
}

export const MS_PER_HOUR = 3_600_000;

function sineOfSun(time: string, { latitudeDeg, longitudeDeg }: Place): number {
  const elevation = sunElevationDeg(time, latitudeDeg, longitudeDeg) ?? 0;
  return Math.max(0, Math.sin((elevation * Math.PI) / 180));
}
