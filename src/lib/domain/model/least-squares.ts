import { Matrix, QrDecomposition } from 'ml-matrix';

export interface LeastSquaresFit {
  kind: 'fit';
  coefficients: number[];
  standardErrors: number[];
  /** Residual standard deviation and its degrees of freedom. */
  residualSd: number;
  df: number;
  residualSumOfSquares: number;
  regressionSumOfSquares: number;
  rSquared: number;
  /** (X'X)^-1, row by row. */
  covariance: Float64Array;
}

export type LeastSquaresResult =
  | LeastSquaresFit
  | { kind: 'too-few-rows'; have: number; need: number }
  | { kind: 'collinear' };

/** Columns are called collinear when one keeps less than this share of its length after the others are taken out. */
const RANK_TOLERANCE = 1e-10;

/**
 * Plain least squares by Householder QR on columns scaled to unit length. Refuses with too few rows or columns that cannot be
 * told apart, instead of answering with numbers that mean nothing. `rows` include the constant column where one is wanted.
 * Checked against the NIST StRD sets in tests/unit/model.
 */
export function leastSquares(rows: readonly (readonly number[])[], y: readonly number[]): LeastSquaresResult {
  const n = rows.length;
  const p = rows[0]?.length ?? 0;
  if (n <= p || p === 0) return { kind: 'too-few-rows', have: n, need: p + 1 };
  const lengths = Array.from({ length: p }, (_, j) => Math.hypot(...rows.map((r) => r[j]!)));
  if (lengths.some((l) => !(l > 0))) return { kind: 'collinear' };
  const scaled = new Matrix(rows.map((r) => r.map((v, j) => v / lengths[j]!)));
  const qr = new QrDecomposition(scaled);
  const upper = qr.upperTriangularMatrix;
  if (Array.from({ length: p }, (_, j) => Math.abs(upper.get(j, j))).some((d) => !(d > RANK_TOLERANCE)))
    return { kind: 'collinear' };
  const solution = qr.solve(Matrix.columnVector([...y])).to1DArray();
  return summarise(
    rows,
    y,
    solution.map((b, j) => b / lengths[j]!),
    inverseOfCross(upper, lengths),
  );
}

/** (R'R)^-1 with the scaling undone. */
function inverseOfCross(upper: Matrix, lengths: readonly number[]): Float64Array {
  const p = lengths.length;
  const inverse = invertUpper(upper, p);
  const out = new Float64Array(p * p);
  for (let i = 0; i < p; i++) {
    for (let j = 0; j < p; j++) {
      let sum = 0;
      for (let k = Math.max(i, j); k < p; k++) sum += inverse[i * p + k]! * inverse[j * p + k]!;
      out[i * p + j] = sum / (lengths[i]! * lengths[j]!);
    }
  }
  return out;
}

function invertUpper(upper: Matrix, p: number): Float64Array {
  const inverse = new Float64Array(p * p);
  for (let j = 0; j < p; j++) {
    inverse[j * p + j] = 1 / upper.get(j, j);
    for (let i = j - 1; i >= 0; i--) {
      let sum = 0;
      for (let k = i + 1; k <= j; k++) sum += upper.get(i, k) * inverse[k * p + j]!;
      inverse[i * p + j] = -sum / upper.get(i, i);
    }
  }
  return inverse;
}

function summarise(
  rows: readonly (readonly number[])[],
  y: readonly number[],
  coefficients: number[],
  covariance: Float64Array,
): LeastSquaresFit {
  const n = rows.length;
  const p = coefficients.length;
  const rss = rows.reduce((s, r, i) => s + (y[i]! - r.reduce((f, v, j) => f + v * coefficients[j]!, 0)) ** 2, 0);
  const mean = y.reduce((s, v) => s + v, 0) / n;
  const total = y.reduce((s, v) => s + (v - mean) ** 2, 0);
  const residualSd = Math.sqrt(rss / (n - p));
  return {
    kind: 'fit',
    coefficients,
    standardErrors: coefficients.map((_, j) => residualSd * Math.sqrt(covariance[j * p + j]!)),
    residualSd,
    df: n - p,
    residualSumOfSquares: rss,
    regressionSumOfSquares: total - rss,
    rSquared: 1 - rss / total,
    covariance,
  };
}

/** Prediction at a row: location, and the scale of its Student t with the fit's df. */
export function predictLeastSquares(
  fit: LeastSquaresFit,
  row: readonly number[],
): { location: number; leverage: number; scale: number } {
  const p = row.length;
  let leverage = 0;
  for (let i = 0; i < p; i++) for (let j = 0; j < p; j++) leverage += row[i]! * fit.covariance[i * p + j]! * row[j]!;
  const location = row.reduce((s, v, j) => s + v * fit.coefficients[j]!, 0);
  return { location, leverage, scale: fit.residualSd * Math.sqrt(1 + leverage) };
}
