import { describe, expect, it } from "vitest";
import { prepareData } from "../../server/engine/columns/prepare.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { dataSpecification } from "../../shared/schemas/data.ts";
import { estimated, largestDifference } from "../support/estimating.ts";
import { inPeriods } from "../support/periods.ts";
import { simulateShares } from "../support/simulated-shares.ts";

const BOTH = ["homogeneity", "symmetry"];

/** Prices and quantities as columns of an upload in other units, and what a data cell makes of them. */
function uploaded(data: PreparedData, priceUnits: readonly number[], money: number, normalise: string): PreparedData {
  const columns = data.goods.flatMap((_, i) => [
    {
      name: `p${i}`,
      type: "number" as const,
      values: data.logPrices[i].map((value) => Math.exp(value) * priceUnits[i] * money),
    },
    {
      name: `q${i}`,
      type: "number" as const,
      values: data.shares[i].map(
        (share, t) => (share * Math.exp(data.logTotal[t] - data.logPrices[i][t])) / priceUnits[i],
      ),
    },
  ]);
  const time = { name: "week", type: "number" as const, values: data.time! };
  const goods = Object.fromEntries(data.goods.map((good, i) => [good, { price: `p${i}`, quantity: `q${i}` }]));
  const specification = { kind: "data", upload: "rows", goods, time: "week", normalise };
  const table = { name: "rows", sha256: "0".repeat(64), rows: data.rows, columns: [...columns, time] };
  return prepareData(dataSpecification.parse(specification), table);
}

function sample(form: "la-aids" | "les" | "aids"): PreparedData {
  const random = seededRandom(17);
  return inPeriods(simulateShares({ form, goods: 4, rows: 150, random, noise: 0.02 }).data, random);
}

describe("in whatever units prices and money are uploaded", () => {
  it.each([
    ["la-aids", { form: "la-aids", impose: BOTH, index: "lagged stone", trend: true }],
    ["la-aids", { form: "la-aids", impose: BOTH, differences: true, season: { period: 4 } }],
    ["aids", { form: "rotterdam", impose: BOTH, trend: true }],
    ["les", { form: "les", errors: "expenditures", trend: true }],
  ] as const)("normalised %s %j is the same", (from, keys) => {
    const data = sample(from);
    const demographics = { ...keys, demographics: [] };
    const plain = estimated(uploaded(data, [1, 1, 1, 1], 1, "mean"), demographics);
    const scaled = estimated(uploaded(data, [1e6, 1e-6, 1, 42], 1e6, "mean"), demographics);
    expect(largestDifference(scaled.fitted.theta, plain.fitted.theta)).toBeLessThan(1e-9);
    expect(largestDifference(scaled.fitted.covariance.flat(), plain.fitted.covariance.flat())).toBeLessThan(1e-9);
    expect(largestDifference([scaled.logLikelihood], [plain.logLikelihood])).toBeLessThan(1e-9);
    expect(largestDifference(scaled.durbinWatson!, plain.durbinWatson!)).toBeLessThan(1e-9);
  });

  it("Rotterdam is the same even where nothing is normalised", () => {
    const data = sample("aids");
    const keys = { form: "rotterdam", demographics: [], impose: BOTH };
    const plain = estimated(uploaded(data, [1, 1, 1, 1], 1, "none"), keys);
    const scaled = estimated(uploaded(data, [1e6, 1e-6, 1, 42], 1e6, "none"), keys);
    expect(largestDifference(scaled.fitted.theta, plain.fitted.theta)).toBeLessThan(1e-9);
  });
});

/** Periods of a world that is Rotterdam's: each from the last by a fixed point in its own shares. */
function rotterdamWorld(rows: number, noise: number) {
  const random = seededRandom(55);
  const theta = [0.35, 0.4, 0.25];
  const pi = [
    [-0.12, 0.07, 0.05],
    [0.07, -0.15, 0.08],
    [0.05, 0.08, -0.13],
  ];
  const logPrices = theta.map(() => new Float64Array(rows));
  const logQuantities = theta.map(() => new Float64Array(rows));
  const sharesAt = (t: number) => {
    const spent = theta.map((_, i) => Math.exp(logPrices[i][t] + logQuantities[i][t]));
    const total = spent.reduce((sum, value) => sum + value, 0);
    return spent.map((value) => value / total);
  };
  for (let t = 1; t < rows; t++) {
    const volume = 0.05 * random.normal();
    const errors = theta.map(() => noise * random.normal());
    const mean = errors.reduce((sum, value) => sum + value, 0) / 3;
    for (const column of logPrices) column[t] = 0.9 * column[t - 1] + 0.1 * random.normal();
    const right = theta.map(
      (share, i) =>
        share * volume +
        pi[i].reduce((sum, entry, j) => sum + entry * (logPrices[j][t] - logPrices[j][t - 1]), 0) +
        errors[i] -
        mean,
    );
    const before = sharesAt(t - 1);
    let now = before;
    for (let round = 0; round < 200; round++) {
      for (const i of theta.keys())
        logQuantities[i][t] = logQuantities[i][t - 1] + right[i] / (0.5 * (before[i] + now[i]));
      now = sharesAt(t);
    }
  }
  const shares = theta.map(() => new Float64Array(rows));
  const logTotal = new Float64Array(rows);
  for (let t = 0; t < rows; t++) {
    sharesAt(t).forEach((share, i) => {
      shares[i][t] = share;
    });
    logTotal[t] = Math.log(theta.reduce((sum, _, i) => sum + Math.exp(logPrices[i][t] + logQuantities[i][t]), 0));
  }
  const { data } = simulateShares({ form: "aids", goods: 3, rows, random, noise: 0 });
  return {
    data: { ...data, shares, logPrices, logTotal, time: Float64Array.from({ length: rows }, (_, t) => t) },
    truth: [...theta, ...pi.flat()],
  };
}

describe("a world that is Rotterdam's", () => {
  it("without noise gives its coefficients back", () => {
    const { data, truth } = rotterdamWorld(80, 0);
    for (const impose of [[], BOTH]) {
      expect(largestDifference(estimated(data, { form: "rotterdam", impose }).fitted.theta, truth)).toBeLessThan(1e-9);
    }
  });

  it("with noise gives them back within a few of their standard errors", () => {
    const { data, truth } = rotterdamWorld(150, 0.002);
    const { fitted } = estimated(data, { form: "rotterdam", impose: BOTH });
    const scaled = truth.map((value, a) => (fitted.theta[a] - value) / Math.sqrt(fitted.covariance[a][a]));
    const mean = scaled.reduce((sum, value) => sum + value ** 2, 0) / scaled.length;
    // Of twelve numbers with five free coefficients between them: χ²(5)/5 lies below 3 but once in a hundred.
    expect(mean).toBeLessThan(3);
    expect(mean).toBeGreaterThan(0.05);
  });
});
