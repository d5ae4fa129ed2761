import { Cancelled, type Poll, polling, type RunControl } from "../run.ts";
import { accumulateSums, momentMatrix } from "./accumulate-sums.ts";
import { type Columns, zeros } from "./columns.ts";
import { triangularFactor } from "./householder.ts";
import type { MomentSource, TermPair } from "./moment-source.ts";
import { planTiles } from "./monomial-plan.ts";
import { BLOCK_ROWS, termBlock } from "./term-block.ts";
import { semidefiniteCholesky } from "./triangle.ts";
import type { Whitening } from "./whitening.ts";

/** Relative to its own length squared, what is left of a column counts as rounding of the sums. */
const ROUNDING = 1e-13;

/**
 * The triangular factor of many rows: their second moments in one tiled pass, then Cholesky. Safe
 * because the columns are whitened.
 */
export function summedFactor(
  source: MomentSource,
  whitening: Whitening,
  terms: readonly TermPair[],
  control: RunControl,
): Columns {
  const poll = polling(control, "accumulating moments");
  const plan = planTiles(terms, poll);
  const range = { from: 0, to: source.rows };
  const sums = accumulateSums(source, whitening, terms, plan, range, control, (done) => done / source.rows);
  return factorOfMoments(momentMatrix(plan, sums), source.responses.length, poll);
}

/** The triangular factor of second moments of whitened terms and, after them, responses. */
export function factorOfMoments(matrix: Columns, responses: number, poll?: Poll): Columns {
  const { factor, dependent } = semidefiniteCholesky(matrix, ROUNDING, poll);
  // A response that the terms explain to rounding keeps residuals of that size, so that no variance is zero.
  for (const column of dependent) {
    if (column < matrix.columns - responses) continue;
    factor.values[column * factor.rows + column] = Math.sqrt(ROUNDING * matrix.values[column * matrix.rows + column]);
  }
  return factor;
}

/** The triangular factor of few rows, min(T, columns) × columns: reflections of the rows themselves. */
export function reflectedFactor(
  source: MomentSource,
  whitening: Whitening,
  terms: readonly TermPair[],
  control: RunControl,
): Columns {
  if (control.cancelled()) throw new Cancelled("cancelled while accumulating moments");
  const { block, fill } = termBlock(source, whitening, terms);
  const rows = zeros(source.rows, terms.length);
  for (let from = 0; from < source.rows; from += BLOCK_ROWS) {
    const count = Math.min(BLOCK_ROWS, source.rows - from);
    fill(from, count);
    for (let term = 0; term < terms.length; term++) {
      rows.values.set(block.subarray(term * BLOCK_ROWS, term * BLOCK_ROWS + count), term * source.rows + from);
    }
  }
  return triangularFactor(rows, polling(control, "accumulating moments"));
}
