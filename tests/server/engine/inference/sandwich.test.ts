import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { systemForm } from "../../../../server/engine/estimation/coefficient-form.ts";
import type { Estimation } from "../../../../server/engine/estimation/estimation.ts";
import { maximumLikelihood } from "../../../../server/engine/estimation/estimators.ts";
import { reduceRows } from "../../../../server/engine/estimation/moments.ts";
import { momentsRequest, sizeOf, sourceOf } from "../../../../server/engine/estimation/request.ts";
import { clusteredCovariance } from "../../../../server/engine/inference/sandwich.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { QUIET } from "../../../../server/engine/run.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { SYSTEMS } from "../../../../shared/systems/index.ts";
import type { SystemName } from "../../../../shared/systems/names.ts";
import { estimated, largestDifference, systemOver } from "../../../support/estimating.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";
import { slowSandwich } from "../../../support/slow-sandwich.ts";

const BOTH = ["homogeneity", "symmetry"] as const;
const HETEROSKEDASTIC = { "standard errors": "heteroskedastic" };
const CLUSTERED = { "standard errors": { cluster: "village" } };

/** Rows whose errors grow with the total and share something within villages, which do not stand together. */
function survey(form: SystemName, weighted: boolean, rows = 240, goods = 4): PreparedData {
  const random = seededRandom(11);
  const demographics = form === "les" ? 0 : 1;
  const noise = 0.02;
  const { data } = simulateShares({ form, goods, rows, random, noise, impose: BOTH, demographics, weighted });
  const village = Float64Array.from({ length: rows }, (_, t) => ((t * 7) % 24) + 1);
  const shift = Array.from({ length: 25 }, () => 0.02 * random.normal());
  const shares = data.shares.map((column) => column.slice());
  for (let t = 0; t < rows; t++) {
    const moved = shift[village[t]] * (1 + 0.5 * data.logTotal[t]);
    shares[0][t] += moved;
    shares[1][t] -= moved;
  }
  return { ...data, shares, numeric: new Map([...data.numeric, ["village", village]]) };
}

const shifting = (data: PreparedData) => [...data.numeric.keys()].filter((name) => name !== "village");
const fitOf = (data: PreparedData, specification: object) =>
  estimated(data, { impose: BOTH, demographics: shifting(data), ...specification }) as SystemFinding;
const flat = (matrix: readonly (readonly number[])[]) => matrix.flat();
const scale = (matrix: readonly (readonly number[])[]) => Math.max(...matrix.map((row, a) => row[a]));

/** Largest difference of two covariances, relative to the largest variance. */
function apart(left: readonly (readonly number[])[], right: readonly (readonly number[])[]): number {
  const size = scale(right);
  const relative = (matrix: readonly (readonly number[])[]) => flat(matrix).map((value) => value / size);
  return largestDifference(relative(left), relative(right));
}

describe("the sandwich against scores of every row from the system's own formulas", () => {
  const cases = (["aids", "les"] as const).flatMap((form) => [true, false].map((weighted) => ({ form, weighted })));

  it.each(cases)("$form, weighted: $weighted", ({ form, weighted }) => {
    const data = survey(form, weighted);
    const impose = form === "les" ? [] : BOTH;
    const robust = fitOf(data, { form, impose, ...HETEROSKEDASTIC });
    expect(robust.standardErrors).toBe("heteroskedastic");
    const rows = Int32Array.from({ length: data.rows }, (_, t) => t);
    expect(apart(robust.fitted.covariance, slowSandwich(robust, data, rows))).toBeLessThan(1e-9);
    const clustered = fitOf(data, { form, impose, ...CLUSTERED });
    expect(clustered.clusters).toEqual({ column: "village", count: 24 });
    const villages = data.numeric.get("village")!;
    expect(apart(clustered.fitted.covariance, slowSandwich(clustered, data, villages))).toBeLessThan(1e-9);
    expect(apart(clustered.fitted.covariance, robust.fitted.covariance)).toBeGreaterThan(0.1);
  });
});

describe("clusters' own moments and one pass that sums scores by cluster", () => {
  it.each(["aids", "la-aids", "les"] as const)("agree to 1e-10: %s", (form) => {
    const data = survey(form, true);
    const specification = systemOver(data, { form, demographics: shifting(data), impose: BOTH });
    const request = momentsRequest(specification, data);
    const source = sourceOf(data, request);
    const size = sizeOf(specification, data);
    const estimation: Estimation = {
      moments: reduceRows(source, request.key, QUIET),
      form: systemForm(SYSTEMS[form], size, BOTH),
      equations: [0, 1, 2],
      coefficientLabels: [],
    };
    const theta = SYSTEMS[form].start(size, [0.25, 0.25, 0.25, 0.25]);
    const start = estimation.form.expand.places.map((place) => theta[place]);
    const solution = maximumLikelihood(estimation, true, start, "newton", QUIET);
    const village = data.numeric.get("village")!;
    const clusters = { column: "village", codes: village.map((code) => code - 1), count: 24 };
    const fromMoments = clusteredCovariance(estimation, solution, source, clusters, QUIET);
    const byPass = clusteredCovariance(estimation, solution, source, clusters, QUIET, 0);
    expect(apart(byPass, fromMoments)).toBeLessThan(1e-10);
  });
});

describe("what the sandwich does not depend on", () => {
  const data = survey("la-aids", true);
  const kinds = [HETEROSKEDASTIC, CLUSTERED];

  it.each(["maximum likelihood", "seemingly unrelated", "least squares"])("the dropped good: %s", (estimator) => {
    for (const kind of kinds) {
      const last = fitOf(data, { form: "la-aids", estimator, ...kind });
      for (const dropped of data.goods.slice(0, -1)) {
        const other = fitOf(data, { form: "la-aids", estimator, dropped, ...kind });
        expect(apart(other.fitted.covariance, last.fitted.covariance)).toBeLessThan(1e-9);
      }
    }
  });

  it("the order of rows", () => {
    const random = seededRandom(5);
    const order = Array.from({ length: data.rows }, (_, t) => ({ t, at: random.uniform() }))
      .sort((one, two) => one.at - two.at)
      .map(({ t }) => t);
    const permuted = (column: Float64Array) => Float64Array.from(order, (t) => column[t]);
    const other: PreparedData = {
      ...data,
      shares: data.shares.map(permuted),
      logPrices: data.logPrices.map(permuted),
      logTotal: permuted(data.logTotal),
      weights: permuted(data.weights!),
      numeric: new Map([...data.numeric].map(([name, column]) => [name, permuted(column)])),
    };
    for (const kind of kinds) {
      const one = fitOf(data, { form: "aids", ...kind });
      expect(apart(fitOf(other, { form: "aids", ...kind }).fitted.covariance, one.fitted.covariance)).toBeLessThan(
        1e-9,
      );
    }
  });

  it("whether rows of one each are called clusters", () => {
    const own = { ...data, numeric: new Map([...data.numeric, ["own", data.logTotal.map((_, t) => t)]]) };
    const demographics = shifting(data);
    const rows = fitOf(own, { form: "aids", demographics, ...HETEROSKEDASTIC });
    const clusters = fitOf(own, { form: "aids", demographics, "standard errors": { cluster: "own" } });
    expect(apart(clusters.fitted.covariance, rows.fitted.covariance)).toBeLessThan(1e-9);
  });
});

describe("covariances of few clusters", () => {
  it("have the rank of the clusters, and stay free of negative variances", () => {
    const data = survey("aids", false);
    const thirds = data.logTotal.map((_, t) => t % 3);
    const few = { ...data, numeric: new Map([...data.numeric, ["third", thirds]]) };
    const found = fitOf(few, { form: "aids", demographics: shifting(data), "standard errors": { cluster: "third" } });
    expect(found.clusters).toEqual({ column: "third", count: 3 });
    for (const { standardError } of found.coefficients) expect(standardError).toBeGreaterThanOrEqual(0);
  });

  it("one cluster is refused under its key with both numbers", () => {
    const data = survey("aids", false);
    const one = { ...data, numeric: new Map([...data.numeric, ["country", data.logTotal.map(() => 1)]]) };
    const problem = problemOf(() =>
      fitOf(one, { form: "aids", demographics: shifting(data), "standard errors": { cluster: "country" } }),
    );
    expect(problem).toMatchObject({ key: ["standard errors", "cluster"], column: "country" });
    expect(problem.sentence).toMatch(/240 rows: 1 cluster.* at least 2/);
  });

  it("a column that is not there is refused with the nearest", () => {
    const data = survey("aids", false);
    const find = () => fitOf(data, { form: "aids", "standard errors": { cluster: "vilage" } });
    expect(problemOf(find)).toMatchObject({ key: ["standard errors", "cluster"], nearest: "village" });
  });
});

describe("weights", () => {
  it("tell the effective sample size", () => {
    const data = survey("aids", true);
    const weights = data.weights!.map((_, t) => (t === 0 ? 1e6 : 1));
    const scaled = weights.map((weight) => (weight * data.rows) / (1e6 + data.rows - 1));
    expect(
      fitOf({ ...data, weights: scaled }, { form: "la-aids", estimator: "least squares" }).effectiveRows,
    ).toBeCloseTo(1, 3);
    expect(fitOf(survey("aids", false), { form: "la-aids" }).effectiveRows).toBeUndefined();
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
