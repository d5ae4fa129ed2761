import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { newColumn } from "../../server/engine/columns/shared-memory.ts";
import { accumulateMoments, estimateSystem, momentsRequest } from "../../server/engine/estimation/index.ts";
import { QUIET } from "../../server/engine/run.ts";
import { startThreads } from "../../server/engine/threads/start-threads.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { systemSpecification } from "../../shared/schemas/system.ts";
import type { SystemName } from "../../shared/systems/names.ts";
import { sampleData } from "./sample-findings.ts";

/**
 * Estimates a system of so many goods and rows on so many threads in a process of its own, and prints how much memory
 * that took at its peak beside the columns themselves: form, goods, rows, threads.
 */
const [form, goods, rows, threads] = process.argv.slice(2);
const data = columnsOf(Number(goods), Number(rows));
const impose = form === "les" ? [] : ["homogeneity", "symmetry"];
const specification = systemSpecification.parse({ kind: "system", data: "rows", form: form as SystemName, impose });
const count = Number(threads);
const control = count > 1 ? { ...QUIET, threads: startThreads(count) } : QUIET;
const columns = 8 * data.rows * (2 * data.goods.length + 1);
const before = process.memoryUsage.rss();
estimateSystem(specification, data, accumulateMoments(data, momentsRequest(specification, data), control), control);
const peak = process.resourceUsage().maxRSS * 1024;
process.stdout.write(`${JSON.stringify({ columns, before, peak })}\n`);

/** Shares near one over the number of goods that answer to nothing: what they cost in memory is what any would. */
function columnsOf(n: number, count: number): PreparedData {
  const random = seededRandom(3);
  const filled = (scale: number) => {
    const column = newColumn(count);
    for (let t = 0; t < count; t++) column[t] = scale * random.normal();
    return column;
  };
  const logPrices = Array.from({ length: n }, () => filled(0.25));
  const shares = Array.from({ length: n }, () => filled(0.02));
  for (let t = 0; t < count; t++) {
    let sum = 0;
    for (const share of shares) sum += share[t];
    for (const share of shares) share[t] += (1 - sum) / n;
  }
  return {
    fingerprint: "0".repeat(64),
    goods: shares.map((_, i) => `good ${i + 1}`),
    rows: count,
    rowNumbers: new Int32Array(count),
    shares,
    logPrices,
    logTotal: filled(0.5),
    numeric: new Map(),
    priceScale: shares.map(() => 1),
    totalScale: 1,
    finding: sampleData(),
  };
}
