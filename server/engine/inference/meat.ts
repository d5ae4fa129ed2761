import { momentMatrix } from "../estimation/accumulate-sums.ts";
import { type Columns, zeros } from "../estimation/columns.ts";
import type { MomentSource } from "../estimation/moment-source.ts";
import { multiplyAccumulate } from "../estimation/multiply-accumulate.ts";
import { BLOCK_ROWS } from "../estimation/term-block.ts";
import { densePlan } from "../estimation/tile-plan.ts";
import { Cancelled, type Poll, type RunControl } from "../run.ts";
import { rowScores } from "./row-scores.ts";
import type { ScoreStructure } from "./score-structure.ts";

/** Sums outer products of scores handed over a block at a time: B = Σ s s', F × F. */
class OuterProducts {
  private readonly plan;
  private readonly sums;

  constructor(free: number) {
    this.plan = densePlan(free);
    this.sums = new Float64Array(this.plan.tiles * 16);
  }

  add(scores: Float64Array, count: number): void {
    multiplyAccumulate(scores, BLOCK_ROWS, count, this.plan, this.sums);
  }

  /** Errors: `RangeError` for a score that is no number, which a covariance would take for no variance. */
  matrix(): Columns {
    if (!this.sums.every(Number.isFinite)) throw new RangeError("a score is not a finite number");
    return this.plan.columns === 0 ? zeros(0, 0) : momentMatrix(this.plan, this.sums);
  }
}

/** Σ_t h_t² s_t s_t', one light pass over the rows. Errors: `Cancelled`. */
export function meatOfRows(source: MomentSource, structure: ScoreStructure, control: RunControl): Columns {
  const { scores, fill } = rowScores(source, structure);
  const products = new OuterProducts(structure.scores.length);
  for (let from = 0; from < source.rows; from += BLOCK_ROWS) {
    report(from, source.rows, control);
    const rows = Math.min(BLOCK_ROWS, source.rows - from);
    fill(from, rows);
    products.add(scores, rows);
  }
  return products.matrix();
}

/**
 * Σ_g s_g s_g' with s_g the sum of a cluster's weighted scores, one light pass over rows that stand cluster by
 * cluster: cluster g has those from `starts[g]` to before `starts[g + 1]`. Errors: `Cancelled`.
 */
export function meatOfClusters(
  source: MomentSource,
  starts: Int32Array,
  structure: ScoreStructure,
  control: RunControl,
): Columns {
  const free = structure.scores.length;
  const { scores, fill } = rowScores(source, structure);
  const products = new OuterProducts(free);
  const finished = new Float64Array(free * BLOCK_ROWS);
  let cluster = 0;
  for (let from = 0; from < source.rows; from += BLOCK_ROWS) {
    report(from, source.rows, control);
    const end = Math.min(from + BLOCK_ROWS, source.rows);
    fill(from, end - from);
    for (let t = from; t < end; ) {
      const until = Math.min(end, starts[cluster + 1]);
      addRows(finished, cluster % BLOCK_ROWS, scores, t - from, until - from, free);
      t = until;
      if (t < starts[cluster + 1]) continue;
      cluster++;
      if (cluster % BLOCK_ROWS > 0) continue;
      products.add(finished, BLOCK_ROWS);
      finished.fill(0);
    }
  }
  products.add(finished, cluster % BLOCK_ROWS);
  return products.matrix();
}

/** Adds rows `from` … `until` of the scores to column `place` of the sums. */
function addRows(
  sums: Float64Array,
  place: number,
  scores: Float64Array,
  from: number,
  until: number,
  free: number,
): void {
  for (let f = 0; f < free; f++) {
    const offset = f * BLOCK_ROWS;
    let sum = 0;
    for (let t = from; t < until; t++) sum += scores[offset + t];
    sums[offset + place] += sum;
  }
}

/** Σ_g s_g s_g' of scores given as G × F rows. */
export function meatOfScores(scores: readonly Float64Array[], free: number, poll: Poll = () => {}): Columns {
  const products = new OuterProducts(free);
  const block = new Float64Array(free * BLOCK_ROWS);
  scores.forEach((score, g) => {
    score.forEach((value, f) => {
      block[f * BLOCK_ROWS + (g % BLOCK_ROWS)] = value;
    });
    if ((g + 1) % BLOCK_ROWS !== 0) return;
    poll();
    products.add(block, BLOCK_ROWS);
  });
  products.add(block, scores.length % BLOCK_ROWS);
  return products.matrix();
}

function report(done: number, rows: number, control: RunControl): void {
  if (control.cancelled()) throw new Cancelled("cancelled while forming scores");
  if ((done / BLOCK_ROWS) % 64 !== 0) return;
  control.progress({ step: "forming scores", fraction: done / rows });
}
