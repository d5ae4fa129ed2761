import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import type { Random } from "../../shared/numerics/random.ts";
import { rotterdam } from "../../shared/systems/rotterdam.ts";
import { sampleData } from "./sample-findings.ts";

/**
 * Periods in which the Rotterdam system holds with the errors given, those of the first period aside:
 *
 *     w̄_it Δln q_it = θ_i Δln Q_t + Σ_j π_ij Δln p_jt + e_it
 *
 * Volume and log prices are drawn as levels that do not wander, and quantities are those whose contributions to volume
 * are the right-hand sides: w̄ holds the shares of the period itself, a fixed point found by iteration.
 */
export function simulateRotterdam(logPrices: readonly Float64Array[], errors: readonly Float64Array[], random: Random) {
  const n = logPrices.length;
  const rows = logPrices[0].length;
  const size = { goods: n, demographics: 0, alpha0: 0 };
  const free = rotterdam.free(size, ["homogeneity", "symmetry"]);
  const layout = rotterdam.layout(size);
  const theta = free.offset.slice();
  free.places.forEach((place, f) => {
    const { block, good, column } = layout[place];
    // Near equal shares that neither prices nor volume move: else they wander, as nothing but changes is explained.
    const value = block === "marginal" ? 1 / n : 1 / n ** 2 - (good === column ? 1 / n : 0);
    const drawn = value + 0.01 * random.normal();
    free.matrix.forEach((row, a) => {
      theta[a] += row[f] * drawn;
    });
  });
  const volume = Float64Array.from({ length: rows }, () => 0.15 * random.normal());
  const shares = logPrices.map(() => new Float64Array(rows).fill(1 / n));
  const logTotal = new Float64Array(rows);
  for (let t = 1; t < rows; t++) {
    const changes = logPrices.map((column) => column[t] - column[t - 1]);
    const contributions = changes.map((_, i) =>
      changes.reduce(
        (sum, change, j) => sum + theta[n + i * n + j] * change,
        theta[i] * (volume[t] - volume[t - 1]) + errors[i][t],
      ),
    );
    const before = shares.map((share) => share[t - 1]);
    const now = nextPeriod(before, contributions, changes);
    now.shares.forEach((share, i) => {
      shares[i][t] = share;
    });
    logTotal[t] = logTotal[t - 1] + now.total;
  }
  const data: PreparedData = {
    fingerprint: "0".repeat(64),
    goods: Array.from({ length: n }, (_, i) => `good ${i + 1}`),
    rows,
    rowNumbers: Int32Array.from({ length: rows }, (_, t) => t + 1),
    shares,
    logPrices: [...logPrices],
    logTotal,
    time: Float64Array.from({ length: rows }, (_, t) => t + 1),
    numeric: new Map(),
    priceScale: logPrices.map(() => 1),
    totalScale: 1,
    finding: sampleData(),
  };
  return { data, theta };
}

/** Shares and the change of ln x with w̄_i Δln q_i = c_i, where w̄ is the mean of the shares before and now. */
function nextPeriod(before: readonly number[], contributions: readonly number[], changes: readonly number[]) {
  let shares = [...before];
  let total = 0;
  for (let round = 0; round < 60; round++) {
    const spent = before.map((share, i) => share * Math.exp((2 * contributions[i]) / (share + shares[i]) + changes[i]));
    const sum = spent.reduce((whole, value) => whole + value, 0);
    total = Math.log(sum);
    shares = spent.map((value) => value / sum);
  }
  return { shares, total };
}
