import { type Random, seededRandom } from "../../../../shared/numerics/random.ts";

/**
 * What one replicate draws, with replacement: units 0 … `units` − 1 (rows, clusters, or rows by their residuals),
 * or blocks of consecutive places in the order of time. Plain data.
 */
export interface Sampling {
  readonly of: "rows" | "clusters" | "residuals" | "blocks";
  readonly seed: number;
  readonly units: number;
  /** Of blocks: periods in each, and the rows in the order of time. */
  readonly block?: number;
  readonly order?: Int32Array;
  /** Of residuals: running sums of the weights a residual is drawn with; absent where all are as likely. */
  readonly runningWeights?: Float64Array;
}

/**
 * The units that replicate number `replicate` (from 1) draws, `units` of them. Each replicate has a stream of its
 * own, so that draws depend neither on who draws first nor on how many do.
 */
export function draw(sampling: Sampling, replicate: number): Int32Array {
  const random = seededRandom(sampling.seed, replicate);
  if (sampling.of === "blocks") return drawBlocks(sampling, random);
  const { units, runningWeights } = sampling;
  const drawn = new Int32Array(units);
  for (let place = 0; place < units; place++) {
    drawn[place] = runningWeights === undefined ? random.integer(units) : placeOf(runningWeights, random.uniform());
  }
  return drawn;
}

/**
 * Moving blocks (Künsch 1989, Annals of Statistics 17): blocks of b consecutive periods, each of the T − b + 1
 * as likely, put one after another until T periods are filled; the last is cut short.
 */
function drawBlocks({ units, block = 1, order }: Sampling, random: Random): Int32Array {
  const drawn = new Int32Array(units);
  for (let place = 0; place < units; place += block) {
    const start = random.integer(units - block + 1);
    for (let step = 0; step < block && place + step < units; step++) {
      drawn[place + step] = order === undefined ? start + step : order[start + step];
    }
  }
  return drawn;
}

/** The first place whose running sum exceeds the fraction `at` of the whole. */
function placeOf(running: Float64Array, at: number): number {
  const wanted = at * running[running.length - 1];
  let low = 0;
  let high = running.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (running[middle] > wanted) high = middle;
    else low = middle + 1;
  }
  return low;
}

/** How often each unit was drawn. */
export function multiplicities(drawn: Int32Array): Int32Array {
  const counts = new Int32Array(drawn.length);
  for (const unit of drawn) counts[unit]++;
  return counts;
}

/** ⌈T^{1/3}⌉, the length of a block unless one is given. */
export function defaultBlock(periods: number): number {
  return Math.max(2, Math.ceil(Math.cbrt(periods) - 1e-9));
}
