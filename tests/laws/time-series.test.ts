import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { withTimeTerms } from "../../server/engine/columns/seasonal-terms.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import type { RestrictionName, SystemName } from "../../shared/systems/names.ts";
import { denseLikelihood } from "../support/dense-likelihood.ts";
import { estimated, largestDifference, systemOver } from "../support/estimating.ts";
import { inPeriods, reordered, rowsByTime } from "../support/periods.ts";
import { simulateShares } from "../support/simulated-shares.ts";

/** Systems over time from the moments, read once, and from rows formed and stacked one by one: to 1e-9. */
const BOUND = 1e-9;
const BOTH: RestrictionName[] = ["homogeneity", "symmetry"];

interface Case {
  readonly form: SystemName;
  readonly impose: RestrictionName[];
  readonly keys: object;
  readonly demographics?: number;
  readonly weighted?: boolean;
}

const CASES: readonly Case[] = [
  { form: "la-aids", impose: BOTH, keys: { index: "lagged stone" }, weighted: true },
  { form: "la-aids", impose: [], keys: { index: "lagged stone", trend: true }, demographics: 1 },
  { form: "la-aids", impose: BOTH, keys: { differences: true, season: { period: 4 }, trend: true }, weighted: true },
  { form: "la-aids", impose: ["homogeneity"], keys: { differences: true, index: "lagged stone" }, demographics: 1 },
  { form: "la-aids", impose: BOTH, keys: { season: { period: 12, harmonics: 2 }, trend: true } },
  { form: "rotterdam", impose: BOTH, keys: {}, weighted: true },
  { form: "rotterdam", impose: [], keys: { trend: true, season: { period: 4, harmonics: 2 } } },
  { form: "les", impose: [], keys: { errors: "expenditures" }, demographics: 1, weighted: true },
  { form: "les", impose: [], keys: { errors: "shares", trend: true }, demographics: 1 },
];

function sampleFor({ form, impose, demographics = 0, weighted = false }: Case): PreparedData {
  const random = seededRandom(31);
  const from = form === "rotterdam" ? "aids" : form;
  const { data } = simulateShares({
    form: from,
    goods: 3,
    rows: 120,
    random,
    noise: 0.02,
    impose,
    demographics,
    weighted,
  });
  return inPeriods(data, random);
}

/** Trend and seasonal terms by hand, from their definition. */
function timeColumn(name: string, data: PreparedData): Float64Array {
  const value = (t: number): number => {
    if (name === "trend") return t;
    const [, wave, number, period] = /^season (sine |cosine )?(\d+) of (\d+)$/.exec(name)!;
    const angle = (2 * Math.PI * Number(number) * t) / Number(period);
    if (wave === "sine ") return Math.sin(angle);
    if (wave === "cosine ") return Math.cos(angle);
    return (t - 1) % Number(period) === Number(number) - 1 ? 1 : 0;
  };
  const values = data.time!.map(value);
  const weightOf = (t: number) => data.weights?.[t] ?? 1;
  const mean =
    values.reduce((sum, entry, t) => sum + weightOf(t) * entry, 0) / values.reduce((sum, _, t) => sum + weightOf(t), 0);
  return values.map((entry) => entry - mean);
}

/** The regressors of a coefficient by row of the data, and the responses, from the raw columns. */
function byHand(one: Case, data: PreparedData) {
  const keys = one.keys as { index?: string; differences?: boolean; errors?: string };
  const specification = withTimeTerms(systemOver(data, { form: one.form, impose: one.impose, ...one.keys }), data);
  const order = rowsByTime(data);
  const n = data.goods.length;
  const weights = data.weights ?? new Float64Array(data.rows).fill(1);
  const mean = (column: ArrayLike<number>) =>
    Array.from(column).reduce((sum, value, t) => sum + weights[t] * value, 0) / data.rows;
  const real = data.logTotal.map((logTotal, t) => {
    const place = order.indexOf(t);
    return data.shares.reduce((sum, share, k) => {
      if (keys.index === "lagged stone")
        return sum - (place > 0 ? share[order[place - 1]] : Number.NaN) * data.logPrices[k][t];
      return (
        sum - 0.5 * (share[t] + mean(share)) * (data.logPrices[k][t] - Math.log(mean(data.logPrices[k].map(Math.exp))))
      );
    }, logTotal);
  });
  const z = specification.demographics.map((name) => data.numeric.get(name) ?? timeColumn(name, data));
  const logQuantity = (i: number, t: number) => Math.log(data.shares[i][t]) + data.logTotal[t] - data.logPrices[i][t];
  const contribution = (i: number, t: number, before: number) =>
    ((data.shares[i][t] + data.shares[i][before]) / 2) * (logQuantity(i, t) - logQuantity(i, before));
  return { specification, order, n, weights, real, z, contribution, keys };
}

function slowly(one: Case, data: PreparedData) {
  const { specification, order, n, weights, real, z, contribution, keys } = byHand(one, data);
  const size = { goods: n, demographics: z.length, alpha0: 0 };
  const system = SYSTEMS[one.form];
  const layout = system.layout(size);
  const changes = one.form === "rotterdam" || keys.differences === true;
  const first = (keys.index === "lagged stone" ? 1 : 0) + (changes ? 1 : 0);
  const rows = order.length - first;
  const at = (t: number) => ({ now: order[t + first], before: order[t + first - 1] });
  const difference = (column: ArrayLike<number>, t: number) => column[at(t).now] - (changes ? column[at(t).before] : 0);
  const total = weights.reduce((sum, weight, row) => sum + (order.slice(first).includes(row) ? weight : 0), 0);
  const full = system.free(size, one.impose);
  // Intercepts that differences take away are no coefficients of the equations.
  const kept = full.places
    .map((_, f) => f)
    .filter((f) => !(keys.differences && layout[full.places[f]].block === "alpha"));
  const free = { matrix: full.matrix.map((row) => kept.map((f) => row[f])), offset: full.offset };
  const observed = (t: number) =>
    data.shares.map((share, i) => {
      if (one.form === "rotterdam") return contribution(i, at(t).now, at(t).before);
      if (keys.errors === "expenditures") return share[at(t).now] * Math.exp(data.logTotal[at(t).now]);
      return difference(share, t);
    });
  const linear = (theta: readonly number[], t: number) => {
    const volume = observed(t).reduce((sum, value) => sum + value, 0);
    const regressor = layout.map(({ block, column }) => {
      if (block === "alpha") return changes ? 0 : 1;
      if (block === "demographic") return difference(z[column!], t);
      if (block === "marginal") return volume;
      return block === "beta" ? difference(real, t) : difference(data.logPrices[column!], t);
    });
    const derivatives = data.goods.map((_, i) => layout.map(({ good }, a) => (good === i ? regressor[a] : 0)));
    return { values: derivatives.map((row) => row.reduce((sum, value, a) => sum + value * theta[a], 0)), derivatives };
  };
  const expenditures = (theta: readonly number[], t: number) => {
    const row = at(t).now;
    const point = {
      prices: data.logPrices.map((column) => Math.exp(column[row])),
      total: Math.exp(data.logTotal[row]),
      demographics: z.map((column) => column[row]),
    };
    const scale = keys.errors === "expenditures" ? point.total : 1;
    return {
      values: system.slopes(theta, size, point).shares.map((share) => scale * share),
      derivatives: system.slopeDerivatives(theta, size, point).shares.map((row) => row.map((value) => scale * value)),
    };
  };
  const start = system.start(
    size,
    data.shares.map((share) => share.reduce((sum, value) => sum + value, 0) / data.rows),
  );
  const result = denseLikelihood(
    {
      rows,
      observed,
      predicted: one.form === "les" ? expenditures : linear,
      weight: (t) => (weights[at(t).now] * rows) / total,
    },
    free,
    kept.map((f) => start[full.places[f]]),
    Array.from({ length: n - 1 }, (_, i) => i),
  );
  return { ...result, layout, rows, specification };
}

describe.each(
  CASES.map((one) => [`${one.form} ${JSON.stringify(one.impose)} ${JSON.stringify(one.keys)}`, one] as const),
)("%s", (_, one) => {
  const data = sampleFor(one);
  const keys = { form: one.form, impose: one.impose, ...one.keys };

  it.each(["reflected", "summed"] as const)("is what dense least squares on its rows finds (%s)", (reduction) => {
    const finding = estimated(data, keys, reduction);
    const slow = slowly(one, data);
    const inEquations = (values: readonly number[]) =>
      values.filter((_, a) => !("differences" in one.keys && slow.layout[a].block === "alpha"));
    expect(finding.rows).toBe(slow.rows);
    expect(largestDifference(inEquations(finding.fitted.theta), inEquations(slow.theta))).toBeLessThan(BOUND);
    expect(largestDifference([finding.logLikelihood], [slow.logLikelihood])).toBeLessThan(BOUND);
    const errors = finding.coefficients.map(({ standardError }) => standardError);
    expect(largestDifference(inEquations(errors), inEquations(slow.standardErrors))).toBeLessThan(BOUND);
  });

  it("does not depend on the good that is dropped, nor on the order of the rows", () => {
    const last = estimated(data, keys);
    const order = Array.from({ length: data.rows }, (_, row) => (row * 7) % data.rows);
    expect(new Set(order).size).toBe(data.rows);
    for (const other of [
      estimated(data, { ...keys, dropped: "good 1" }),
      estimated(data, { ...keys, dropped: "good 2" }),
      estimated(reordered(data, order), keys),
    ]) {
      expect(largestDifference(other.fitted.theta, last.fitted.theta)).toBeLessThan(BOUND);
      expect(largestDifference(other.fitted.covariance.flat(), last.fitted.covariance.flat())).toBeLessThan(BOUND);
      expect(largestDifference([other.logLikelihood], [last.logLikelihood])).toBeLessThan(BOUND);
      expect(largestDifference(other.durbinWatson!, last.durbinWatson!)).toBeLessThan(BOUND);
    }
  });
});

describe("what the recovered intercepts of a system in differences mean", () => {
  const one = CASES[2];
  const data = sampleFor(one);

  it("the system in levels passes through the means of the rows used", () => {
    const { real, z, weights } = byHand(one, data);
    const { fitted } = estimated(data, { form: one.form, impose: one.impose, ...one.keys });
    const mean = (column: ArrayLike<number>) =>
      Array.from(column).reduce((sum, value, t) => sum + weights[t] * value, 0) / data.rows;
    const layout = SYSTEMS["la-aids"].layout({ goods: 3, demographics: z.length, alpha0: 0 });
    data.shares.forEach((share, i) => {
      const predicted = layout.reduce((sum, { block, good, column }, a) => {
        if (good !== i) return sum;
        const regressor =
          block === "alpha"
            ? 1
            : block === "beta"
              ? mean(real)
              : mean(block === "gamma" ? data.logPrices[column!] : z[column!]);
        return sum + fitted.theta[a] * regressor;
      }, 0);
      expect(Math.abs(predicted - mean(share))).toBeLessThan(1e-13);
    });
  });

  it("their covariance follows from that of the other coefficients", () => {
    const { fitted } = estimated(data, { form: one.form, impose: one.impose, ...one.keys });
    const { real, z, weights } = byHand(one, data);
    const mean = (column: ArrayLike<number>) =>
      Array.from(column).reduce((sum, value, t) => sum + weights[t] * value, 0) / data.rows;
    const layout = SYSTEMS["la-aids"].layout({ goods: 3, demographics: z.length, alpha0: 0 });
    const weight = layout.map(({ block, good, column }) => {
      if (good !== 0 || block === "alpha") return 0;
      return block === "beta" ? mean(real) : mean(block === "gamma" ? data.logPrices[column!] : z[column!]);
    });
    const variance = weight.reduce(
      (sum, left, a) => sum + weight.reduce((inner, right, b) => inner + left * right * fitted.covariance[a][b], 0),
      0,
    );
    expect(Math.abs(fitted.covariance[0][0] - variance)).toBeLessThan(1e-14);
  });
});
