import { availableParallelism } from "node:os";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { onSharedMemory } from "../../server/engine/columns/shared-memory.ts";
import { accumulateMoments, estimateSystem, momentsRequest } from "../../server/engine/estimation/index.ts";
import { multiplyAccumulate } from "../../server/engine/estimation/multiply-accumulate.ts";
import { BLOCK_ROWS } from "../../server/engine/estimation/term-block.ts";
import { densePlan } from "../../server/engine/estimation/tile-plan.ts";
import { QUIET, type RunControl } from "../../server/engine/run.ts";
import { startThreads } from "../../server/engine/threads/start-threads.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { type SystemSpecification, systemSpecification } from "../../shared/schemas/system.ts";
import type { SystemName } from "../../shared/systems/names.ts";
import { simulateShares } from "../support/simulated-shares.ts";
import { fastest, say } from "./timing.ts";

/**
 * From prepared columns to coefficients, standard errors and Slutsky matrix, on one thread and on as many as there
 * are; then further specifications on the same columns, which read no row again, the first of each and the fastest.
 */
const FORMS: readonly SystemName[] = ["aids", "la-aids", "les"];
const GOODS = 12;
const THREADS = availableParallelism();
const THREADED: RunControl = { ...QUIET, threads: startThreads(THREADS) };
/** What the whole way may take at a million rows, by the clock. */
const MOST_MS: Partial<Record<SystemName, number>> = { aids: 4000, "la-aids": 1500 };
const MOST_FURTHER_MS = 100;

for (const rows of [100_000, 1_000_000]) benchEstimation(GOODS, rows);
benchMovingTerms(GOODS, 100_000);

function benchEstimation(goods: number, rows: number): void {
  const simulated = simulateShares({
    form: "aids",
    goods,
    rows,
    random: seededRandom(1),
    noise: 0.02,
    impose: ["homogeneity", "symmetry"],
  });
  const data = onSharedColumns(simulated.data);
  for (const form of FORMS) benchSystem(form, data);
}

/** As a data cell leaves them. */
function onSharedColumns(data: PreparedData): PreparedData {
  const [shares, logPrices] = [data.shares, data.logPrices].map((columns) => columns.map(onSharedMemory));
  return { ...data, shares, logPrices, logTotal: onSharedMemory(data.logTotal) };
}

/** QUAIDS reads the rows in every iteration: with tests and matrix, at most ten seconds. */
function benchMovingTerms(goods: number, rows: number): void {
  const impose = ["homogeneity", "symmetry"] as const;
  const made = simulateShares({ form: "quaids", goods, rows, random: seededRandom(1), noise: 0.02, impose });
  const data = onSharedColumns(made.data);
  const specification = systemSpecification.parse({ kind: "system", data: "rows", form: "quaids", impose });
  for (const [threads, control] of [
    [1, QUIET],
    [THREADS, THREADED],
  ] as const) {
    const whole = fastest(1, () => wholeWay(specification, data, control));
    say({
      figure: "estimation",
      form: "quaids",
      goods,
      rows,
      threads,
      what: "from columns to matrix",
      ms: whole.ms,
      processorMs: whole.processorMs,
      atMostMs: 10_000,
    });
  }
}

function wholeWay(specification: SystemSpecification, data: PreparedData, control: RunControl) {
  return withMatrix(
    specification,
    data,
    accumulateMoments(data, momentsRequest(specification, data), control),
    control,
  );
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
  fastest(1, () => accumulateMoments(data, request, THREADED));
  const divided = fastest(3, () => accumulateMoments(data, request, THREADED));
  say({ ...place, what: "accumulation", threads: THREADS, ms: divided.ms, processorMs: divided.processorMs });
  const most = data.rows === 1_000_000 && MOST_MS[form] !== undefined ? { atMostMs: MOST_MS[form] } : {};
  for (const [threads, control] of [
    [1, QUIET],
    [THREADS, THREADED],
  ] as const) {
    const way = fastest(2, () => wholeWay(first, data, control));
    say({ ...place, what: "from columns to matrix", threads, ms: way.ms, processorMs: way.processorMs, ...most });
  }
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
    const cold = fastest(1, () => withMatrix(specify(change), data, moments));
    const further = fastest(5, () => withMatrix(specify(change), data, moments));
    say({
      ...place,
      what: `further specification: ${what}`,
      firstMs: cold.ms,
      firstProcessorMs: cold.processorMs,
      ms: further.ms,
      processorMs: further.processorMs,
      atMostMs: MOST_FURTHER_MS,
    });
  }
}

function withMatrix(
  specification: SystemSpecification,
  data: PreparedData,
  moments: ReturnType<typeof accumulateMoments>,
  control: RunControl = QUIET,
) {
  const estimate = estimateSystem(specification, data, moments, control);
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
