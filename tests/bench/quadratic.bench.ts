import { availableParallelism } from "node:os";
import { accumulateMoments, estimateSystem, momentsRequest } from "../../server/engine/estimation/index.ts";
import { locatable } from "../../server/engine/estimation/local-moments.ts";
import { multiplyAccumulate } from "../../server/engine/estimation/multiply-accumulate.ts";
import { sizeOf } from "../../server/engine/estimation/request.ts";
import { BLOCK_ROWS } from "../../server/engine/estimation/term-block.ts";
import { densePlan } from "../../server/engine/estimation/tile-plan.ts";
import { QUIET, type RunControl } from "../../server/engine/run.ts";
import { startThreads } from "../../server/engine/threads/start-threads.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { systemSpecification } from "../../shared/schemas/system.ts";
import type { RestrictionName } from "../../shared/systems/names.ts";
import { quaids } from "../../shared/systems/quaids.ts";
import { simulateShares } from "../support/simulated-shares.ts";
import { fastest, say } from "./timing.ts";

/**
 * The quadratic almost ideal system, whose terms move with its coefficients: from prepared columns to coefficients,
 * standard errors, tests and Slutsky matrix, one pass over the rows an iteration. Beside it one pass, and all
 * products of as many columns over as many rows, each pair once.
 */
const IMPOSE: RestrictionName[] = ["homogeneity", "symmetry"];
const SHAPE = { goods: 12, rows: 100_000 };
const { data, theta } = simulateShares({
  ...SHAPE,
  form: "quaids",
  random: seededRandom(1),
  noise: 0.02,
  impose: IMPOSE,
});
const specification = systemSpecification.parse({ kind: "system", data: "rows", form: "quaids", impose: IMPOSE });
const request = momentsRequest(specification, data);

function whole(control: RunControl) {
  const estimate = estimateSystem(specification, data, accumulateMoments(data, request, control), control);
  const point = { prices: data.goods.map(() => 1), total: 1, demographics: [] };
  matrixAt(estimate.fitted, point, { priceScale: data.priceScale, totalScale: 1, pointName: "base point" });
  return estimate;
}

const nearby = accumulateMoments(data, request, QUIET);
const local = locatable(nearby, data, request, quaids.moments, sizeOf(specification, data)).local!;
let nudge = 0;
const pass = fastest(2, () =>
  local.at(
    theta.map((value) => value * (1 + 1e-6 * nudge++)),
    QUIET,
  ),
);
const { terms, responses } = pass.result;
const bare = fastest(2, () => bareAccumulation(terms.columns + responses.columns, data.rows));
for (const threads of new Set([1, availableParallelism()])) {
  const control: RunControl = threads === 1 ? QUIET : { ...QUIET, threads: startThreads(threads) };
  const { ms, processorMs, result } = fastest(1, () => whole(control));
  const { iterations, condition } = result.convergence;
  say({
    figure: "estimation",
    form: "quaids",
    ...SHAPE,
    what: "from columns to coefficients, standard errors, tests and matrix",
    threads,
    ms,
    processorMs,
    iterations,
    condition,
    terms: terms.columns,
    passProcessorMs: pass.processorMs,
    bareProcessorMs: bare.processorMs,
    ratio: Math.round((100 * pass.processorMs) / bare.processorMs) / 100,
  });
}

/** All products of `width` columns, each pair once, over as many rows, from a block that stays in the cache. */
function bareAccumulation(width: number, rows: number): number {
  const block = new Float64Array(width * BLOCK_ROWS).map((_, k) => (k % 17) / 17 - 0.5);
  const plan = densePlan(width);
  const sums = new Float64Array(plan.tiles * 16);
  for (let from = 0; from < rows; from += BLOCK_ROWS) {
    multiplyAccumulate(block, BLOCK_ROWS, Math.min(BLOCK_ROWS, rows - from), plan, sums);
  }
  return sums[0];
}
