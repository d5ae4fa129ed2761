import { Matrix as Dense, QrDecomposition } from "ml-matrix";
import { type Matrix, zeros } from "./matrix.ts";

export interface LeastSquares {
  /** k × m: one column for each column of Y. */
  readonly coefficients: Matrix;
  /** R of X = Q R, k × k upper triangular, diagonal positive. */
  readonly triangle: Matrix;
  /** (X'X)⁻¹ = R⁻¹R⁻¹', k × k. */
  readonly inverseGram: Matrix;
}

/** Columns whose diagonal of R is below this, relative to the column's own length, depend on those before them. */
const DEPENDENT = 1e-12;

/**
 * Least squares of every column of Y on X by Householder reflections (Golub 1965): accurate where the
 * normal equations have lost half the digits. Columns are scaled to unit length first, which changes no
 * answer and makes the test of dependence free of units.
 *
 * Errors: a column of X that is a combination of those before it is refused, with its place.
 */
export function leastSquares(x: Matrix, y: Matrix): LeastSquares {
  const columns = x[0]?.length ?? 0;
  if (x.length !== y.length) throw new RangeError(`X has ${x.length} rows, Y has ${y.length}`);
  if (x.length < columns) throw new RangeError(`X has ${x.length} rows, fewer than its ${columns} columns`);
  const lengths = columnLengths(x, columns);
  const scaled = new QrDecomposition(new Dense(x.map((row) => row.map((entry, j) => entry / lengths[j]))));
  const upper = withPositiveDiagonal(scaled.upperTriangularMatrix.to2DArray());
  const dependent = upper.findIndex((row, i) => !(row[i] > DEPENDENT));
  if (dependent >= 0) throw new DependentColumn(dependent);
  const solution = scaled.solve(new Dense(y)).to2DArray();
  const inverse = inverseOfUpper(upper);
  return {
    coefficients: solution.map((row, i) => row.map((entry) => entry / lengths[i])),
    triangle: upper.map((row) => row.map((entry, j) => entry * lengths[j])),
    inverseGram: inverse.map((left, i) =>
      inverse.map((right, j) => {
        let sum = 0;
        for (let m = Math.max(i, j); m < columns; m++) sum += left[m] * right[m];
        return sum / (lengths[i] * lengths[j]);
      }),
    ),
  };
}

/** A column of X that depends on those before it. */
export class DependentColumn extends RangeError {
  override name = "DependentColumn";
  /** Place of the column, the first being 0. */
  readonly column: number;
  constructor(column: number) {
    super(`column ${column + 1} of the regressors is a linear combination of those before it`);
    this.column = column;
  }
}

/** R of a Householder factorisation A = Q R, columns × columns, diagonal not negative: what blocks of rows are merged by. */
export function triangularFactor(a: Matrix): Matrix {
  const columns = a[0]?.length ?? 0;
  const padded = a.length >= columns ? a : [...a, ...zeros(columns - a.length, columns)];
  return withPositiveDiagonal(new QrDecomposition(new Dense(padded)).upperTriangularMatrix.to2DArray());
}

/** X of R X = B for an upper triangular R. */
export function solveUpper(r: Matrix, b: Matrix): Matrix {
  const size = r.length;
  const x = b.map((row) => [...row]);
  for (let column = 0; column < (b[0]?.length ?? 0); column++) {
    for (let i = size - 1; i >= 0; i--) {
      let sum = x[i][column];
      for (let j = i + 1; j < size; j++) sum -= r[i][j] * x[j][column];
      x[i][column] = sum / r[i][i];
    }
  }
  return x;
}

function inverseOfUpper(r: Matrix): Matrix {
  return solveUpper(
    r,
    r.map((row, i) => row.map((_, j) => (i === j ? 1 : 0))),
  );
}

function columnLengths(x: Matrix, columns: number): number[] {
  return Array.from({ length: columns }, (_, j) => {
    const largest = x.reduce((most, row) => Math.max(most, Math.abs(row[j])), 0);
    if (largest === 0) throw new DependentColumn(j);
    return largest * Math.sqrt(x.reduce((sum, row) => sum + (row[j] / largest) ** 2, 0));
  });
}

function withPositiveDiagonal(r: Matrix): Matrix {
  return r.map((row, i) => (row[i] < 0 ? row.map((entry) => 0 - entry) : row));
}
