import type { Poll } from "../run.ts";

/** Multiplications between two polls: some ten milliseconds. */
const WORK_BETWEEN_POLLS = 1e7;

/**
 * A dense matrix stored by columns: entry (i, j) is `values[j * rows + i]`. The estimators work on
 * this rather than on rows of numbers, because every inner loop runs down a column.
 */
export interface Columns {
  readonly rows: number;
  readonly columns: number;
  readonly values: Float64Array;
}

export function zeros(rows: number, columns: number): Columns {
  return { rows, columns, values: new Float64Array(rows * columns) };
}

export function identity(size: number): Columns {
  const matrix = zeros(size, size);
  for (let i = 0; i < size; i++) matrix.values[i * size + i] = 1;
  return matrix;
}

export function columnOf(matrix: Columns, column: number): Float64Array {
  return matrix.values.subarray(column * matrix.rows, (column + 1) * matrix.rows);
}

/** The named columns of a matrix, copied, in the order given. */
export function pickColumns(matrix: Columns, columns: readonly number[]): Columns {
  const picked = zeros(matrix.rows, columns.length);
  columns.forEach((column, place) => {
    picked.values.set(columnOf(matrix, column), place * matrix.rows);
  });
  return picked;
}

export function dot(left: Float64Array, right: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < left.length; i++) sum += left[i] * right[i];
  return sum;
}

/** A B for A (r × s) and B (s × t). */
export function multiply(left: Columns, right: Columns, poll: Poll = () => {}): Columns {
  const product = zeros(left.rows, right.columns);
  const between = columnsBetweenPolls(left);
  for (let j = 0; j < right.columns; j++) {
    if (j % between === 0) poll();
    const out = columnOf(product, j);
    for (let k = 0; k < left.columns; k++) {
      const factor = right.values[j * right.rows + k];
      if (factor === 0) continue;
      const offset = k * left.rows;
      for (let i = 0; i < left.rows; i++) out[i] += factor * left.values[offset + i];
    }
  }
  return product;
}

/** A'B for A (r × s) and B (r × t). */
export function crossProduct(left: Columns, right: Columns, poll: Poll = () => {}): Columns {
  const product = zeros(left.columns, right.columns);
  const between = columnsBetweenPolls(left);
  for (let j = 0; j < right.columns; j++) {
    if (j % between === 0) poll();
    const column = columnOf(right, j);
    for (let i = 0; i < left.columns; i++) product.values[j * left.columns + i] = dot(columnOf(left, i), column);
  }
  return product;
}

const columnsBetweenPolls = ({ values }: Columns) => Math.max(1, Math.floor(WORK_BETWEEN_POLLS / values.length));

export function transposed(matrix: Columns): Columns {
  const result = zeros(matrix.columns, matrix.rows);
  for (let j = 0; j < matrix.columns; j++) {
    for (let i = 0; i < matrix.rows; i++) result.values[i * result.rows + j] = matrix.values[j * matrix.rows + i];
  }
  return result;
}
