import { pickRows } from "../../columns/pick-rows.ts";
import { momentMatrix } from "../../estimation/accumulate-sums.ts";
import type { MomentSource } from "../../estimation/moment-source.ts";
import { type Moments, momentsOfFactor, type ReductionPlan } from "../../estimation/moments.ts";
import { factorOfMoments, reflectedFactor, summedFactor } from "../../estimation/row-factors.ts";
import type { RunControl } from "../../run.ts";
import type { ClusterMoments } from "../cluster-moments.ts";
import { multiplicities } from "./sampling.ts";

/** What of a source finishing moments needs: everything but its rows. */
export function withoutRows(source: MomentSource): MomentSource {
  const empty = new Float64Array(0);
  return {
    ...source,
    rows: 0,
    columns: source.columns.map(() => empty),
    responses: source.responses.map(() => empty),
    ...(source.weights && { weights: empty }),
  };
}

/** With fewer rows for each column of the factor, sums of products would say less than the rows themselves. */
const ROWS_FOR_SUMS = 4;

/** Moments of the clusters drawn: sums of the clusters' own, no row is read again. Weights are scaled anew to sum to T. */
export function momentsOfClusters(header: MomentSource, clusters: ClusterMoments, drawn: Int32Array): Moments {
  const { width, reduction, tiles } = clusters;
  const sums = new Float64Array(width);
  let rows = 0;
  let weight = 0;
  multiplicities(drawn).forEach((times, g) => {
    if (times === 0) return;
    rows += times * clusters.sizes[g];
    weight += times * clusters.weights[g];
    const own = clusters.sums.subarray(g * width, (g + 1) * width);
    for (let k = 0; k < width; k++) sums[k] += times * own[k];
  });
  if (header.weights !== undefined) for (let k = 0; k < width; k++) sums[k] *= rows / weight;
  const factor = factorOfMoments(momentMatrix(tiles, sums), header.responses.length);
  return { ...momentsOfFactor(header, "", reduction, factor), rows };
}

/** Moments of the rows drawn, each with its weight as often as it was drawn; weights are scaled anew to sum to T. */
export function momentsOfRows(
  source: MomentSource,
  reduction: ReductionPlan,
  drawn: Int32Array,
  control: RunControl,
): Moments {
  const picked = drawnRows(source, drawn);
  const few = picked.rows < ROWS_FOR_SUMS * reduction.whitened.length;
  const reduce = few ? reflectedFactor : summedFactor;
  const factor = reduce(picked, reduction.whitening, reduction.whitened, control);
  const moments = momentsOfFactor(picked, "", reduction, factor);
  return { ...moments, rows: drawn.length, weighted: source.weights !== undefined };
}

/** The rows drawn, each once, with weights that say how often. */
export function drawnRows(source: MomentSource, drawn: Int32Array): MomentSource {
  const times = new Int32Array(source.rows);
  for (const row of drawn) times[row]++;
  const rows = Int32Array.from(times.keys()).filter((row) => times[row] > 0);
  const weights = Float64Array.from(rows, (row) => times[row] * (source.weights?.[row] ?? 1));
  const scale = source.weights === undefined ? 1 : drawn.length / weights.reduce((sum, weight) => sum + weight, 0);
  return {
    ...source,
    rows: rows.length,
    columns: source.columns.map((column) => pickRows(column, rows)),
    responses: source.responses.map((column) => pickRows(column, rows)),
    weights: weights.map((weight) => weight * scale),
  };
}
