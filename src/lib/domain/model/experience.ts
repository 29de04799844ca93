import { decomposeSymmetric, quadraticForm } from '../stats/cholesky';
import { densityUnits, trackTempUnits } from './columns';
import type { RunFeatures } from './features';

/** What "outside experience" looks at: each condition in units of a physically sizeable step. */
const VARIABLES = [
  { label: 'air density', read: (r: RunFeatures) => (r.densityKgM3 === null ? null : densityUnits(r.densityKgM3)) },
  {
    label: 'track temperature',
    read: (r: RunFeatures) => (r.trackTempC === null ? null : trackTempUnits(r.trackTempC)),
  },
  { label: 'dew margin', read: (r: RunFeatures) => (r.dewMarginC === null ? null : r.dewMarginC / 10) },
] as const;

export interface Experience {
  /** Squared distance of the run's conditions from those of the training passes; 1 or less is inside. */
  leverage: number;
  outside: boolean;
  /** Plain names of the conditions that are outside. */
  variables: string[];
}

const INSIDE_SHARE = 0.95;
/** Conditions are outside when they are this much farther out than the 95th percentile of the passes themselves. */
const REACH = 1.7;
/** A single condition may lie this many of the units above beyond the range seen. */
const RANGE_MARGIN = 0.8;
/** Measured with `npm run evaluate`: far-out intervals then hold about as often as they say. */
const EXTRAPOLATION_SD = 0.2;
/** Spread a season is taken to have before its passes show it, worth this many passes. */
const PRIOR_SPREAD = 0.5;
const PRIOR_PASSES = 8;

/** Lowest and highest of each condition over the training passes, in the units above; null where no pass knows it. */
export type SeenRanges = readonly ({ low: number; high: number } | null)[];

export function seenRanges(training: readonly RunFeatures[]): SeenRanges {
  return VARIABLES.map((v) => {
    const values = training.map((t) => v.read(t)).filter((x) => x !== null);
    return values.length === 0 ? null : { low: Math.min(...values), high: Math.max(...values) };
  });
}

/**
 * Variance of ln slip for conditions beyond the range seen, where the straight lines and the one bend of the model are a guess:
 * one sd of EXTRAPOLATION_SD for each unit beyond.
 */
export function extrapolationVariance(run: RunFeatures, ranges: SeenRanges): number {
  return VARIABLES.reduce((sum, v, j) => {
    const value = v.read(run);
    const range = ranges[j];
    if (value === null || !range) return sum;
    const beyond = Math.max(0, range.low - value, value - range.high);
    return sum + (EXTRAPOLATION_SD * beyond) ** 2;
  }, 0);
}

/** Compares a run's conditions with those the model was trained on. */
export function experienceOf(run: RunFeatures, training: readonly RunFeatures[]): Experience {
  const used = VARIABLES.filter((v) => v.read(run) !== null && training.some((t) => v.read(t) !== null));
  if (used.length === 0) return { leverage: 0, outside: false, variables: [] };
  const rows = training.map((t) => used.map((v) => v.read(t))).filter((r): r is number[] => r.every((x) => x !== null));
  if (rows.length < 2) return { leverage: 0, outside: false, variables: [] };
  const point = used.map((v) => v.read(run)!);
  const distance = distanceFrom(rows);
  const threshold = REACH * percentile(rows.map(distance), INSIDE_SHARE);
  const leverage = distance(point) / threshold;
  const beyond = used.filter((_, j) =>
    outsideRange(
      point[j]!,
      rows.map((r) => r[j]!),
    ),
  );
  const outside = leverage > 1 || beyond.length > 0;
  return {
    leverage,
    outside,
    variables: outside
      ? named(
          used.map((v) => v.label),
          beyond.map((v) => v.label),
          point,
          rows,
        )
      : [],
  };
}

function distanceFrom(rows: readonly number[][]): (point: number[]) => number {
  const size = rows[0]!.length;
  const mean = Array.from({ length: size }, (_, j) => rows.reduce((s, r) => s + r[j]!, 0) / rows.length);
  const spread = new Float64Array(size * size);
  for (const r of rows)
    for (let j = 0; j < size; j++)
      for (let k = 0; k < size; k++) spread[j * size + k]! += (r[j]! - mean[j]!) * (r[k]! - mean[k]!);
  for (let j = 0; j < size; j++) spread[j * size + j]! += PRIOR_PASSES * PRIOR_SPREAD ** 2;
  for (let j = 0; j < spread.length; j++) spread[j]! /= rows.length + PRIOR_PASSES;
  const solver = decomposeSymmetric(spread, size)!;
  return (point) =>
    quadraticForm(
      solver.inverse,
      point.map((v, j) => v - mean[j]!),
      size,
    );
}

function outsideRange(value: number, seen: readonly number[]): boolean {
  return value < Math.min(...seen) - RANGE_MARGIN || value > Math.max(...seen) + RANGE_MARGIN;
}

function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))]!;
}

/** The conditions beyond their range; when only the combination is new, the one farthest from its middle. */
function named(labels: string[], beyond: string[], point: readonly number[], rows: readonly number[][]): string[] {
  if (beyond.length > 0) return beyond;
  const far = labels.map((label, j) => {
    const values = rows.map((r) => r[j]!);
    const mean = values.reduce((s, v) => s + v, 0) / values.length;
    const sd = Math.sqrt(values.reduce((s, v) => s + (v - mean) ** 2, 0) / values.length) || 1;
    return { label, z: Math.abs(point[j]! - mean) / sd };
  });
  const farthest = far.reduce((a, b) => (b.z > a.z ? b : a));
  return [farthest.label];
}
