import { availableParallelism } from "node:os";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { accumulateMoments, estimateSystem, momentsRequest } from "../../server/engine/estimation/index.ts";
import { QUIET, type RunControl } from "../../server/engine/run.ts";
import { startThreads } from "../../server/engine/threads/start-threads.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { systemSpecification } from "../../shared/schemas/system.ts";
import { simulateShares } from "../support/simulated-shares.ts";
import { fastest, say } from "./timing.ts";

/**
 * A cluster bootstrap from prepared columns to intervals: 500 replicates of the exact AIDS, 8 goods, 1,000 clusters.
 * The reference is what 500 estimations from the rows would take, each with moments of its own.
 */
const CLUSTERS = 1000;
const REPLICATES = 500;

for (const rows of [20_000, 200_000]) benchBootstrap(rows);

function benchBootstrap(rows: number): void {
  const impose = ["homogeneity", "symmetry"] as const;
  const { data: plain } = simulateShares({
    form: "aids",
    goods: 8,
    rows,
    random: seededRandom(1),
    noise: 0.02,
    impose,
  });
  const village = Float64Array.from({ length: rows }, (_, t) => (t * 7) % CLUSTERS);
  const data: PreparedData = { ...plain, numeric: new Map([["village", village]]) };
  const cold = fastest(3, () => estimate(data, "conventional", QUIET));
  const place = {
    figure: "cluster bootstrap",
    form: "aids",
    goods: 8,
    rows,
    clusters: CLUSTERS,
    replicates: REPLICATES,
  };
  const reference = { cold500Ms: Math.round(REPLICATES * cold.ms), coldMs: cold.ms };
  for (const threads of new Set([1, availableParallelism()])) {
    const control: RunControl = threads === 1 ? QUIET : { ...QUIET, threads: startThreads(threads) };
    // Helpers start when first wanted; what is measured is a server that has them.
    if (threads > 1) estimate(data, { bootstrap: "clusters", cluster: "village", replicates: 100 }, control);
    const timing = fastest(1, () => estimate(data, { bootstrap: "clusters", cluster: "village" }, control));
    say({
      ...place,
      threads,
      ms: timing.ms,
      processorMs: timing.processorMs,
      ...reference,
      failed: timing.result.failed,
    });
  }
}

/** Everything anew: no moments are kept from one call to the next. */
function estimate(data: PreparedData, errors: unknown, control: RunControl) {
  const specification = systemSpecification.parse({
    kind: "system",
    data: "rows",
    form: "aids",
    impose: ["homogeneity", "symmetry"],
    "standard errors": errors,
  });
  const moments = accumulateMoments(data, momentsRequest(specification, data), control);
  const { bootstrap } = estimateSystem(specification, data, moments, control);
  return { failed: bootstrap?.failed ?? 0 };
}
