import { describe, expect, test } from 'vitest';
import { sunAzimuthDeg, sunElevationDeg, sunPosition } from '@/lib/domain/air/sun';
import { type CheckEntry, checkEntries } from '../../helpers/check-values';

const RAD = Math.PI / 180;

/** Ids not judged, with the reason. */
const SKIPPED: Record<string, string> = {
  'sun.meeus.25a': 'ecliptic coordinates inside the library; the product reads elevation and azimuth only',
  'sun.usno.Istanbul.2026-06-21': 'rise, transit and set times are not shown by the product',
};

interface LibraryTolerance {
  suncalc_2x?: { abs: number };
  abs?: number;
}

const entries = checkEntries('solar_position');
const positions = entries.filter(({ id }) => !(id in SKIPPED));
const above = positions.filter(({ expected }) => expected.elevation_apparent?.value > 0);
const below = positions.filter(({ expected }) => expected.elevation_apparent?.value <= 0);

const place = ({ inputs }: CheckEntry) => [inputs.utc?.value, inputs.lat?.value, inputs.lon?.value] as const;

function separationDeg(elevA: number, azA: number, elevB: number, azB: number): number {
  const cosine =
    Math.sin(elevA * RAD) * Math.sin(elevB * RAD) +
    Math.cos(elevA * RAD) * Math.cos(elevB * RAD) * Math.cos((azA - azB) * RAD);
  return Math.acos(Math.min(1, cosine)) / RAD;
}

describe('check values: solar_position', () => {
  test('every entry is a position or skipped with a reason', () => {
    expect(above.length).toBeGreaterThan(5);
    expect(below.length).toBeGreaterThan(1);
    expect(positions.filter(({ method }) => method !== 'sun_check').map(({ id }) => id)).toEqual([]);
    expect(Object.keys(SKIPPED).filter((id) => !entries.some((entry) => entry.id === id))).toEqual([]);
    expect(above.length + below.length + Object.keys(SKIPPED).length).toBe(entries.length);
  });

  test.each(above.map((entry) => [entry.id, entry] as const))('%s', (_id, entry) => {
    const sun = sunPosition(...place(entry));
    const allowed = (entry.product_tolerance as LibraryTolerance).suncalc_2x?.abs;
    expect(allowed).toBeGreaterThan(0);
    const { elevation_apparent: elevation, azimuth } = entry.expected;
    const off = separationDeg(sun?.elevationDeg ?? 0, sun?.azimuthDeg ?? 0, elevation?.value, azimuth?.value);
    expect(off).toBeLessThanOrEqual(allowed as number);
  });

  test.each(below.map((entry) => [entry.id, entry] as const))('%s (night)', (_id, entry) => {
    const elevation = sunElevationDeg(...place(entry));
    expect(elevation).toBeLessThan(0);
    const allowed = (entry.product_tolerance as LibraryTolerance).abs as number;
    expect(Math.abs((elevation as number) - entry.expected.elevation_apparent?.value)).toBeLessThanOrEqual(allowed);
    expect(Math.abs((sunAzimuthDeg(...place(entry)) as number) - entry.expected.azimuth?.value)).toBeLessThanOrEqual(
      allowed,
    );
  });
});

describe('absence', () => {
  const noon = '2026-06-13T18:30:00Z';
  test.each([
    ['no time', null, 40, -105],
    ['not a time', 'noon', 40, -105],
    ['a time without offset', '2026-06-13T18:30:00', 40, -105],
    ['a day that is not', '2026-13-41T18:30:00Z', 40, -105],
    ['no latitude', noon, null, -105],
    ['latitude above 90', noon, 91, -105],
    ['longitude above 180', noon, 40, 181],
    ['NaN', noon, Number.NaN, -105],
  ])('%s gives null', (_name, time, latitude, longitude) => {
    expect(sunPosition(time, latitude, longitude)).toBeNull();
    expect(sunElevationDeg(time, latitude, longitude)).toBeNull();
    expect(sunAzimuthDeg(time, latitude, longitude)).toBeNull();
  });

  test('an offset names the same instant', () => {
    expect(sunElevationDeg('2026-06-13T12:30:00-06:00', 39.65, -105.2)).toBe(sunElevationDeg(noon, 39.65, -105.2));
  });
});
