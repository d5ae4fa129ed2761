import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import type { Random } from "../../shared/numerics/random.ts";
import type { EasiSize, SystemSize } from "../../shared/systems/demand-system.ts";
import { easi } from "../../shared/systems/easi.ts";
import type { RestrictionName } from "../../shared/systems/names.ts";
import { sampleData } from "./sample-findings.ts";

export interface EasiSimulation {
  readonly goods: number;
  readonly rows: number;
  readonly random: Random;
  readonly noise: number;
  readonly easi: EasiSize;
  readonly impose?: readonly RestrictionName[];
  readonly demographics?: number;
  readonly weighted?: boolean;
  /** Columns of log prices, in place of independent normals. */
  readonly logPrices?: readonly Float64Array[];
  /** Columns that sum to zero over goods, in place of independent normals. */
  readonly errors?: readonly Float64Array[];
}

/**
 * Rows of a known EASI with errors: utility is drawn, shares are those of the cost function at it plus errors that sum
 * to nothing, and total expenditure is what that utility costs with them, ln x = ln C(p, u, z) + Σ e_i ln p_i, so that
 * implicit utility at the true θ is the utility drawn.
 */
export function simulateEasi(simulation: EasiSimulation): {
  data: PreparedData;
  theta: number[];
  size: SystemSize;
  utility: Float64Array;
} {
  const { goods: n, rows, random, noise, demographics: s = 0, impose = ["homogeneity", "symmetry"] } = simulation;
  const size: SystemSize = { goods: n, demographics: s, alpha0: 0, easi: simulation.easi };
  const normals = (scale: number) => Float64Array.from({ length: rows }, () => scale * random.normal());
  const free = easi.free(size, impose);
  const layout = easi.layout(size);
  const theta = free.offset.slice();
  free.places.forEach((place, f) => {
    const { block, column } = layout[place];
    const spread = block === "power" ? [0.04, 0.015, 0.004, 0.001, 0.0002, 0.00004][column!] : 0.04;
    const value = (block === "constant" ? 1 / n : 0) + spread * random.normal();
    free.matrix.forEach((row, a) => {
      theta[a] += row[f] * value;
    });
  });
  const logPrices = [...(simulation.logPrices ?? Array.from({ length: n }, () => normals(0.25)))];
  const utility = normals(0.5);
  const shifts = Array.from({ length: s }, () => normals(1));
  const shares = logPrices.map(() => new Float64Array(rows));
  const logTotal = new Float64Array(rows);
  if ("absent" in easi.cost) throw new Error("easi has a cost function");
  for (let t = 0; t < rows; t++) {
    const prices = logPrices.map((column) => Math.exp(column[t]));
    const z = shifts.map((column) => column[t]);
    const logCost = easi.cost.logCost(theta, size, utility[t], prices, z);
    const predicted = easi.slopes(theta, size, { prices, total: Math.exp(logCost), demographics: z }).shares;
    const errors = predicted.map((_, i) => simulation.errors?.[i][t] ?? noise * random.normal());
    const mean = errors.reduce((sum, error) => sum + error, 0) / n;
    logTotal[t] = logCost;
    predicted.forEach((share, i) => {
      shares[i][t] = share + errors[i] - mean;
      logTotal[t] += (errors[i] - mean) * logPrices[i][t];
    });
  }
  const heights = simulation.weighted ? normals(0.5).map(Math.exp) : undefined;
  const total = heights?.reduce((sum, height) => sum + height, 0);
  return {
    theta,
    size,
    utility,
    data: {
      fingerprint: "0".repeat(64),
      goods: Array.from({ length: n }, (_, i) => `good ${i + 1}`),
      rows,
      rowNumbers: Int32Array.from({ length: rows }, (_, t) => t + 1),
      shares,
      logPrices,
      logTotal,
      ...(heights && { weights: heights.map((height) => (height * rows) / total!) }),
      numeric: new Map(shifts.map((column, k) => [`z${k + 1}`, column])),
      priceScale: logPrices.map(() => 1),
      totalScale: 1,
      finding: sampleData(),
    },
  };
}
