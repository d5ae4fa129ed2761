import { Cancelled, type RunControl } from "../run.ts";
import { type Columns, zeros } from "./columns.ts";
import type { MomentSource, TermPair } from "./moment-source.ts";
import { multiplyAccumulate } from "./multiply-accumulate.ts";
import { BLOCK_ROWS, termBlock } from "./term-block.ts";
import type { TilePlan } from "./tile-plan.ts";
import type { Whitening } from "./whitening.ts";

/** Rows between two looks at `cancelled()`: a few tens of milliseconds. */
const CHUNK_ROWS = 64 * BLOCK_ROWS;

export interface RowRange {
  readonly from: number;
  readonly to: number;
}

/**
 * The plan's weighted sums of products over a range of rows. Sums of disjoint ranges add up to those
 * of their union. Each chunk is summed by itself and added with compensation (Neumaier 1974), so the
 * error does not grow with the number of rows and hardly depends on how they are divided.
 */
export function accumulateSums(
  source: MomentSource,
  whitening: Whitening,
  terms: readonly TermPair[],
  plan: TilePlan,
  range: RowRange,
  control: RunControl,
  fraction: (rowsDone: number) => number,
): Float64Array {
  const { block, fill } = termBlock(source, whitening, terms);
  const totals = new Float64Array(plan.tiles * 16);
  const lost = new Float64Array(totals.length);
  const sums = new Float64Array(totals.length);
  for (let chunk = range.from; chunk < range.to; chunk += CHUNK_ROWS) {
    if (control.cancelled()) throw new Cancelled("cancelled while accumulating moments");
    const end = Math.min(chunk + CHUNK_ROWS, range.to);
    sums.fill(0);
    for (let from = chunk; from < end; from += BLOCK_ROWS) {
      const rows = Math.min(BLOCK_ROWS, end - from);
      fill(from, rows);
      multiplyAccumulate(block, BLOCK_ROWS, rows, plan, sums);
    }
    addCompensated(totals, lost, sums);
    control.progress({ step: "accumulating moments", fraction: fraction(end - range.from) });
  }
  for (let k = 0; k < totals.length; k++) totals[k] += lost[k];
  return totals;
}

function addCompensated(totals: Float64Array, lost: Float64Array, sums: Float64Array): void {
  for (let k = 0; k < totals.length; k++) {
    const total = totals[k] + sums[k];
    lost[k] += Math.abs(totals[k]) >= Math.abs(sums[k]) ? totals[k] - total + sums[k] : sums[k] - total + totals[k];
    totals[k] = total;
  }
}

/** The symmetric matrix of second moments of `terms`, from the sums of the plan. */
export function momentMatrix(plan: TilePlan, sums: Float64Array): Columns {
  const matrix = zeros(plan.columns, plan.columns);
  for (let i = 0; i < plan.columns; i++) {
    for (let j = i; j < plan.columns; j++) {
      const value = sums[plan.placeOf[i * plan.columns + j]];
      matrix.values[j * plan.columns + i] = value;
      matrix.values[i * plan.columns + j] = value;
    }
  }
  return matrix;
}
