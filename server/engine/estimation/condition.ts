import { type Columns, columnOf } from "./columns.ts";
import { solveUpper, solveUpperTransposed } from "./triangle.ts";

const SWEEPS = 40;

/**
 * Condition number σ_max/σ_min of an upper triangular matrix by power iteration on R'R and on its
 * inverse: two digits of it, which is what it is read for. Infinite where a diagonal entry is zero.
 */
export function conditionOf(triangle: Columns): number {
  const size = triangle.columns;
  if (size === 0) return 1;
  for (let j = 0; j < size; j++) if (triangle.values[j * triangle.rows + j] === 0) return Number.POSITIVE_INFINITY;
  const largest = power(size, (vector) => multiplyTransposed(triangle, multiplyUpper(triangle, vector)));
  const smallest = power(size, (vector) => {
    const solved = vector.slice();
    solveUpperTransposed(triangle, solved);
    solveUpper(triangle, solved);
    return solved;
  });
  return Math.sqrt(largest * smallest);
}

/** The same with every column scaled to unit length. */
export function scaledCondition(triangle: Columns): number {
  const scaled: Columns = { ...triangle, values: triangle.values.slice() };
  for (let j = 0; j < scaled.columns; j++) {
    const column = columnOf(scaled, j);
    const length = Math.hypot(...column) || 1;
    for (let i = 0; i < column.length; i++) column[i] /= length;
  }
  return conditionOf(scaled);
}

function power(size: number, apply: (vector: Float64Array) => Float64Array): number {
  // A start without symmetry, so that it is orthogonal to no eigenvector by construction.
  let vector: Float64Array = Float64Array.from({ length: size }, (_, i) => 1 + ((i * 7919) % 101) / 101);
  let value = 0;
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    const length = Math.hypot(...vector);
    vector = apply(vector.map((entry) => entry / length));
    value = Math.hypot(...vector);
  }
  return value;
}

function multiplyUpper(triangle: Columns, vector: Float64Array): Float64Array {
  const product = new Float64Array(vector.length);
  for (let j = 0; j < vector.length; j++) {
    for (let i = 0; i <= j; i++) product[i] += triangle.values[j * triangle.rows + i] * vector[j];
  }
  return product;
}

function multiplyTransposed(triangle: Columns, vector: Float64Array): Float64Array {
  return Float64Array.from(vector, (_, j) => {
    let sum = 0;
    for (let i = 0; i <= j; i++) sum += triangle.values[j * triangle.rows + i] * vector[i];
    return sum;
  });
}
