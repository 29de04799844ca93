/** Scores of probabilistic forecasts. Lower is better unless said. Units are those of the outcome. */
import {
  incompleteBetaInverse,
  incompleteGamma,
  logGamma,
  normalCdf,
  normalPdf,
  studentTCdf,
  studentTPdf,
} from '../stats/special';

/** CRPS of a normal forecast. Source: Gneiting & Raftery, JASA 102 (2007), eq. (21). */
export function crpsNormal(y: number, mean: number, sd: number): number {
  const z = (y - mean) / sd;
  return sd * (z * (2 * normalCdf(z) - 1) + 2 * normalPdf(z) - 1 / Math.sqrt(Math.PI));
}

/** CRPS of a Student t forecast with scale (not standard deviation), df > 1. Source: Jordan, Krueger, Lerch, J. Stat. Softw. 90 (2019) no. 12. */
export function crpsStudentT(y: number, df: number, location: number, scale: number): number {
  const z = (y - location) / scale;
  const logBeta = (a: number, b: number) => logGamma(a) + logGamma(b) - logGamma(a + b);
  const constant = ((2 * Math.sqrt(df)) / (df - 1)) * Math.exp(logBeta(0.5, df - 0.5) - 2 * logBeta(0.5, df / 2));
  const spread = (2 * studentTPdf(z, df) * (df + z * z)) / (df - 1);
  return scale * (z * (2 * studentTCdf(z, df) - 1) + spread - constant);
}

/**
 * CRPS of an ensemble, E|X-y| - E|X-X'|/2 (Gneiting & Raftery 2007, eq. 20). The fair version divides the second
 * term by m(m-1) (Ferro, Q. J. R. Meteorol. Soc. 140 (2014)).
 */
export function crpsSample(y: number, sample: readonly number[], fair = false): number {
  const sorted = [...sample].sort((a, b) => a - b);
  const m = sorted.length;
  const miss = sorted.reduce((s, x) => s + Math.abs(x - y), 0) / m;
  const pairs = sorted.reduce((s, x, i) => s + x * (2 * i - m + 1), 0);
  return miss - pairs / (fair ? m * (m - 1) : m * m);
}

/** Quantile (pinball) loss, not doubled. Source: Koenker & Bassett, Econometrica 46 (1978). */
export function pinballLoss(y: number, quantile: number, p: number): number {
  return y >= quantile ? p * (y - quantile) : (1 - p) * (quantile - y);
}

/** Interval score of a central interval. Source: Gneiting & Raftery 2007, eq. (43). */
export function intervalScore(y: number, lower: number, upper: number, coverage: number): number {
  const penalty = 2 / (1 - coverage);
  return upper - lower + penalty * (Math.max(0, lower - y) + Math.max(0, y - upper));
}

/** Brier score, half form. */
export function brierScore(outcomes: readonly number[], probabilities: readonly number[]): number {
  return outcomes.reduce((s, o, i) => s + (probabilities[i]! - o) ** 2, 0) / outcomes.length;
}

/** 1 - score / reference; negative when worse than the reference. Null when the reference is 0. */
export function skillScore(score: number, reference: number): number | null {
  return reference === 0 ? null : 1 - score / reference;
}

/** Exact (Clopper-Pearson) interval for a share of hits. */
export function exactBinomialInterval(hits: number, n: number, level: number): { low: number; high: number } {
  const tail = (1 - level) / 2;
  return {
    low: hits === 0 ? 0 : incompleteBetaInverse(hits, n - hits + 1, tail),
    high: hits === n ? 1 : incompleteBetaInverse(hits + 1, n - hits, 1 - tail),
  };
}

/** Chi-square of a histogram against flat, with its p value. */
export function flatnessTest(counts: readonly number[]): { chiSquare: number; df: number; pValue: number } {
  const expected = counts.reduce((s, c) => s + c, 0) / counts.length;
  const chiSquare = counts.reduce((s, c) => s + (c - expected) ** 2 / expected, 0);
  const df = counts.length - 1;
  return { chiSquare, df, pValue: 1 - incompleteGamma(df / 2, chiSquare / 2) };
}
