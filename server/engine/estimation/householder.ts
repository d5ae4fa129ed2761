import type { Poll } from "../run.ts";
import { type Columns, zeros } from "./columns.ts";

/** Multiplications between two polls: some ten milliseconds. */
const WORK_BETWEEN_POLLS = 1e7;

/**
 * Householder triangular factor (Householder 1958, Journal of the ACM 5): A = QR by reflections, one
 * column after another. `matrix` (r × c) is overwritten; its first `pivots` columns are reduced, the
 * others only carried along, so that they end as Q'b. Signs make the diagonal of R non-negative.
 * Cost 2 r c² floating-point operations.
 */
export function reduceToTriangle(matrix: Columns, pivots: number = matrix.columns, poll: Poll = () => {}): void {
  const { rows, columns, values } = matrix;
  let work = 0;
  for (let pivot = 0; pivot < Math.min(pivots, rows); pivot++) {
    work += 2 * (rows - pivot) * (columns - pivot);
    if (work > WORK_BETWEEN_POLLS) {
      poll();
      work = 0;
    }
    const offset = pivot * rows;
    let squares = 0;
    for (let i = pivot + 1; i < rows; i++) squares += values[offset + i] * values[offset + i];
    const head = values[offset + pivot];
    if (squares === 0) {
      if (head < 0) for (let j = pivot; j < columns; j++) values[j * rows + pivot] = -values[j * rows + pivot];
      continue;
    }
    const norm = Math.sqrt(head * head + squares);
    // v = a − ‖a‖e₁, its first entry without cancellation.
    const first = head <= 0 ? head - norm : -squares / (head + norm);
    const scale = 2 / (squares + first * first);
    for (let j = pivot + 1; j < columns; j++) reflect(values, offset, j * rows, pivot, rows, first, scale);
    values[offset + pivot] = norm;
    for (let i = pivot + 1; i < rows; i++) values[offset + i] = 0;
  }
}

/** Column at `target` ← (I − scale·vv')·column, v = (first, values below the pivot at `offset`). */
function reflect(
  values: Float64Array,
  offset: number,
  target: number,
  pivot: number,
  rows: number,
  first: number,
  scale: number,
): void {
  let even = first * values[target + pivot];
  let odd = 0;
  let i = pivot + 1;
  for (; i + 1 < rows; i += 2) {
    even += values[offset + i] * values[target + i];
    odd += values[offset + i + 1] * values[target + i + 1];
  }
  if (i < rows) even += values[offset + i] * values[target + i];
  const factor = scale * (even + odd);
  values[target + pivot] -= factor * first;
  for (i = pivot + 1; i < rows; i++) values[target + i] -= factor * values[offset + i];
}

/** The triangular factor R of `matrix`, min(r, c) × c; the matrix itself is left as it was. */
export function triangularFactor(matrix: Columns, poll?: Poll): Columns {
  const copy: Columns = { ...matrix, values: matrix.values.slice() };
  reduceToTriangle(copy, copy.columns, poll);
  const height = Math.min(matrix.rows, matrix.columns);
  const factor = zeros(height, matrix.columns);
  for (let j = 0; j < matrix.columns; j++) {
    for (let i = 0; i <= Math.min(j, height - 1); i++) factor.values[j * height + i] = copy.values[j * matrix.rows + i];
  }
  return factor;
}
