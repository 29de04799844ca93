import type { PassView } from './view';

/** Passes by density altitude; those without one keep their order at the end. */
export function sortedByDensityAltitude(passes: readonly PassView[], dir: 'asc' | 'desc'): PassView[] {
  const sign = dir === 'asc' ? 1 : -1;
  return [...passes].sort((a, b) => compare(a.densityAltitudeM, b.densityAltitudeM, sign));
}

function compare(a: number | null, b: number | null, sign: number): number {
  if (a === null || b === null) return Number(a === null) - Number(b === null);
  return sign * (a - b);
}
