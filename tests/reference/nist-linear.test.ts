import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { linearForm } from "../../server/engine/estimation/coefficient-form.ts";
import { conventionalCovariance } from "../../server/engine/estimation/covariance.ts";
import { leastSquares } from "../../server/engine/estimation/estimators.ts";
import { fitMeasures } from "../../server/engine/estimation/fit-measures.ts";
import { reduceRows } from "../../server/engine/estimation/moments.ts";
import { covarianceOf } from "../../server/engine/estimation/weighting.ts";
import { QUIET } from "../../server/engine/run.ts";

/**
 * Straight lines of the NIST Statistical Reference Datasets, certified to 15 digits: Norris (calibration of
 * ozone monitors, "lower difficulty") and NoInt1 (eleven points, no intercept, "average difficulty"). The data were
 * written down from memory and checked by their fit, which reproduces every certified number.
 */
const { norris } = JSON.parse(readFileSync(new URL("./fixtures/nist.json", import.meta.url), "utf8")) as {
  norris: { x: number[]; y: number[] };
};

function line(x: readonly number[], y: readonly number[], intercept: boolean, reduction: "reflected" | "summed") {
  const source = {
    rows: y.length,
    columns: [Float64Array.from(x)],
    columnLabels: ["x"],
    terms: [[0, 0] as const, [0, 1] as const],
    responses: [Float64Array.from(y)],
    responseLabels: ["y"],
  };
  const places = (intercept ? [0, 1] : [1]).map((term) => [0, term] as const);
  const moments = reduceRows(source, "line", QUIET, reduction);
  const estimation = { moments, form: linearForm(1, 2, places), equations: [0], coefficientLabels: places.map(String) };
  const start = places.map(() => 0);
  const solution = leastSquares(estimation, false, start, QUIET);
  const residualSquares = covarianceOf(solution.residuals, 1)[0][0];
  const variance = residualSquares / (y.length - places.length);
  const unscaled = conventionalCovariance(estimation, solution);
  return {
    coefficients: solution.theta,
    standardErrors: unscaled.map((row, a) => Math.sqrt(variance * row[a])),
    deviation: Math.sqrt(variance),
    residualSquares,
    rSquared: fitMeasures(estimation, solution).rSquared[0],
  };
}

/** Correct digits: −log₁₀ of the relative error. */
function expectDigits(actual: number, certified: number, digits: number) {
  expect(-Math.log10(Math.abs(actual - certified) / Math.abs(certified))).toBeGreaterThan(digits);
}

describe.each([
  ["reflected", 11],
  // The squares of the residuals are a few millionths of those of y, of which they are what is left.
  ["summed", 10],
] as const)("NIST straight lines by rows %s", (reduction, digits) => {
  it("Norris", () => {
    const fit = line(norris.x, norris.y, true, reduction);
    expectDigits(fit.coefficients[0], -0.262323073774029, digits);
    expectDigits(fit.coefficients[1], 1.00211681802045, 13);
    expectDigits(fit.standardErrors[0], 0.232818234301152, digits);
    expectDigits(fit.standardErrors[1], 0.000429796848199937, digits);
    expectDigits(fit.deviation, 0.884796396144373, digits);
  });

  it("NoInt1", () => {
    const x = Array.from({ length: 11 }, (_, t) => 60 + t);
    const y = x.map((value) => value + 70);
    const fit = line(x, y, false, reduction);
    expectDigits(fit.coefficients[0], 2.07438016528926, 13);
    expectDigits(fit.standardErrors[0], 0.0165289256198347, 11);
    // NIST's R² of a line without intercept is about zero, not about the mean.
    const squares = y.reduce((sum, value) => sum + value * value, 0);
    expectDigits(1 - fit.residualSquares / squares, 0.999365492298663, 13);
  });
});
