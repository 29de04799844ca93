import { CholeskyDecomposition, Matrix } from 'ml-matrix';

/** A symmetric positive definite matrix, decomposed once. */
export interface SymmetricSolver {
  inverse: Float64Array;
  logDeterminant: number;
  solve(rhs: ArrayLike<number>): Float64Array;
}

/**
 * Decomposes a symmetric positive definite matrix stored row by row (size x size).
 * Returns null when it is not positive definite in double precision: the columns cannot be told apart.
 */
export function decomposeSymmetric(values: Float64Array, size: number): SymmetricSolver | null {
  const cholesky = new CholeskyDecomposition(Matrix.from1DArray(size, size, values));
  if (!cholesky.isPositiveDefinite()) return null;
  const lower = cholesky.lowerTriangularMatrix;
  let logDeterminant = 0;
  for (let i = 0; i < size; i++) logDeterminant += 2 * Math.log(lower.get(i, i));
  if (!Number.isFinite(logDeterminant)) return null;
  const inverse = Float64Array.from(cholesky.solve(Matrix.eye(size)).to1DArray());
  const solve = (rhs: ArrayLike<number>) =>
    Float64Array.from(cholesky.solve(Matrix.columnVector(Array.from(rhs))).to1DArray());
  return { inverse, logDeterminant, solve };
}

/** Matrix (row by row) times vector. */
export function multiply(matrix: Float64Array, vector: ArrayLike<number>, size: number): Float64Array {
  const out = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    let sum = 0;
    for (let j = 0; j < size; j++) sum += matrix[i * size + j]! * vector[j]!;
    out[i] = sum;
  }
  return out;
}

/** x' A x for a symmetric A stored row by row: half of the products, each twice. */
export function quadraticForm(matrix: Float64Array, x: ArrayLike<number>, size: number): number {
  let total = 0;
  for (let i = 0; i < size; i++) {
    const xi = x[i]!;
    if (xi === 0) continue;
    const at = i * size;
    let below = 0;
    for (let j = 0; j < i; j++) below += matrix[at + j]! * x[j]!;
    total += xi * (2 * below + matrix[at + i]! * xi);
  }
  return total;
}
