import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { accumulateMoments, estimateSystem, momentsRequest } from "../../server/engine/estimation/index.ts";
import { multiplyAccumulate } from "../../server/engine/estimation/multiply-accumulate.ts";
import { BLOCK_ROWS } from "../../server/engine/estimation/term-block.ts";
import { densePlan } from "../../server/engine/estimation/tile-plan.ts";
import { QUIET } from "../../server/engine/run.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { type SystemSpecification, systemSpecification } from "../../shared/schemas/system.ts";
import type { SystemName } from "../../shared/systems/names.ts";
import { simulateShares } from "../support/simulated-shares.ts";
import { fastest, say } from "./timing.ts";

/**
 * From prepared columns to coefficients, standard errors and Slutsky matrix, on one thread; then further
 * specifications on the same columns, which read no row again.
 */
const FORMS: readonly SystemName[] = ["aids", "la-aids", "les"];
const GOODS = 12;

for (const rows of [100_000, 1_000_000]) benchEstimation(GOODS, rows);

function benchEstimation(goods: number, rows: number): void {
  const { data } = simulateShares({
    form: "aids",
    goods,
    rows,
    random: seededRandom(1),
    noise: 0.02,
    impose: ["homogeneity", "symmetry"],
  });
  for (const form of FORMS) benchSystem(form, data);
}

function benchSystem(form: SystemName, data: PreparedData): void {
  const impose = form === "les" ? [] : ["homogeneity", "symmetry"];
  const specify = (change: object): SystemSpecification =>
    systemSpecification.parse({ kind: "system", data: "rows", form, impose, ...change });
  const first = specify({});
  const request = momentsRequest(first, data);
  const accumulation = fastest(3, () => accumulateMoments(data, request, QUIET));
  const moments = accumulation.result;
  const width = moments.terms.columns + moments.responses.columns;
  const reference = fastest(3, () => bareAccumulation(width, data.rows));
  const place = { figure: "estimation", form, goods: data.goods.length, rows: data.rows };
  say({
    ...place,
    what: "accumulation",
    ms: accumulation.ms,
    processorMs: accumulation.processorMs,
    width,
    bareProcessorMs: reference.processorMs,
    ratio: Math.round((100 * accumulation.processorMs) / reference.processorMs) / 100,
    bareMultiplyAddsPerSecond: Math.round((data.rows * width * (width + 1)) / 2 / (reference.processorMs / 1000)),
  });
  const whole = fastest(1, () => withMatrix(first, data, moments));
  say({
    ...place,
    what: "estimate with tests and matrix, first",
    ms: whole.ms,
    processorMs: whole.processorMs,
    ...whole.result.convergence,
  });
  for (const [what, change] of [
    ["iterated seemingly unrelated", { estimator: "iterated seemingly unrelated" }],
    ["another good dropped", { dropped: data.goods[0] }],
    ["seemingly unrelated", { estimator: "seemingly unrelated" }],
    ["unrestricted", { impose: [] }],
  ] as const) {
    const further = fastest(3, () => withMatrix(specify(change), data, moments));
    say({ ...place, what: `further specification: ${what}`, ms: further.ms, processorMs: further.processorMs });
  }
}

function withMatrix(
  specification: SystemSpecification,
  data: PreparedData,
  moments: ReturnType<typeof accumulateMoments>,
) {
  const estimate = estimateSystem(specification, data, moments, QUIET);
  const point = { prices: data.goods.map(() => 1), total: 1, demographics: [] };
  matrixAt(estimate.fitted, point, { priceScale: data.priceScale, totalScale: 1, pointName: "base point" });
  return estimate;
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
