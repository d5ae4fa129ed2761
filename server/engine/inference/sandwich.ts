import type { Columns } from "../estimation/columns.ts";
import { sandwichCovariance } from "../estimation/covariance.ts";
import type { Estimation } from "../estimation/estimation.ts";
import type { Solution } from "../estimation/minimise.ts";
import type { MomentSource } from "../estimation/moment-source.ts";
import { planReduction } from "../estimation/moments.ts";
import { planTiles } from "../estimation/monomial-plan.ts";
import { polling, type RunControl } from "../run.ts";
import {
  bytesOfClusterMoments,
  type ClusterMoments,
  clusterMoments,
  MOST_BYTES,
  scoresOfClusters,
} from "./cluster-moments.ts";
import { type ClusterCodes, clusterRows } from "./clustered-rows.ts";
import { meatOfClusters, meatOfRows, meatOfScores } from "./meat.ts";
import { type ScoreStructure, scoreStructure } from "./score-structure.ts";

/** Heteroskedasticity-robust covariance of θ̂ (k × k), G = T. `source` are the rows at θ̂. Errors: `Cancelled`. */
export function heteroskedasticCovariance(
  estimation: Estimation,
  solution: Solution,
  source: MomentSource,
  control: RunControl,
): number[][] {
  const meat = meatOfRows(source, scoresAt(estimation, solution), control);
  return sandwichCovariance(estimation, solution, meat, source.rows, polling(control, "forming covariances"));
}

/**
 * Cluster-robust covariance of θ̂ (k × k) from the clusters' own moments, kept for further specifications on the
 * same rows; where they would take too much memory, from one light pass that sums scores by cluster.
 *
 * Errors: `Cancelled`.
 */
export function clusteredCovariance(
  estimation: Estimation,
  solution: Solution,
  source: MomentSource,
  clusters: ClusterCodes & { readonly column: string },
  control: RunControl,
  mostBytes: number = MOST_BYTES,
): number[][] {
  const structure = scoresAt(estimation, solution);
  const { terms, local } = estimation.moments;
  // Terms that move with θ have moments of their own at every θ: there is nothing to keep.
  const moments = local ? undefined : momentsOfClusters(source, clusters, terms, control, mostBytes);
  const meat = moments
    ? meatOfScores(
        scoresOfClusters(source, moments, structure),
        estimation.form.free,
        polling(control, "forming scores"),
      )
    : passOverClusters(source, clusters, structure, control);
  return sandwichCovariance(estimation, solution, meat, clusters.count, polling(control, "forming covariances"));
}

function passOverClusters(
  source: MomentSource,
  clusters: ClusterCodes,
  structure: ScoreStructure,
  control: RunControl,
): Columns {
  const rows = clusterRows(source, clusters);
  return meatOfClusters(rows.source, rows.starts, structure, control);
}

/** The scores of the criterion the estimator ended with: e'V V'e. */
function scoresAt({ form, equations }: Estimation, { free, weight }: Solution): ScoreStructure {
  const { rows: g, values } = weight;
  const omega = equations.map((_, i) =>
    equations.map((__, j) => {
      let sum = 0;
      for (let k = 0; k < g; k++) sum += values[k * g + i] * values[k * g + j];
      return sum;
    }),
  );
  return scoreStructure(form, free, equations, omega);
}

/** By the moments' own terms, which all specifications on the same rows share. */
const kept = new WeakMap<Columns, { readonly column: string; readonly moments: ClusterMoments }>();

/** The clusters' own moments; undefined where they would take more memory than `mostBytes`. Errors: `Cancelled`. */
export function momentsOfClusters(
  source: MomentSource,
  clusters: ClusterCodes & { readonly column: string },
  key: Columns,
  control: RunControl,
  mostBytes: number = MOST_BYTES,
): ClusterMoments | undefined {
  const known = kept.get(key);
  if (known?.column === clusters.column && mostBytes === MOST_BYTES) return known.moments;
  const rows = clusterRows(source, clusters);
  const reduction = planReduction(rows.source, control);
  const tiles = planTiles(reduction.whitened, polling(control, "forming moments of clusters"));
  if (bytesOfClusterMoments(clusters.count, tiles) > mostBytes) return undefined;
  const moments = clusterMoments(rows, control, reduction, tiles);
  kept.set(key, { column: clusters.column, moments });
  return moments;
}
