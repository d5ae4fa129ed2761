import type { PreparedData } from "../../columns/prepared-data.ts";
import type { RunControl } from "../../run.ts";
import { type Columns, zeros } from "../columns.ts";
import { scaledCondition } from "../condition.ts";
import { whiteningOf } from "../find-whitening.ts";
import type { MomentSource, TermPair } from "../moment-source.ts";
import { BLOCK_ROWS, termBlock } from "../term-block.ts";
import { plainWhitening } from "../whitening.ts";

/** Log prices in columns that are not nearly collinear: ln p_j = means_j + Σ_{i≤j} u_i R_ij. */
export interface WhitenedPrices {
  /** Whether u are uncorrelated and of variance one; else they are the log prices themselves. */
  readonly whitened: boolean;
  /** u. */
  readonly columns: readonly Float64Array[];
  readonly means: Float64Array;
  /** R, n × n upper triangular. */
  readonly triangle: Columns;
}

/** Up to this condition number of the log prices, rounding times it is none to speak of. */
const WELL_CONDITIONED = 1000;

/**
 * Prices that move nearly as one, in columns that do not: a round of the exact form whose terms hold these keeps every
 * digit, where one over log prices of condition number κ moves coefficients by rounding times κ. Prices that are well
 * conditioned stay as they are, which keeps the equations sparse; so do those that are exact combinations of others,
 * whose coefficients only restrictions tell apart.
 *
 * Errors: `Cancelled`.
 */
export function whitenedPrices({ rows, logPrices, weights }: PreparedData, control: RunControl): WhitenedPrices {
  const source: MomentSource = {
    rows,
    columns: logPrices,
    columnLabels: logPrices.map(String),
    terms: [],
    responses: [],
    responseLabels: [],
  };
  const found = whiteningOf({ ...source, ...(weights && { weights }) }, control);
  const { shift, triangle } = found.whitening;
  if (found.dependent.length > 0 || scaledCondition(triangle) <= WELL_CONDITIONED) {
    const plain = plainWhitening(source);
    return { whitened: false, columns: logPrices, means: plain.shift, triangle: plain.triangle };
  }
  return { whitened: true, columns: columnsOf(source, shift, triangle), means: shift, triangle };
}

function columnsOf(source: MomentSource, shift: Float64Array, triangle: Columns): Float64Array[] {
  const terms: TermPair[] = source.columns.map((_, j) => [0, j + 1]);
  const { block, fill } = termBlock(source, { shift, triangle }, terms);
  const whitened = zeros(source.rows, terms.length);
  for (let from = 0; from < source.rows; from += BLOCK_ROWS) {
    const count = Math.min(BLOCK_ROWS, source.rows - from);
    fill(from, count);
    terms.forEach((_, j) => {
      whitened.values.set(block.subarray(j * BLOCK_ROWS, j * BLOCK_ROWS + count), j * source.rows + from);
    });
  }
  return terms.map((_, j) => whitened.values.subarray(j * source.rows, (j + 1) * source.rows));
}
