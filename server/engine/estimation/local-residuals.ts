import { Cancelled, type RunControl } from "../run.ts";
import { type Columns, zeros } from "./columns.ts";
import { reduceToTriangle } from "./householder.ts";
import type { MomentSource } from "./moment-source.ts";
import { BLOCK_ROWS } from "./term-block.ts";

/** Blocks between two looks at `cancelled()`. */
const POLL_BLOCKS = 64;

/**
 * A factor of the residuals e = w − C Z of every equation straight from the rows, n × n: E'E = Σ_t h_t e_t e_t'.
 * Blocks of rows are reduced by reflections, one on top of the triangle of those before it, so that nothing is
 * squared. Only terms that C holds are formed: the derivatives' are left alone.
 */
export function localResiduals(
  source: MomentSource,
  coefficients: readonly (readonly number[])[],
  control: RunControl,
): Columns {
  const n = source.responses.length;
  const used = source.terms.flatMap((factors, term) =>
    coefficients.some((row) => row[term] !== 0)
      ? [{ factors: factors.filter((place) => place !== 0), weights: coefficients.map((row) => row[term]) }]
      : [],
  );
  const stacked = zeros(n + BLOCK_ROWS, n);
  const values = new Float64Array(BLOCK_ROWS);
  for (let from = 0, block = 0; from < source.rows; from += BLOCK_ROWS, block++) {
    if (block % POLL_BLOCKS === 0 && control.cancelled()) throw new Cancelled("cancelled while forming residuals");
    const rows = Math.min(BLOCK_ROWS, source.rows - from);
    for (let i = 0; i < n; i++) {
      const column = blockOf(stacked, i);
      column.fill(0);
      for (let t = 0; t < rows; t++) column[t] = source.responses[i][from + t];
    }
    for (const { factors, weights } of used) {
      values.fill(1);
      for (const place of factors) {
        const column = source.columns[place - 1];
        for (let t = 0; t < rows; t++) values[t] *= column[from + t];
      }
      for (let i = 0; i < n; i++) subtractMultiple(blockOf(stacked, i), weights[i], values, rows);
    }
    if (source.weights !== undefined) {
      for (let i = 0; i < n; i++) {
        const column = blockOf(stacked, i);
        for (let t = 0; t < rows; t++) column[t] *= Math.sqrt(source.weights[from + t]);
      }
    }
    reduceToTriangle(stacked);
  }
  return triangleOf(stacked, n);
}

/** The rows of a block in column i, below the triangle of those before. */
function blockOf({ rows, values }: Columns, i: number): Float64Array {
  return values.subarray(i * rows + rows - BLOCK_ROWS, (i + 1) * rows);
}

function subtractMultiple(target: Float64Array, factor: number, values: Float64Array, rows: number): void {
  if (factor === 0) return;
  for (let t = 0; t < rows; t++) target[t] -= factor * values[t];
}

function triangleOf(stacked: Columns, n: number): Columns {
  const triangle = zeros(n, n);
  for (let i = 0; i < n; i++) {
    triangle.values.set(stacked.values.subarray(i * stacked.rows, i * stacked.rows + n), i * n);
  }
  return triangle;
}
