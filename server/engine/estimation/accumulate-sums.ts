import { onSharedMemory } from "../columns/shared-memory.ts";
import { Cancelled, type RunControl } from "../run.ts";
import { mapInOrder, task } from "../threads/map-in-order.ts";
import { type Columns, zeros } from "./columns.ts";
import type { MomentSource, TermPair } from "./moment-source.ts";
import { multiplyAccumulate } from "./multiply-accumulate.ts";
import { BLOCK_ROWS, termBlock } from "./term-block.ts";
import type { TilePlan } from "./tile-plan.ts";
import type { Whitening } from "./whitening.ts";

/** Rows summed by themselves: a few tens of milliseconds. What is summed with what depends on nothing else. */
const CHUNK_ROWS = 64 * BLOCK_ROWS;
/** Numbers that sums of chunks may take up at a time, 64 MB: they are added up in the order of the rows. */
const MOST_NUMBERS = 8 * 2 ** 20;

export interface RowRange {
  readonly from: number;
  readonly to: number;
}

/**
 * The plan's weighted sums of products over a range of rows. Sums of disjoint ranges add up to those
 * of their union. Each chunk is summed by itself, on whichever thread, and the chunks are added in the order of
 * the rows with compensation (Neumaier 1974, Zeitschrift für Angewandte Mathematik und Mechanik 54), so the error
 * does not grow with the number of rows, and the sums are the same to the last bit on any number of threads.
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
  const size = plan.tiles * 16;
  const { threads, ...alone } = control;
  const worthIt = threads !== undefined && (range.to - range.from) * size >= threads.worthDividing;
  const divided = worthIt && threads.count > 1;
  const totals = new Float64Array(size);
  const lost = new Float64Array(size);
  const together = divided ? Math.max(2 * threads.count, Math.floor(MOST_NUMBERS / size)) : 1;
  const chunks = chunksOf(range);
  const rows: Rows = { source: divided ? onSharedColumns(source) : source, whitening, terms, plan };
  for (let done = 0; done < chunks.length; done += together) {
    const wave = chunks.slice(done, done + together);
    const report = (finished: number) => {
      const rowsDone = Math.min((done + finished) * CHUNK_ROWS, range.to - range.from);
      control.progress({ step: "accumulating moments", fraction: fraction(rowsDone) });
    };
    const sums = mapInOrder(divided ? control : alone, sumChunk, rows, wave, report);
    for (const ofChunk of sums) addCompensated(totals, lost, ofChunk);
  }
  for (let k = 0; k < totals.length; k++) totals[k] += lost[k];
  return totals;
}

function chunksOf({ from, to }: RowRange): RowRange[] {
  const chunks: RowRange[] = [];
  for (let at = from; at < to; at += CHUNK_ROWS) chunks.push({ from: at, to: Math.min(at + CHUNK_ROWS, to) });
  return chunks;
}

interface Rows {
  readonly source: MomentSource;
  readonly whitening: Whitening;
  readonly terms: readonly TermPair[];
  readonly plan: TilePlan;
}

/** The sums of one chunk of rows. */
export const sumChunk = task(
  import.meta.url,
  "sumChunk",
  ({ source, whitening, terms, plan }: Rows, { from: first, to }: RowRange, control) => {
    const { block, fill } = termBlock(source, whitening, terms);
    const sums = new Float64Array(plan.tiles * 16);
    for (let from = first; from < to; from += BLOCK_ROWS) {
      if (control.cancelled()) throw new Cancelled("cancelled while accumulating moments");
      const rows = Math.min(BLOCK_ROWS, to - from);
      fill(from, rows);
      multiplyAccumulate(block, BLOCK_ROWS, rows, plan, sums);
    }
    return sums;
  },
);

/** What a pass over the rows needs of a source: its columns, where other threads see them too. */
export function onSharedColumns({ rows, columns, responses, weights }: MomentSource): MomentSource {
  return {
    rows,
    columns: columns.map(onSharedMemory),
    columnLabels: [],
    terms: [],
    responses: responses.map(onSharedMemory),
    responseLabels: [],
    ...(weights && { weights: onSharedMemory(weights) }),
  };
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
