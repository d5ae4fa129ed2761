import { momentMatrix } from "../estimation/accumulate-sums.ts";
import { type Columns, columnOf, multiply, zeros } from "../estimation/columns.ts";
import type { MomentSource } from "../estimation/moment-source.ts";
import { planReduction, type ReductionPlan, termMap } from "../estimation/moments.ts";
import { planTiles } from "../estimation/monomial-plan.ts";
import { multiplyAccumulate } from "../estimation/multiply-accumulate.ts";
import { BLOCK_ROWS, termBlock } from "../estimation/term-block.ts";
import type { TilePlan } from "../estimation/tile-plan.ts";
import { Cancelled, type RunControl } from "../run.ts";
import type { ClusteredRows } from "./clustered-rows.ts";
import type { Combination, ScoreStructure } from "./score-structure.ts";

/**
 * The second moments of every cluster's rows: all that scores by cluster, and draws of clusters, need of the rows.
 * Those of cluster g are the sums of the tile plan, from g·`width`; products of whitened terms and responses.
 */
export interface ClusterMoments {
  readonly reduction: ReductionPlan;
  readonly tiles: TilePlan;
  readonly width: number;
  readonly sums: Float64Array;
  /** Rows of each cluster. */
  readonly sizes: Int32Array;
  /** Sum of each cluster's weights; its size where rows weigh the same. */
  readonly weights: Float64Array;
}

/** The most memory that clusters' moments may take; beyond it scores are summed by cluster in a pass of their own. */
export const MOST_BYTES = 64 * 1024 * 1024;

/** Bytes that the moments of so many clusters take. */
export function bytesOfClusterMoments(clusters: number, { tiles }: TilePlan): number {
  return 8 * 16 * tiles * clusters;
}

/** One pass over rows that stand cluster by cluster. Errors: `Cancelled`. */
export function clusterMoments(
  { source, starts }: ClusteredRows,
  control: RunControl,
  reduction: ReductionPlan = planReduction(source, control),
  tiles: TilePlan = planTiles(reduction.whitened),
): ClusterMoments {
  const clusters = starts.length - 1;
  const width = 16 * tiles.tiles;
  // Threads that estimate replicates read the same sums.
  const sums = new Float64Array(new SharedArrayBuffer(8 * clusters * width));
  const weights = new Float64Array(clusters);
  const { block, fill } = termBlock(source, reduction.whitening, reduction.whitened);
  for (let cluster = 0; cluster < clusters; cluster++) {
    if (control.cancelled()) throw new Cancelled("cancelled while accumulating the moments of clusters");
    const own = sums.subarray(cluster * width, (cluster + 1) * width);
    for (let from = starts[cluster]; from < starts[cluster + 1]; from += BLOCK_ROWS) {
      const rows = Math.min(BLOCK_ROWS, starts[cluster + 1] - from);
      fill(from, rows);
      multiplyAccumulate(block, BLOCK_ROWS, rows, tiles, own);
      for (let t = from; t < from + rows; t++) weights[cluster] += source.weights?.[t] ?? 1;
    }
    if (cluster % 64 === 0) {
      control.progress({ step: "accumulating the moments of clusters", fraction: starts[cluster] / source.rows });
    }
  }
  const sizes = Int32Array.from({ length: clusters }, (_, cluster) => starts[cluster + 1] - starts[cluster]);
  return { reduction, tiles, width, sums, sizes, weights };
}

/** Σ_{t in cluster} h_t s_t of every cluster as a contraction of its moments, G vectors of F. */
export function scoresOfClusters(source: MomentSource, clusters: ClusterMoments, structure: ScoreStructure) {
  const { whitening, whitened } = clusters.reduction;
  const terms = whitened.slice(0, whitened.length - source.responses.length);
  const map = termMap(source.terms, terms, whitening);
  const lifted = liftedResiduals(
    structure,
    map,
    whitening.shift.subarray(source.columns.length),
    terms.length,
    whitened.length,
  );
  return Array.from(clusters.sizes, (_, g) => {
    const own = clusters.sums.subarray(g * clusters.width, (g + 1) * clusters.width);
    // Columns: Z̃'e of each equation, then Z'e.
    const products = multiply(momentRows(clusters.tiles, own, terms.length), lifted);
    return contracted(structure, products, map);
  });
}

/** Rows of a moment matrix that belong to terms: |Z̃| × (|Z̃| + n). */
function momentRows(plan: TilePlan, sums: Float64Array, terms: number): Columns {
  const all = momentMatrix(plan, sums);
  const rows = zeros(terms, plan.columns);
  for (let j = 0; j < plan.columns; j++) columnOf(rows, j).set(columnOf(all, j).subarray(0, terms));
  return rows;
}

/** e_i as a combination of whitened terms and shifted responses: w̃_i + shift_i − (C map')_i Z̃. */
function liftedResiduals(
  { equations, coefficients }: ScoreStructure,
  map: Columns,
  shift: Float64Array,
  terms: number,
  all: number,
): Columns {
  const lifted = zeros(all, equations.length);
  equations.forEach((equation, i) => {
    const column = columnOf(lifted, i);
    column[terms + equation] = 1;
    column[0] += shift[equation];
    for (let z = 0; z < map.columns; z++) {
      const factor = coefficients[i][z];
      if (factor === 0) continue;
      const offset = z * map.rows;
      for (let r = 0; r < map.rows; r++) column[r] -= factor * map.values[offset + r];
    }
  });
  return lifted;
}

function contracted({ weighting, mixes, sums, scores }: ScoreStructure, products: Columns, map: Columns): Float64Array {
  const terms = zeros(map.columns, products.columns);
  for (let i = 0; i < products.columns; i++) {
    const from = columnOf(products, i);
    const target = columnOf(terms, i);
    for (let z = 0; z < map.columns; z++) {
      const offset = z * map.rows;
      let sum = 0;
      for (let r = 0; r < map.rows; r++) sum += map.values[offset + r] * from[r];
      target[z] = sum;
    }
  }
  const score = new Float64Array(scores.length);
  const combined = (columns: readonly Float64Array[], parts: Combination) => {
    const column = new Float64Array(map.columns);
    for (const [i, factor] of parts) {
      for (let z = 0; z < column.length; z++) column[z] += factor * columns[i][z];
    }
    return column;
  };
  const residuals = weighting.map((_, i) => columnOf(terms, i));
  const weighted = weighting.map((row) =>
    combined(
      residuals,
      row.map((factor, i) => [i, factor] as const),
    ),
  );
  const mixed = mixes.map((mix) => combined(weighted, mix));
  scores.forEach((pairs, f) => {
    for (const [mix, sum] of pairs) for (const [z, factor] of sums[sum]) score[f] += factor * mixed[mix][z];
  });
  return score;
}
