import { describe, expect, it } from "vitest";
import { groupsOf } from "../../../../server/engine/columns/groups.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { summarise } from "../../../../server/engine/inference/bootstrap/bootstrap.ts";
import { draw, type Sampling } from "../../../../server/engine/inference/bootstrap/sampling.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { percentileInterval } from "../../../../shared/economics/percentile.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { systemOf } from "../../../../shared/systems/index.ts";
import type { SystemName } from "../../../../shared/systems/names.ts";
import { estimated, largestDifference } from "../../../support/estimating.ts";
import { type Simulation, simulateShares } from "../../../support/simulated-shares.ts";
import { written } from "../../../support/written-rows.ts";

const BOTH = ["homogeneity", "symmetry"] as const;
const SEED = 20_240;

interface Wanted extends Partial<Simulation> {
  readonly form: SystemName;
}

function sample(wanted: Wanted): PreparedData {
  const rows = wanted.rows ?? 90;
  const { data } = simulateShares({ goods: 3, rows, random: seededRandom(4), noise: 0.03, impose: BOTH, ...wanted });
  const village = data.logTotal.map((_, t) => (t * 7) % 15);
  const time = data.logTotal.map((_, t) => (t * 11) % rows);
  return { ...data, time, numeric: new Map([...data.numeric, ["village", village]]) };
}

function fitOf(data: PreparedData, specification: object, bootstrap?: object): SystemFinding {
  const errors = bootstrap && { "standard errors": { seed: SEED, replicates: 20, ...bootstrap } };
  return estimated(data, { impose: BOTH, demographics: [], ...specification, ...errors }) as SystemFinding;
}

const AIDS = { form: "aids" } as const;
const again = (data: PreparedData, rows: readonly number[], specification: object = AIDS) =>
  fitOf(written(data, rows), specification).fitted.theta;

describe("each replicate is the estimate of its rows written out", () => {
  const sampling = (data: PreparedData): Sampling => ({ of: "rows", seed: SEED, units: data.rows });

  it.each([
    ["maximum likelihood", AIDS, {}],
    ["few rows", AIDS, { rows: 24 }],
    ["weights", AIDS, { weighted: true }],
    ["least squares", { ...AIDS, estimator: "least squares" }, {}],
    ["seemingly unrelated", { ...AIDS, estimator: "seemingly unrelated" }, {}],
    ["another good dropped", { ...AIDS, dropped: "Good 1" }, {}],
    ["quadratic", { form: "quaids" }, { form: "quaids", rows: 150 }],
  ] as const)("rows: %s", (_, specification, more) => {
    const plain = sample({ form: "aids", ...more });
    const known = "dropped" in specification ? { ...specification, dropped: plain.goods[0] } : specification;
    const { draws } = fitOf(plain, known, { bootstrap: "rows" }).bootstrap!;
    for (const b of [1, 2, 20]) {
      const rows = [...draw(sampling(plain), b)];
      expect(largestDifference(draws![b - 1], again(plain, rows, known))).toBeLessThan(1e-9);
    }
  });

  it("clusters, from their own moments", () => {
    const data = sample({ form: "aids", weighted: true });
    const { bootstrap, clusters } = fitOf(data, AIDS, { bootstrap: "clusters", cluster: "village" });
    expect(clusters).toEqual({ column: "village", count: 15 });
    const { codes } = groupsOf(data, "village", []);
    for (const b of [1, 7]) {
      const drawn = [...draw({ of: "clusters", seed: SEED, units: 15 }, b)];
      const rows = drawn.flatMap((cluster) => [...codes.keys()].filter((t) => codes[t] === cluster));
      expect(largestDifference(bootstrap!.draws![b - 1], again(data, rows))).toBeLessThan(1e-9);
    }
  });

  it("moving blocks, in the order of time", () => {
    const data = sample(AIDS);
    const { draws, block } = fitOf(data, AIDS, { bootstrap: "blocks" }).bootstrap!;
    expect(block).toBe(5);
    const order = Int32Array.from(data.time!.keys()).sort((one, two) => data.time![one] - data.time![two]);
    const rows = [...draw({ of: "blocks", seed: SEED, units: data.rows, block: 5, order }, 3)];
    const times = rows.map((row) => data.time![row]);
    expect(times.filter((time, place) => place % 5 > 0 && time !== times[place - 1] + 1)).toEqual([]);
    expect(largestDifference(draws![2], again(data, rows))).toBeLessThan(1e-9);
  });

  it.each([
    ["few rows", { rows: 24 }],
    ["more rows", { rows: 120 }],
  ] as const)("residuals, with everything else fixed: %s", (_, more) => {
    const data = sample({ ...AIDS, ...more });
    const found = fitOf(data, AIDS, { bootstrap: "residuals" });
    const { system, size } = systemOf(found.fitted);
    const predicted = Array.from({ length: data.rows }, (__, t) => {
      const prices = data.logPrices.map((column) => Math.exp(column[t]));
      const point = { prices, total: Math.exp(data.logTotal[t]), demographics: [] };
      return system.slopes(found.fitted.theta, size, point).shares;
    });
    const errors = data.shares.map((column, i) => column.map((share, t) => share - predicted[t][i]));
    const means = errors.map((column) => column.reduce((sum, error) => sum + error, 0) / data.rows);
    for (const b of [1, 20]) {
      const drawn = draw({ of: "residuals", seed: SEED, units: data.rows }, b);
      const shares = data.shares.map((column, i) =>
        column.map((__, t) => predicted[t][i] + errors[i][drawn[t]] - means[i]),
      );
      const slow = fitOf({ ...data, shares }, AIDS).fitted.theta;
      expect(largestDifference(found.bootstrap!.draws![b - 1], slow)).toBeLessThan(1e-9);
    }
  });
});

describe("the draws", () => {
  it("repeat bit for bit, and differ by seed and by replicate", () => {
    const data = sample(AIDS);
    for (const bootstrap of ["rows", "residuals", "blocks"]) {
      const [one, two, other] = [SEED, SEED, 3].map((seed) => fitOf(data, AIDS, { bootstrap, seed }).bootstrap!.draws!);
      expect(one).toEqual(two);
      expect(one).not.toEqual(other);
      expect(new Set(one.map((theta) => theta[0])).size).toBe(20);
    }
  });

  it("of weighted residuals are as likely as their weights", () => {
    const runningWeights = Float64Array.of(1, 1, 4, 10);
    const counts = [0, 0, 0, 0];
    for (let b = 1; b <= 500; b++) {
      for (const unit of draw({ of: "residuals", seed: 1, units: 4, runningWeights }, b)) counts[unit]++;
    }
    expect(counts[1]).toBe(0);
    const missed = [0.1, 0, 0.3, 0.6].map((share, unit) => Math.abs(counts[unit] / 2000 - share));
    expect(Math.max(...missed)).toBeLessThan(0.04);
  });

  it("have the covariance that the finding states, and intervals between their own percentiles", () => {
    const found = fitOf(sample(AIDS), AIDS, { bootstrap: "rows", replicates: 60 });
    const draws = found.bootstrap!.draws!;
    const column = draws.map((theta) => theta[3]);
    const mean = column.reduce((sum, value) => sum + value, 0) / 60;
    const variance = column.reduce((sum, value) => sum + (value - mean) ** 2, 0) / 59;
    expect(found.fitted.covariance[3][3]).toBeCloseTo(variance, 14);
    expect(found.coefficients[3].standardError).toBe(Math.sqrt(found.fitted.covariance[3][3]));
    expect(found.bootstrap!.intervals[3]).toEqual(percentileInterval(column));
    const total = draws.map((theta) => theta[0] + theta[1] + theta[2]);
    expect(Math.max(...total.map((sum) => Math.abs(sum - 1)))).toBeLessThan(1e-12);
  });

  it("agree with conventional errors where those are right, and so do their intervals", () => {
    const data = sample({ form: "la-aids", rows: 600 });
    const conventional = fitOf(data, { form: "la-aids" });
    const found = fitOf(data, { form: "la-aids" }, { bootstrap: "rows", replicates: 300 });
    found.coefficients.forEach(({ estimate, standardError }, a) => {
      const error = conventional.coefficients[a].standardError;
      // The standard deviation of 300 draws is itself known to 4 %.
      expect(Math.abs(standardError / error - 1)).toBeLessThan(0.2);
      const [low, high] = found.bootstrap!.intervals[a];
      expect(Math.abs((high - low) / (3.92 * error) - 1)).toBeLessThan(0.25);
      expect(low).toBeLessThan(estimate);
      expect(high).toBeGreaterThan(estimate);
    });
  });
});

describe("replicates without an estimate", () => {
  const sampling: Sampling = { of: "rows", seed: 7, units: 50 };
  const replicates = (failed: number) =>
    Array.from({ length: 100 }, (_, b) => (b < failed ? { refused: `reason ${b + 1}` } : { theta: [b, 2 * b] }));

  it("are counted, the first with its reason", () => {
    const { bootstrap, covariance } = summarise(replicates(5), sampling);
    expect(bootstrap).toMatchObject({ replicates: 100, failed: 5, firstFailure: { replicate: 1, reason: "reason 1" } });
    expect(bootstrap.draws).toHaveLength(95);
    expect(covariance[1][1]).toBeCloseTo(4 * covariance[0][0], 10);
    expect(summarise(replicates(0), sampling).bootstrap.firstFailure).toBeUndefined();
  });

  it("are a refusal when more than 5 % are without", () => {
    const problem = problemOf(() => summarise(replicates(6), sampling));
    expect(problem.key).toEqual(["standard errors"]);
    expect(problem.sentence).toMatch(/6 of 100 .* 5 % .* replicate 1: reason 1/);
  });
});

describe("what the data do not allow", () => {
  const { time: _, ...timeless } = sample(AIDS);
  const weekly = sample(AIDS);

  it.each([
    ["clusters without a cluster", timeless, { bootstrap: "clusters" }, "bootstrap", /cluster/],
    ["blocks without time", timeless, { bootstrap: "blocks" }, "bootstrap", /time/],
    ["a block longer than the sample", weekly, { bootstrap: "blocks", block: 91 }, "block", /91 periods.* 90/],
    ["a cluster that is no column", weekly, { bootstrap: "clusters", cluster: "vilage" }, "cluster", /vilage/],
  ] as const)("%s", (__, data, bootstrap, key, sentence) => {
    const problem = problemOf(() => fitOf(data, AIDS, bootstrap));
    expect(problem.key).toEqual(["standard errors", key]);
    expect(problem.sentence).toMatch(sentence);
  });

  it("keys of another kind of bootstrap are refused by the specification", () => {
    expect(() => fitOf(weekly, AIDS, { bootstrap: "rows", block: 4 })).toThrow(
      /block belongs to a bootstrap of blocks/,
    );
    expect(() => fitOf(weekly, AIDS, { bootstrap: "rows", cluster: "village" })).toThrow(/cluster belongs to/);
  });
});

function problemOf(work: () => unknown) {
  try {
    work();
  } catch (error) {
    if (error instanceof Refusal) return error.problems[0];
    throw error;
  }
  throw new Error("not refused");
}
