import { decomposeSymmetric } from '../stats/cholesky';
import { logGamma } from '../stats/special';

/** Sums over the rows: X'WX (row by row), X'Wy, y'Wy and the number of rows. */
export interface CrossSums {
  cross: Float64Array;
  rhs: Float64Array;
  squares: number;
  rows: number;
}

/** Normal / inverse-gamma prior: coefficient means, their precision relative to the noise variance (diagonal), and a, b of the noise. */
export interface ConjugatePrior {
  mean: ArrayLike<number>;
  precision: ArrayLike<number>;
  a: number;
  b: number;
}

export interface ConjugatePosterior {
  mean: Float64Array;
  /** Covariance of the coefficients relative to the noise variance, row by row. */
  covariance: Float64Array;
  a: number;
  b: number;
  /** ln of the evidence, for unit weights. */
  logEvidence: number;
}

/**
 * Closed-form update of the conjugate linear model: Ln = L0 + X'X, mn = Ln^-1 (L0 m0 + X'y), an = a0 + n/2,
 * bn = b0 + (y'y + m0'L0 m0 - mn'Ln mn)/2. Source: Gelman et al., Bayesian Data Analysis, 3rd ed. (2013), ch. 14.
 * Null when Ln is not positive definite: the columns cannot be told apart.
 */
export function updateConjugate(sums: CrossSums, prior: ConjugatePrior): ConjugatePosterior | null {
  const p = sums.rhs.length;
  const normal = Float64Array.from(sums.cross);
  const rhs = Float64Array.from(sums.rhs);
  let squares = sums.squares;
  let priorLogDeterminant = 0;
  for (let j = 0; j < p; j++) {
    const precision = prior.precision[j]!;
    normal[j * p + j]! += precision;
    rhs[j]! += precision * prior.mean[j]!;
    squares += precision * prior.mean[j]! ** 2;
    priorLogDeterminant += Math.log(precision);
  }
  const solver = decomposeSymmetric(normal, p);
  if (!solver) return null;
  const mean = solver.solve(rhs);
  const explained = mean.reduce((s, m, j) => s + m * rhs[j]!, 0);
  const a = prior.a + sums.rows / 2;
  const b = prior.b + Math.max(0, squares - explained) / 2;
  const logEvidence =
    0.5 * (priorLogDeterminant - solver.logDeterminant - sums.rows * Math.log(2 * Math.PI)) +
    prior.a * Math.log(prior.b) -
    a * Math.log(b) +
    logGamma(a) -
    logGamma(prior.a);
  return { mean, covariance: solver.inverse, a, b, logEvidence };
}
