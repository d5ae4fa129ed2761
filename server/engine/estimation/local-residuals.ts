import { Cancelled, type RunControl } from "../run.ts";
import { mapInOrder, task } from "../threads/map-in-order.ts";
import { onSharedColumns } from "./accumulate-sums.ts";
import { type Columns, zeros } from "./columns.ts";
import { reduceToTriangle } from "./householder.ts";
import type { MomentSource } from "./moment-source.ts";
import { BLOCK_ROWS } from "./term-block.ts";

/** Rows reduced by themselves, on whichever thread. */
const CHUNK_ROWS = 64 * BLOCK_ROWS;

/** A term that C holds: its places among the columns, and its coefficient in every equation. */
interface UsedTerm {
  readonly factors: readonly number[];
  readonly weights: readonly number[];
}

interface Rows {
  readonly source: MomentSource;
  readonly used: readonly UsedTerm[];
}

/**
 * A factor of the residuals e = w − C Z of every equation straight from the rows, n × n: E'E = Σ_t h_t e_t e_t'.
 * Blocks of rows are reduced by reflections, one on top of the triangle of those before it, so that nothing is
 * squared. Only terms that C holds are formed: the derivatives' are left alone. Chunks of rows have triangles of
 * their own, reduced in the order of the rows: the same to the last bit on any number of threads.
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
  const { threads, ...alone } = control;
  const divided = threads !== undefined && source.rows * used.length * n >= threads.worthDividing;
  const rows: Rows = { source: divided ? onSharedColumns(source) : source, used };
  const chunks = Array.from({ length: Math.ceil(source.rows / CHUNK_ROWS) }, (_, chunk) => chunk);
  const triangles = mapInOrder(divided ? control : alone, reduceChunk, rows, chunks);
  const stacked = zeros(2 * n, n);
  for (const triangle of triangles) {
    for (let i = 0; i < n; i++) stacked.values.set(triangle.subarray(i * n, (i + 1) * n), (2 * i + 1) * n);
    reduceToTriangle(stacked);
  }
  return { rows: n, columns: n, values: triangleOf(stacked, n) };
}

/** The triangle of the residuals of one chunk of rows. */
export const reduceChunk = task(
  import.meta.url,
  "reduceChunk",
  ({ source, used }: Rows, chunk: number, control): Float64Array => {
    if (control.cancelled()) throw new Cancelled("cancelled while forming residuals");
    const n = source.responses.length;
    const stacked = zeros(n + BLOCK_ROWS, n);
    const values = new Float64Array(BLOCK_ROWS);
    const end = Math.min(source.rows, (chunk + 1) * CHUNK_ROWS);
    for (let from = chunk * CHUNK_ROWS; from < end; from += BLOCK_ROWS) {
      const rows = Math.min(BLOCK_ROWS, end - from);
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
  },
);

/** The rows of a block in column i, below the triangle of those before. */
function blockOf({ rows, values }: Columns, i: number): Float64Array {
  return values.subarray(i * rows + rows - BLOCK_ROWS, (i + 1) * rows);
}

function subtractMultiple(target: Float64Array, factor: number, values: Float64Array, rows: number): void {
  if (factor === 0) return;
  for (let t = 0; t < rows; t++) target[t] -= factor * values[t];
}

function triangleOf(stacked: Columns, n: number): Float64Array {
  const triangle = new Float64Array(n * n);
  for (let i = 0; i < n; i++) triangle.set(stacked.values.subarray(i * stacked.rows, i * stacked.rows + n), i * n);
  return triangle;
}
