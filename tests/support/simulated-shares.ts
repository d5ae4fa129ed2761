import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import type { Random } from "../../shared/numerics/random.ts";
import type { SystemSize } from "../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import type { PriceIndexName, RestrictionName, SystemName } from "../../shared/systems/names.ts";
import { priceIndexOf } from "../../shared/systems/price-indices.ts";
import { sampleData } from "./sample-findings.ts";

export interface Simulation {
  readonly form: SystemName;
  readonly goods: number;
  readonly rows: number;
  readonly random: Random;
  /** Standard deviation of the shares' errors. */
  readonly noise: number;
  readonly impose?: readonly RestrictionName[];
  readonly demographics?: number;
  readonly weighted?: boolean;
  readonly alpha0?: number;
  readonly index?: PriceIndexName;
  /** Columns of log prices, in place of independent normals. */
  readonly logPrices?: readonly Float64Array[];
}

/** Rows drawn from a demand system at random coefficients that satisfy the restrictions. */
export function simulateShares(simulation: Simulation): { data: PreparedData; theta: number[]; size: SystemSize } {
  const { form, goods: n, rows, random, noise } = simulation;
  const system = SYSTEMS[form];
  const normals = (scale: number) => Float64Array.from({ length: rows }, () => scale * random.normal());
  const logPrices = simulation.logPrices ?? Array.from({ length: n }, () => normals(0.25));
  const logTotal = normals(0.5);
  const demographics = Array.from({ length: simulation.demographics ?? 0 }, () => normals(1));
  const weights = simulation.weighted ? scaledToRows(normals(1).map((value) => Math.exp(0.5 * value))) : undefined;
  const base: SystemSize = { goods: n, demographics: demographics.length, alpha0: simulation.alpha0 ?? 0 };
  const free = system.free(base, simulation.impose ?? []);
  const start = system.start(
    base,
    Array.from({ length: n }, () => 1 / n),
  );
  const theta = free.offset.slice();
  const size = form === "les" ? 0.3 : 0.03;
  free.places.forEach((place, f) => {
    const value =
      start[place] +
      (form === "les" && place >= n * (1 + base.demographics) ? 0.02 : size / n) * (random.uniform() + 0.1);
    free.matrix.forEach((row, a) => {
      theta[a] += row[f] * value;
    });
  });
  const errors = errorsThatAddUp(n, rows, noise, random);
  const sharesAt = (at: SystemSize) => predicted(form, theta, at, logPrices, logTotal, demographics);
  let shares = form === "la-aids" ? [] : sharesAt(base);
  let last = base;
  if (form === "la-aids") {
    // Törnqvist's index holds the sample's mean shares, which are those of the shares it makes: a fixed point.
    let means = Array.from({ length: n }, () => 1 / n);
    for (let round = 0; round < 60; round++) {
      const name = simulation.index ?? "tornqvist";
      const flat = means.map((mean) => Float64Array.of(mean));
      last = {
        ...base,
        index: {
          ...priceIndexOf(name, flat, flat),
          name,
          meanPrices: priceIndexOf(name, logPrices, logPrices, weights).meanPrices,
          meanShares: means,
        },
      };
      shares = sharesAt(last);
      means = [...priceIndexOf(name, shares, logPrices, weights).meanShares];
    }
  }
  shares.forEach((share, i) => {
    for (let t = 0; t < rows; t++) share[t] += errors[i][t];
  });
  return {
    theta,
    size: last,
    data: {
      fingerprint: "0".repeat(64),
      goods: Array.from({ length: n }, (_, i) => `good ${i + 1}`),
      rows,
      rowNumbers: Int32Array.from({ length: rows }, (_, t) => t + 1),
      shares,
      logPrices: [...logPrices],
      logTotal,
      ...(weights && { weights }),
      numeric: new Map(demographics.map((column, k) => [`z${k + 1}`, column])),
      priceScale: logPrices.map(() => 1),
      totalScale: 1,
      finding: sampleData(),
    },
  };
}

function predicted(
  form: SystemName,
  theta: readonly number[],
  size: SystemSize,
  logPrices: readonly Float64Array[],
  logTotal: Float64Array,
  demographics: readonly Float64Array[],
): Float64Array[] {
  const evaluator = SYSTEMS[form].evaluator(theta, size);
  const shares = logPrices.map((column) => new Float64Array(column.length));
  for (let t = 0; t < logTotal.length; t++) {
    evaluator.at(
      logPrices.map((column) => column[t]),
      logTotal[t],
      demographics.map((column) => column[t]),
    );
    shares.forEach((share, i) => {
      share[t] = evaluator.shares[i];
    });
  }
  return shares;
}

/** Correlated normals that sum to zero over goods in every row. */
function errorsThatAddUp(goods: number, rows: number, noise: number, random: Random): Float64Array[] {
  const errors = Array.from({ length: goods }, () => new Float64Array(rows));
  for (let t = 0; t < rows; t++) {
    const common = random.normal();
    const drawn = errors.map((_, i) => noise * (1 + 0.2 * i) * (random.normal() + 0.3 * common));
    const mean = drawn.reduce((sum, value) => sum + value, 0) / goods;
    errors.forEach((column, i) => {
      column[t] = drawn[i] - mean;
    });
  }
  return errors;
}

function scaledToRows(weights: Float64Array): Float64Array {
  const sum = weights.reduce((total, weight) => total + weight, 0);
  return weights.map((weight) => (weight * weights.length) / sum);
}
