import { normalQuantile, studentTCdf } from '../stats/special';
import {
  HINDSIGHT_INFLATION,
  NOISE_PRIOR_PASSES,
  OUTLIER_WIDTH,
  PRIOR,
  RECALIBRATION_PRIOR_PASSES,
  RECALIBRATION_RANGE,
} from './constants';
import type { FitInput, Posterior } from './fit';

const MAX_SCORE = 3;

/**
 * Width correction learned from the model's own one-step-ahead errors: the passes are taken in order, each forecast from those
 * before it, and the error turned into a normal score. Squared scores average 1 when intervals are honest. Shrunk while few,
 * clipped always.
 */
export function recalibrationFactor(input: FitInput, posterior: Posterior): number {
  const scores = oneStepScores(input, posterior);
  const squares = scores.reduce((s, z) => s + Math.min(MAX_SCORE, Math.abs(z)) ** 2, 0);
  const factor =
    HINDSIGHT_INFLATION *
    Math.sqrt((RECALIBRATION_PRIOR_PASSES + squares) / (RECALIBRATION_PRIOR_PASSES + scores.length));
  return Math.min(RECALIBRATION_RANGE.high, Math.max(RECALIBRATION_RANGE.low, factor));
}

/** Normal scores of the one-step-ahead errors, in the order of the rows, by recursive updating. */
export function oneStepScores(input: FitInput, posterior: Posterior): number[] {
  const { design, y, event } = input;
  const filter = startFilter(input, posterior);
  const scores: number[] = [];
  for (let i = 0; i < design.n; i++) {
    if (i === 0 || event[i] !== event[i - 1]) forgetEvent(filter, PRIOR.event ** 2 / posterior.noiseVariance);
    const row = filter.row;
    row.set(design.x.subarray(i * design.p, (i + 1) * design.p));
    row[design.p] = 1;
    const spread = project(filter);
    const error = y[i]! - dot(filter.mean, row);
    scores.push(normalScore(error, spread, posterior, NOISE_PRIOR_PASSES + i));
    update(filter, error, spread, posterior.weights[i]!);
  }
  return scores;
}

interface Filter {
  size: number;
  mean: Float64Array;
  covariance: Float64Array;
  row: Float64Array;
  gain: Float64Array;
}

function startFilter({ design }: FitInput, posterior: Posterior): Filter {
  const size = design.p + 1;
  const mean = new Float64Array(size);
  const covariance = new Float64Array(size * size);
  design.columns.forEach((c, j) => {
    mean[j] = c.priorMean;
    covariance[j * size + j] = c.priorSd ** 2 / posterior.noiseVariance;
  });
  return { size, mean, covariance, row: new Float64Array(size), gain: new Float64Array(size) };
}

// The last state is the current event's own effect; a new event starts from its prior.
function forgetEvent({ size, mean, covariance }: Filter, variance: number): void {
  const last = size - 1;
  mean[last] = 0;
  for (let j = 0; j < size; j++) {
    covariance[last * size + j] = 0;
    covariance[j * size + last] = 0;
  }
  covariance[last * size + last] = variance;
}

/** Covariance times row, kept in `gain`; returns the variance of the row's expected value. */
function project({ size, covariance, row, gain }: Filter): number {
  let spread = 0;
  for (let i = 0; i < size; i++) {
    let g = 0;
    for (let j = 0; j < size; j++) g += covariance[i * size + j]! * row[j]!;
    gain[i] = g;
    spread += g * row[i]!;
  }
  return spread;
}

function update({ size, mean, covariance, gain }: Filter, error: number, spread: number, weight: number): void {
  const total = spread + 1 / weight;
  for (let i = 0; i < size; i++) {
    const k = gain[i]! / total;
    mean[i]! += k * error;
    for (let j = 0; j < size; j++) covariance[i * size + j]! -= k * gain[j]!;
  }
}

const dot = (a: Float64Array, b: Float64Array): number => a.reduce((s, v, i) => s + v * b[i]!, 0);

function normalScore(error: number, spread: number, posterior: Posterior, df: number): number {
  const scale = Math.sqrt(posterior.noiseVariance * (1 + spread));
  const oddScale = Math.sqrt(posterior.noiseVariance * (OUTLIER_WIDTH ** 2 + spread));
  const share = posterior.outlierShare;
  const pit = (1 - share) * studentTCdf(error / scale, df) + share * studentTCdf(error / oddScale, df);
  return normalQuantile(Math.min(1 - 1e-9, Math.max(1e-9, pit)));
}
