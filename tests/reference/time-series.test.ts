import { readFileSync } from "node:fs";
import { beforeAll, describe, expect, it } from "vitest";
import { runSystem } from "../../server/engine/cells/system.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { QUIET } from "../../server/engine/run.ts";
import { type SystemFinding, systemSpecification } from "../../shared/schemas/system.ts";
import { tunaWeeks } from "../support/tuna.ts";

/**
 * Systems over time on the weekly tuna sales against general-purpose tools: base R 4.2.2 with systemfit 1.1.28 (iterated SUR),
 * nlminb and numDeriv (likelihoods of the linear expenditure system). The script is fixtures/time-series.R, its values
 * with the versions fixtures/time-series.json. 60 of the weeks are absent: consecutive rows are the periods.
 *
 * Bounds, relative to 1 + |value|: 1e-9 where both sides stop at rounding; 1e-8 for the nonlinear likelihoods, whose
 * derivatives are numerical in the reference.
 */
const reference = JSON.parse(readFileSync(new URL("./fixtures/time-series.json", import.meta.url), "utf8"));
const BRANDS = 7;
/** Of the 337 steps from row to row, those of more than a week: counted in the file. */
const GAPS = 9;
const LINEAR = 1e-9;
const NONLINEAR = 1e-8;

function near(actual: number, expected: number, bound: number) {
  expect(Math.abs(actual - expected) / (1 + Math.abs(expected))).toBeLessThan(bound);
}

let data: PreparedData;
beforeAll(async () => {
  data = await tunaWeeks();
});

const estimated = (keys: object) =>
  runSystem(systemSpecification.parse({ kind: "system", data: "weeks", ...keys }), data, QUIET);

type What = "estimate" | "standardError";

/** Row i of the reference: the regressors of an equation in the order that the blocks are named. */
function equation(finding: SystemFinding, i: number, blocks: readonly string[], what: What): number[] {
  return blocks.flatMap((block) =>
    finding.coefficients
      .filter((one) => one.block === block && one.good === finding.fitted.goods[i])
      .map((one) => one[what]),
  );
}

function expectSur(finding: SystemFinding, expected: typeof reference, blocks: readonly string[]) {
  expect(finding.rows).toBe(expected.rows);
  near(finding.logLikelihood, expected.logLikelihood, LINEAR);
  for (let i = 0; i < BRANDS - 1; i++) {
    const estimates = equation(finding, i, blocks, "estimate");
    const errors = equation(finding, i, blocks, "standardError");
    expect(estimates.length).toBe(expected.coefficients[i].length);
    estimates.forEach((value, a) => {
      near(value, expected.coefficients[i][a], LINEAR);
      near(errors[a], expected.errors[i][a], LINEAR);
    });
    near(finding.durbinWatson![i], expected.durbinWatson[i], LINEAR);
  }
}

const SYMMETRIC = ["homogeneity", "symmetry"];

describe("LA-AIDS with the Stone index of the week before", () => {
  it.each([
    ["unrestricted", []],
    ["symmetric", SYMMETRIC],
  ])("%s", (name, impose) => {
    const finding = estimated({ form: "la-aids", index: "lagged stone", impose });
    expectSur(finding, reference.laggedStone[name], ["alpha", "gamma", "beta"]);
    expect(finding.equations).toEqual({ explains: "shares", leftOut: 1, because: ["lagged shares"], gaps: GAPS });
  });

  it("has the Durbin–Watson statistic of one equation by least squares", () => {
    const finding = estimated({ form: "la-aids", index: "lagged stone" });
    near(finding.durbinWatson![0], reference.laggedStone.durbinWatsonOfBrand1, LINEAR);
  });
});

describe("the Rotterdam system", () => {
  it.each([
    ["unrestricted", []],
    ["symmetric", SYMMETRIC],
  ])("%s", (name, impose) => {
    expectSur(estimated({ form: "rotterdam", impose }), reference.rotterdam[name], ["slutsky", "marginal"]);
  });

  it("with a trend", () => {
    const finding = estimated({ form: "rotterdam", impose: SYMMETRIC, trend: true });
    expectSur(finding, reference.rotterdam.trend, ["slutsky", "marginal", "demographic"]);
  });

  it("tests homogeneity by the difference of log-likelihoods, and stands at observed mean shares", () => {
    const finding = estimated({ form: "rotterdam", impose: SYMMETRIC });
    const lr = finding.tests.reduce((sum, test) => sum + test.statistic, 0);
    const { unrestricted, symmetric } = reference.rotterdam;
    near(lr, 2 * (unrestricted.logLikelihood - symmetric.logLikelihood), 1e-8);
    expect(finding.tests[0].exact).toMatchObject({ numerator: 6, approximate: false });
    finding.expenditureElasticities.forEach(({ estimate }, i) => {
      near(estimate, finding.fitted.theta[i] / reference.meanShares[i], 1e-13);
    });
    expect(finding.checks.sample!.negativity!.breaks % data.rows).toBe(0);
    expect(finding.checks.sample!.monotonicity.breaks).toBe(0);
    expect(finding.engel.logTotal).toEqual([]);
  });
});

describe("LA-AIDS in first differences", () => {
  it.each([
    ["unrestricted", []],
    ["symmetric", SYMMETRIC],
  ])("%s, with a pair of sine and cosine over 52 weeks", (name, impose) => {
    const finding = estimated({ form: "la-aids", impose, differences: true, season: { period: 52, harmonics: 1 } });
    expectSur(finding, reference.differences[name], ["gamma", "beta", "demographic"]);
  });

  it("recovers intercepts with which the system in levels passes through the means", () => {
    const finding = estimated({
      form: "la-aids",
      impose: SYMMETRIC,
      differences: true,
      season: { period: 52, harmonics: 1 },
    });
    for (let i = 0; i < BRANDS - 1; i++) near(finding.fitted.theta[i], reference.differences.alpha[i], LINEAR);
  });

  it("has an intercept in the equations by a trend", () => {
    const finding = estimated({ form: "la-aids", impose: SYMMETRIC, differences: true, trend: true });
    expectSur(finding, reference.differences.trend, ["gamma", "beta", "demographic"]);
  });
});

describe("LA-AIDS in levels with a trend and a season of four weeks", () => {
  it("symmetric", () => {
    const finding = estimated({ form: "la-aids", impose: SYMMETRIC, trend: true, season: { period: 4 } });
    expectSur(finding, reference.levels, ["alpha", "gamma", "beta", "demographic"]);
  });
});

describe("the linear expenditure system", () => {
  function expectLes(finding: SystemFinding, expected: typeof reference) {
    near(finding.logLikelihood, expected.logLikelihood, LINEAR);
    const block = (name: string, what: What) =>
      finding.coefficients.filter((one) => one.block === name).map((one) => one[what]);
    expected.committed.forEach((value: number, i: number) => {
      near(block("committed", "estimate")[i], value, NONLINEAR);
      near(block("committed", "standardError")[i], expected.committedErrors[i], NONLINEAR);
    });
    expected.marginal.forEach((value: number, i: number) => {
      near(block("marginal", "estimate")[i], value, NONLINEAR);
      near(block("marginal", "standardError")[i], expected.marginalErrors[i], NONLINEAR);
      near(finding.durbinWatson![i], expected.durbinWatson[i], NONLINEAR);
    });
    return block;
  }

  it("with errors on expenditures", () => {
    const finding = estimated({ form: "les", errors: "expenditures" });
    expectLes(finding, reference.les.expenditures);
    expect(finding.equations).toEqual({ explains: "expenditures", leftOut: 0, because: [], gaps: 0 });
  });

  it("with a demographic that shifts committed quantities: the trend, per hundred weeks in the reference", () => {
    const finding = estimated({ form: "les", trend: true });
    const block = expectLes(finding, reference.les.demographic);
    reference.les.demographic.shift.forEach((value: number, i: number) => {
      near(100 * block("demographic", "estimate")[i], value, NONLINEAR);
      near(100 * block("demographic", "standardError")[i], reference.les.demographic.shiftErrors[i], NONLINEAR);
    });
  });

  it("counts the rows whose committed expenditure takes all, and gives the Frisch parameter at the base point", () => {
    const { expenditure, fitted } = estimated({ form: "les", errors: "expenditures" });
    const committed = fitted.theta.slice(0, BRANDS);
    const without = Array.from({ length: data.rows }, (_, t) => t).filter((t) => {
      const spent = committed.reduce((sum, c, j) => sum + c * Math.exp(data.logPrices[j][t]), 0);
      return spent >= Math.exp(data.logTotal[t]);
    });
    const { rows, weightedShare, firstRows } = expenditure!.withoutSupernumerary;
    expect(rows).toBe(without.length);
    expect(weightedShare).toBeCloseTo(without.length / data.rows, 14);
    expect(firstRows).toEqual(without.slice(0, 10).map((t) => data.rowNumbers[t]));
    const left = 1 - committed.reduce((sum, c) => sum + c, 0);
    near(expenditure!.frisch!.estimate, -1 / left, 1e-13);
    const variance = fitted.covariance
      .slice(0, BRANDS)
      .reduce((sum, row) => sum + row.slice(0, BRANDS).reduce((a, b) => a + b, 0), 0);
    near(expenditure!.frisch!.standardError, Math.sqrt(variance) / left ** 2, 1e-12);
    const outside = fitted.theta.slice(BRANDS).filter((b) => !(b > 0 && b < 1));
    expect(expenditure!.atBound.map(({ estimate }) => estimate)).toEqual(outside);
  });
});
