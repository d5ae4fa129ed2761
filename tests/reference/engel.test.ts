import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { linearForm } from "../../server/engine/estimation/coefficient-form.ts";
import { conventionalCovariance } from "../../server/engine/estimation/covariance.ts";
import { leastSquares } from "../../server/engine/estimation/estimators.ts";
import { fitMeasures } from "../../server/engine/estimation/fit-measures.ts";
import { reduceRows } from "../../server/engine/estimation/moments.ts";
import { covarianceOf } from "../../server/engine/estimation/weighting.ts";
import { QUIET } from "../../server/engine/run.ts";
import { elasticitiesAt } from "../../shared/economics/elasticities.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import { fittedFrom } from "../support/fitted.ts";

/**
 * Engel (1857): food against income of 235 Belgian households, as in Koenker & Hallock (2001, Journal of Economic
 * Perspectives 15). Reference: R's lm (fixtures/engel.R, data and versions there); the numbers written out are those
 * of the published checks, recomputed.
 */
interface Fit {
  readonly coefficients: number[];
  readonly standardErrors: number[];
  readonly rSquared: number;
  readonly deviation: number;
}
const { income, food, ...fits } = JSON.parse(
  readFileSync(new URL("./fixtures/engel.json", import.meta.url), "utf8"),
) as { income: number[]; food: number[] } & Record<"linear" | "workingLeser" | "quadratic" | "doubleLog", Fit>;

const logIncome = income.map(Math.log);
const share = food.map((spent, t) => spent / income[t]);
const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;

function regression(y: readonly number[], x: readonly number[], reduction: "reflected" | "summed", square = false) {
  const terms = [[0, 0] as const, [0, 1] as const, ...(square ? [[1, 1] as const] : [])];
  const source = {
    rows: y.length,
    columns: [Float64Array.from(x)],
    columnLabels: ["x"],
    terms,
    responses: [Float64Array.from(y)],
    responseLabels: ["y"],
  };
  const places = terms.map((_, term) => [0, term] as const);
  const form = linearForm(1, terms.length, places);
  const moments = reduceRows(source, "engel", QUIET, reduction);
  const estimation = { moments, form, equations: [0], coefficientLabels: places.map(String) };
  const start = places.map(() => 0);
  const solution = leastSquares(estimation, false, start, QUIET);
  const deviation = Math.sqrt(covarianceOf(solution.residuals, 1)[0][0] / (y.length - terms.length));
  const unscaled = conventionalCovariance(estimation, solution);
  return {
    coefficients: solution.theta,
    standardErrors: unscaled.map((row, a) => deviation * Math.sqrt(row[a])),
    rSquared: fitMeasures(estimation, solution).rSquared[0],
    deviation,
  };
}

function expectNear(actual: readonly number[], expected: readonly number[], bound: number) {
  expect(actual.length).toBe(expected.length);
  actual.forEach((value, k) => {
    expect(Math.abs(value / expected[k] - 1)).toBeLessThan(bound);
  });
}

function expectFit(actual: Fit, reference: Fit, bound: number) {
  expectNear(actual.coefficients, reference.coefficients, bound);
  expectNear(actual.standardErrors, reference.standardErrors, bound);
  expectNear([actual.rSquared, actual.deviation], [reference.rSquared, reference.deviation], bound);
}

describe.each(["reflected", "summed"] as const)("Engel's households by rows %s", (reduction) => {
  it("food on income", () => {
    const fit = regression(food, income, reduction);
    expectFit(fit, fits.linear, 1e-11);
    expectNear(fit.coefficients, [147.47538852370573, 0.48517842367692354], 1e-11);
    expectNear([(fit.coefficients[1] * mean(income)) / mean(food)], [0.763718077], 1e-9);
  });

  it("Working–Leser: the share of food on ln income, and its elasticity at the mean", () => {
    const fit = regression(share, logIncome, reduction);
    expectFit(fit, fits.workingLeser, 1e-11);
    expectNear(fit.coefficients, [1.2412265941, -0.0862701140203], 1e-10);
    expectNear([1 + fit.coefficients[1] / mean(share)], [0.868447242], 1e-9);
    // Least squares with a constant: at mean ln x the fitted share is the mean share, so both conventions coincide.
    expectNear([fit.coefficients[0] + fit.coefficients[1] * mean(logIncome)], [mean(share)], 1e-12);
  });

  it("the share of food on ln income and its square", () => {
    expectFit(regression(share, logIncome, reduction, true), fits.quadratic, 1e-9);
  });

  it("ln food on ln income", () => {
    expectFit(regression(food.map(Math.log), logIncome, reduction), fits.doubleLog, 1e-11);
  });
});

it("Working–Leser is an almost ideal system at one set of prices: the same elasticity through its own formulas", () => {
  const fit = regression(share, logIncome, "reflected");
  const size = { goods: 2, demographics: 0, alpha0: 0 };
  const free = SYSTEMS.aids.free(size, ["homogeneity", "symmetry"]);
  const [a, b] = fit.coefficients;
  const theta = [a, 1 - a, 0, 0, 0, 0, b, -b];
  const fitted = fittedFrom(seededRandom(1), "aids", size, ["homogeneity", "symmetry"], free, theta);
  const point = { prices: [1, 1], total: Math.exp(mean(logIncome)), demographics: [] };
  expect(elasticitiesAt(fitted, point).expenditure[0]).toBeCloseTo(0.868447242, 9);
});
