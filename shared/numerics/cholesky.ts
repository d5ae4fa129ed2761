import { CholeskyDecomposition, Matrix as Dense } from "ml-matrix";
import { type Matrix, symmetrised } from "./matrix.ts";

export interface Cholesky {
  /** L of A = L L', lower triangular. */
  readonly lower: Matrix;
  /** ln|A|. */
  readonly logDeterminant: number;
  /** A⁻¹B. */
  solve(b: Matrix): Matrix;
  /** A⁻¹, exactly symmetric. */
  inverse(): Matrix;
}

/** Cholesky factor of a symmetric matrix, or undefined where it is not positive definite to rounding. */
export function cholesky(a: Matrix): Cholesky | undefined {
  const size = a.length;
  for (const row of a) {
    if (row.length !== size) throw new RangeError(`a matrix of ${size} rows has a row of ${row.length} entries`);
  }
  if (size === 0) return { lower: [], logDeterminant: 0, solve: () => [], inverse: () => [] };
  const decomposition = new CholeskyDecomposition(new Dense(symmetrised(a)));
  const lower = decomposition.lowerTriangularMatrix.to2DArray();
  if (!decomposition.isPositiveDefinite() || !lower.every((row, i) => row[i] > 0)) return undefined;
  return {
    lower,
    logDeterminant: 2 * lower.reduce((sum, row, i) => sum + Math.log(row[i]), 0),
    solve: (b) => decomposition.solve(new Dense(b)).to2DArray(),
    inverse: () => symmetrised(decomposition.solve(Dense.eye(size)).to2DArray()),
  };
}
