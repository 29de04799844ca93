/** Where the sun stands. The one place that knows suncalc 2: degrees, azimuth clockwise from north, altitude with refraction. */
import { getPosition } from 'suncalc';
import { isFiniteNumber, type Maybe } from '../given';
import { parseInstant } from './instant';

export interface SunPosition {
  /** Apparent (refracted) elevation above the horizon, degrees; negative at night. */
  elevationDeg: number;
  /** Degrees clockwise from north. */
  azimuthDeg: number;
}

/** Position of the sun at a UTC instant (ISO 8601 with offset) and place. Null when either is missing or impossible. */
export function sunPosition(
  time: string | null | undefined,
  latitudeDeg: Maybe,
  longitudeDeg: Maybe,
): SunPosition | null {
  if (!isLatitude(latitudeDeg) || !isLongitude(longitudeDeg)) return null;
  const date = parseInstant(time);
  if (!date) return null;
  const { altitude, azimuth } = getPosition(date, latitudeDeg, longitudeDeg);
  return isFiniteNumber(altitude) && isFiniteNumber(azimuth) ? { elevationDeg: altitude, azimuthDeg: azimuth } : null;
}

const isLatitude = (deg: Maybe): deg is number => isFiniteNumber(deg) && Math.abs(deg) <= 90;
const isLongitude = (deg: Maybe): deg is number => isFiniteNumber(deg) && Math.abs(deg) <= 180;

/** Elevation of the sun, degrees, refraction included. */
export function sunElevationDeg(
  time: string | null | undefined,
  latitudeDeg: Maybe,
  longitudeDeg: Maybe,
): number | null {
  return sunPosition(time, latitudeDeg, longitudeDeg)?.elevationDeg ?? null;
}

/** Bearing of the sun, degrees clockwise from north. */
export function sunAzimuthDeg(time: string | null | undefined, latitudeDeg: Maybe, longitudeDeg: Maybe): number | null {
  return sunPosition(time, latitudeDeg, longitudeDeg)?.azimuthDeg ?? null;
}
