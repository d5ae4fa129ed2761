import type { Poll } from "../run.ts";
import { type Columns, zeros } from "./columns.ts";

const COLUMNS_BETWEEN_POLLS = 64;

/** Solves R y = b in place, R upper triangular (its first `size` rows and columns). */
export function solveUpper(upper: Columns, right: Float64Array, size: number = upper.columns): void {
  for (let i = size - 1; i >= 0; i--) {
    const value = right[i] / upper.values[i * upper.rows + i];
    right[i] = value;
    for (let k = 0; k < i; k++) right[k] -= value * upper.values[i * upper.rows + k];
  }
}

/** Solves R'y = b in place, R upper triangular. */
export function solveUpperTransposed(upper: Columns, right: Float64Array, size: number = upper.columns): void {
  for (let i = 0; i < size; i++) {
    let value = right[i];
    for (let k = 0; k < i; k++) value -= upper.values[i * upper.rows + k] * right[k];
    right[i] = value / upper.values[i * upper.rows + i];
  }
}

/** R⁻¹, upper triangular. */
export function invertUpper(upper: Columns, poll: Poll = () => {}): Columns {
  const inverse = zeros(upper.columns, upper.columns);
  for (let j = 0; j < upper.columns; j++) {
    if (j % COLUMNS_BETWEEN_POLLS === 0) poll();
    const column = inverse.values.subarray(j * upper.columns, (j + 1) * upper.columns);
    column[j] = 1;
    solveUpper(upper, column, j + 1);
  }
  return inverse;
}

/**
 * Upper triangular R with R'R = A for A symmetric and positive semidefinite (Cholesky). A pivot at or
 * below `tolerance` times its diagonal entry marks a column that depends on those before it: its
 * diagonal is set to zero and the column keeps only its exact combination. Returns R and those columns.
 */
export function semidefiniteCholesky(
  matrix: Columns,
  tolerance: number,
  poll: Poll = () => {},
): { factor: Columns; dependent: number[]; smallestPivot: number } {
  const size = matrix.columns;
  const factor = zeros(size, size);
  const r = factor.values;
  const dependent: number[] = [];
  let smallestPivot = 1;
  for (let j = 0; j < size; j++) {
    if (j % COLUMNS_BETWEEN_POLLS === 0) poll();
    const column = j * size;
    const diagonal = matrix.values[column + j];
    let pivot = diagonal;
    for (let i = 0; i < j; i++) {
      const other = i * size;
      const diagonalOfRow = r[other + i];
      if (diagonalOfRow === 0) continue;
      let sum = matrix.values[column + i];
      for (let k = 0; k < i; k++) sum -= r[other + k] * r[column + k];
      const entry = sum / diagonalOfRow;
      r[column + i] = entry;
      pivot -= entry * entry;
    }
    if (!(pivot > tolerance * diagonal)) {
      dependent.push(j);
      continue;
    }
    smallestPivot = Math.min(smallestPivot, pivot / diagonal);
    r[column + j] = Math.sqrt(pivot);
  }
  return { factor, dependent, smallestPivot };
}
