import type { Column } from './columns';
import type { RunFeatures } from './features';

/** Training passes as numbers. Missing facts are filled with what earlier passes of the same event, track or season say. */
export interface Design {
  columns: readonly Column[];
  /** n x p, row by row. */
  x: Float64Array;
  n: number;
  p: number;
  /** Mean of each column over the passes that know it, for filling in. */
  means: Float64Array;
  /** Variance of each column over the passes that know it. */
  variances: Float64Array;
  /** Per pass: columns that were filled in. */
  filled: readonly (readonly number[])[];
}

export function buildDesign(runs: readonly RunFeatures[], columns: readonly Column[]): Design {
  const n = runs.length;
  const p = columns.length;
  const raw = runs.map((run) => columns.map((c) => c.value(run)));
  const means = new Float64Array(p);
  const variances = new Float64Array(p);
  for (let j = 0; j < p; j++) summarise(raw, j, means, variances);
  const x = new Float64Array(n * p);
  const filled = raw.map((row, i) => fillRow(row, i, x, means, eventMeans(raw, runs, i)));
  return { columns, x, n, p, means, variances, filled };
}

function summarise(raw: (number | null)[][], j: number, means: Float64Array, variances: Float64Array): void {
  const values = raw.map((row) => row[j]!).filter((v) => v !== null);
  const mean = values.reduce((s, v) => s + v, 0) / Math.max(1, values.length);
  means[j] = mean;
  variances[j] = values.reduce((s, v) => s + (v - mean) ** 2, 0) / Math.max(1, values.length - 1);
}

/** Mean of a column over the same event; the column's own mean when the event says nothing. */
function eventMeans(raw: (number | null)[][], runs: readonly RunFeatures[], i: number): (j: number) => number | null {
  return (j) => {
    let sum = 0;
    let count = 0;
    for (let k = 0; k < raw.length; k++) {
      const v = raw[k]![j];
      if (runs[k]!.event !== runs[i]!.event || v === null || v === undefined) continue;
      sum += v;
      count++;
    }
    return count > 0 ? sum / count : null;
  };
}

function fillRow(
  row: (number | null)[],
  i: number,
  x: Float64Array,
  means: Float64Array,
  ofEvent: (j: number) => number | null,
): number[] {
  const filled: number[] = [];
  row.forEach((v, j) => {
    if (v === null) filled.push(j);
    x[i * row.length + j] = v ?? ofEvent(j) ?? means[j]!;
  });
  return filled;
}

/** One run as a row. `missing` lists columns whose fact is not known; they hold the mean of the training passes. */
export function designRow(run: RunFeatures, design: Design): { x: Float64Array; missing: number[] } {
  const x = new Float64Array(design.p);
  const missing: number[] = [];
  design.columns.forEach((c, j) => {
    const v = c.value(run);
    if (v === null) missing.push(j);
    x[j] = v ?? design.means[j]!;
  });
  return { x, missing };
}
