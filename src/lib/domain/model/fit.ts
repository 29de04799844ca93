import { quadraticForm } from '../stats/cholesky';
import { type ConjugatePrior, type CrossSums, updateConjugate } from './conjugate';
import {
  NOISE_PRIOR_PASSES,
  NOISE_SD_GUESS,
  OUTLIER_PRIOR_PASSES,
  OUTLIER_SHARE,
  OUTLIER_WIDTH,
  PRIOR,
  REWEIGHTING_PASSES,
} from './constants';
import type { Design } from './design';

/** What is fitted: rows, ln slip, the event of each row, and the known measurement variance of each ln slip (0 if unknown). */
export interface FitInput {
  design: Design;
  y: Float64Array;
  /** Index of each row's event, 0 .. events-1. */
  event: Int32Array;
  events: number;
  measurementVariance: Float64Array;
}

/**
 * Normal / inverse-gamma posterior of the regression, events absorbed in closed form.
 * Source: conjugate model as in Gelman et al., Bayesian Data Analysis, 3rd ed. (2013), ch. 14; the event effects are
 * integrated out by the Sherman-Morrison identity within each event.
 */
export interface Posterior {
  coefficients: Float64Array;
  /** Covariance of the coefficients relative to the noise variance, p x p row by row. */
  covariance: Float64Array;
  /** Noise variance (ln slip squared) and its degrees of freedom. */
  noiseVariance: number;
  df: number;
  weights: Float64Array;
  /** Probability that each pass is an odd one. */
  oddness: Float64Array;
  outlierShare: number;
  /** Residual of each pass as if it had been left out, in ln slip, and its variance relative to the noise variance without the noise. */
  looResidual: Float64Array;
  looVariance: Float64Array;
  eventSums: EventSums;
}

export interface EventSums {
  /** Sum of weights, of weight x row, of weight x y, per event. */
  weight: Float64Array;
  rows: Float64Array;
  y: Float64Array;
  /** Noise variance over event variance. */
  lambda: number;
}

/** Fits with a few reweighting rounds. Returns null when the columns cannot be told apart even with their priors. */
export function fitPosterior(input: FitInput): Posterior | null {
  const { n } = input.design;
  let noise = NOISE_SD_GUESS ** 2;
  let share: number = OUTLIER_SHARE;
  let oddness: Float64Array = new Float64Array(n);
  let posterior: Posterior | null = null;
  for (let round = 0; round <= REWEIGHTING_PASSES; round++) {
    const weights = passWeights(oddness, input.measurementVariance, noise);
    posterior = solveWeighted(input, weights, noise);
    if (!posterior) return null;
    noise = posterior.noiseVariance;
    oddness = oddPasses(posterior, share);
    share = (OUTLIER_SHARE * OUTLIER_PRIOR_PASSES + sum(oddness)) / (OUTLIER_PRIOR_PASSES + n);
    posterior.oddness = oddness;
    posterior.outlierShare = share;
  }
  return posterior;
}

const sum = (values: Float64Array): number => values.reduce((s, v) => s + v, 0);

function passWeights(oddness: Float64Array, measurement: Float64Array, noise: number): Float64Array {
  const wide = 1 / OUTLIER_WIDTH ** 2;
  return oddness.map((odd, i) => (1 - odd + odd * wide) / (1 + measurement[i]! / noise));
}

/** Posterior probability of being odd, from leave-one-out residuals so that a pass does not excuse itself. */
function oddPasses(posterior: Posterior, share: number): Float64Array {
  const wide = OUTLIER_WIDTH ** 2;
  return posterior.looResidual.map((r, i) => {
    const spread = posterior.looVariance[i]!;
    const regular = (1 - share) * normalDensity(r, posterior.noiseVariance * (1 + spread));
    const odd = share * normalDensity(r, posterior.noiseVariance * (wide + spread));
    return regular + odd > 0 ? odd / (regular + odd) : 1;
  });
}

const normalDensity = (r: number, variance: number): number =>
  Math.exp((-0.5 * r * r) / variance) / Math.sqrt(variance);

function solveWeighted(input: FitInput, weights: Float64Array, noise: number): Posterior | null {
  const { design, y, events } = input;
  const sums = eventSums(input, weights, noise / PRIOR.event ** 2);
  const cross: CrossSums = {
    cross: new Float64Array(design.p * design.p),
    rhs: new Float64Array(design.p),
    squares: 0,
    rows: y.length,
  };
  cross.squares += addRows(cross.cross, cross.rhs, input, weights);
  cross.squares -= subtractEvents(cross.cross, cross.rhs, sums, events, design.p);
  mirror(cross.cross, design.p);
  const updated = updateConjugate(cross, columnPrior(input, noise));
  if (!updated) return null;
  const posterior: Posterior = {
    coefficients: updated.mean,
    covariance: updated.covariance,
    noiseVariance: updated.b / updated.a,
    df: 2 * updated.a,
    weights,
    oddness: weights,
    outlierShare: 0,
    looResidual: new Float64Array(y.length),
    looVariance: new Float64Array(y.length),
    eventSums: sums,
  };
  leaveOneOut(posterior, input);
  return posterior;
}

// Prior sds are in ln slip; the conjugate form wants precision relative to the noise variance, so it follows the noise estimate.
function columnPrior({ design }: FitInput, noise: number): ConjugatePrior {
  return {
    mean: design.columns.map((c) => c.priorMean),
    precision: design.columns.map((c) => noise / c.priorSd ** 2),
    a: NOISE_PRIOR_PASSES / 2,
    b: (NOISE_PRIOR_PASSES / 2) * NOISE_SD_GUESS ** 2,
  };
}

function addRows(normal: Float64Array, rhs: Float64Array, { design, y }: FitInput, weights: Float64Array): number {
  const { x, n, p } = design;
  let total = 0;
  for (let i = 0; i < n; i++) {
    const w = weights[i]!;
    const at = i * p;
    for (let j = 0; j < p; j++) {
      const wx = w * x[at + j]!;
      if (wx === 0) continue;
      rhs[j]! += wx * y[i]!;
      for (let k = 0; k <= j; k++) normal[j * p + k]! += wx * x[at + k]!;
    }
    total += w * y[i]! * y[i]!;
  }
  return total;
}

function mirror(matrix: Float64Array, p: number): void {
  for (let j = 0; j < p; j++) for (let k = 0; k < j; k++) matrix[k * p + j] = matrix[j * p + k]!;
}

function eventSums({ design, y, event, events }: FitInput, weights: Float64Array, lambda: number): EventSums {
  const { x, n, p } = design;
  const sums: EventSums = {
    weight: new Float64Array(events),
    rows: new Float64Array(events * p),
    y: new Float64Array(events),
    lambda,
  };
  for (let i = 0; i < n; i++) {
    const g = event[i]!;
    const w = weights[i]!;
    sums.weight[g]! += w;
    sums.y[g]! += w * y[i]!;
    for (let j = 0; j < p; j++) sums.rows[g * p + j]! += w * x[i * p + j]!;
  }
  return sums;
}

/** The event effects integrated out: each event takes back s s' / (lambda + weight). */
function subtractEvents(normal: Float64Array, rhs: Float64Array, sums: EventSums, events: number, p: number): number {
  let total = 0;
  for (let g = 0; g < events; g++) {
    const shrink = 1 / (sums.lambda + sums.weight[g]!);
    for (let j = 0; j < p; j++) {
      const s = sums.rows[g * p + j]! * shrink;
      if (s === 0) continue;
      rhs[j]! -= s * sums.y[g]!;
      for (let k = 0; k <= j; k++) normal[j * p + k]! -= s * sums.rows[g * p + k]!;
    }
    total += shrink * sums.y[g]! ** 2;
  }
  return total;
}

/** A row with its known event's own row taken out, as the absorbed event effect leaves it; the row itself in a new event (-1). */
export function rowWithinEvent({ eventSums: sums }: Posterior, x: Float64Array, event: number): Float64Array {
  if (event < 0) return x;
  const shrink = 1 / (sums.lambda + sums.weight[event]!);
  return x.map((v, j) => v - shrink * sums.rows[event * x.length + j]!);
}

/** Location and relative variance of the expected ln slip of a row in a known event (or -1 for a new one). */
export function expectedLog(
  posterior: Posterior,
  x: Float64Array,
  event: number,
): { location: number; variance: number } {
  const p = x.length;
  const { eventSums: sums, coefficients, covariance } = posterior;
  const known = event >= 0;
  const shrink = 1 / (sums.lambda + (known ? sums.weight[event]! : 0));
  const row = rowWithinEvent(posterior, x, event);
  let location = known ? shrink * sums.y[event]! : 0;
  for (let j = 0; j < p; j++) location += row[j]! * coefficients[j]!;
  return { location, variance: shrink + quadraticForm(covariance, row, p) };
}

function leaveOneOut(posterior: Posterior, { design, y, event }: FitInput): void {
  const { p } = design;
  for (let i = 0; i < design.n; i++) {
    const { location, variance } = expectedLog(posterior, design.x.subarray(i * p, i * p + p), event[i]!);
    const kept = Math.max(1e-6, 1 - posterior.weights[i]! * variance);
    posterior.looResidual[i] = (y[i]! - location) / kept;
    posterior.looVariance[i] = variance / kept;
  }
}
