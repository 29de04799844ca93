import { multiply, quadraticForm } from '../stats/cholesky';
import { unseenTrackVariance } from './columns';
import type { RunFeatures } from './features';
import { expectedLog } from './fit';
import type { TrainedModel } from './train';

/**
 * How well everything is known before a session: covariance of the coefficients and, last, of what the whole session shares (the event,
 * and a track never seen). Relative to the noise variance, row by row. It depends on what is run, not on how it turns out.
 */
export interface Knowledge {
  size: number;
  covariance: Float64Array;
}

export function knowledgeBefore(model: TrainedModel, run: RunFeatures): Knowledge {
  const { posterior, columnSet, eventIndex } = model;
  const p = columnSet.columns.length;
  const size = p + 1;
  const covariance = new Float64Array(size * size);
  const variance = (x: Float64Array): number => expectedLog(posterior, x, eventIndex.get(run.event) ?? -1).variance;
  const session = variance(new Float64Array(p));
  for (let j = 0; j < p; j++) {
    for (let k = 0; k < p; k++) covariance[j * size + k] = posterior.covariance[j * p + k]!;
    // What passes of this event so far have tied together: var(a + b) = var a + var b + 2 cov.
    const shared = 0.5 * (variance(unit(p, j)) - session - posterior.covariance[j * p + j]!);
    covariance[j * size + p] = shared;
    covariance[p * size + j] = shared;
  }
  const unseen = unseenTrackVariance(run, columnSet.columns) / posterior.noiseVariance;
  covariance[size * size - 1] = session + unseen;
  return { size, covariance };
}

function unit(size: number, at: number): Float64Array {
  const x = new Float64Array(size);
  x[at] = 1;
  return x;
}

/** One more run: S - S z z' S / (1 + z' S z). `z` is the design row with a 1 for the session at its end. */
export function afterRun({ size, covariance }: Knowledge, z: ArrayLike<number>): Knowledge {
  const gain = multiply(covariance, z, size);
  const total = 1 + quadraticForm(covariance, z, size);
  const after = covariance.map((v, at) => v - (gain[Math.floor(at / size)]! * gain[at % size]!) / total);
  return { size, covariance: after };
}
