import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { linearForm } from "../../server/engine/estimation/coefficient-form.ts";
import { conventionalCovariance } from "../../server/engine/estimation/covariance.ts";
import { leastSquares, seeminglyUnrelated } from "../../server/engine/estimation/estimators.ts";
import { reduceRows } from "../../server/engine/estimation/moments.ts";
import { covarianceOf } from "../../server/engine/estimation/weighting.ts";
import { QUIET } from "../../server/engine/run.ts";

/**
 * Kmenta's food market (Elements of Econometrics, 2nd edition 1986, table 13-1; results table 13-2, citation from
 * memory) without instruments: equation by equation and seemingly unrelated. Reference: R's systemfit
 * (fixtures/kmenta-unrelated.R).
 */
interface Fit {
  readonly coefficients: number[];
  readonly standardErrors: number[];
  readonly residualCovariance: number[][];
}
const fixture = JSON.parse(
  readFileSync(new URL("./fixtures/kmenta-unrelated.json", import.meta.url), "utf8"),
) as Record<"consump" | "price" | "income" | "farmPrice" | "trend", number[]> &
  Record<"leastSquares" | "seeminglyUnrelated" | "seeminglyUnrelatedByT", Fit>;

const T = 20;
/** Regressors of each equation beside the constant: price, income, farm price and trend are terms 1 to 4. */
const TERMS = [
  [0, 1, 2],
  [0, 1, 3, 4],
];
const places = TERMS.flatMap((terms, equation) => terms.map((term) => [equation, term] as const));
const source = {
  rows: T,
  columns: [fixture.price, fixture.income, fixture.farmPrice, fixture.trend].map((values) => Float64Array.from(values)),
  columnLabels: ["price", "income", "farm price", "trend"],
  terms: [0, 1, 2, 3, 4].map((place) => [0, place] as const),
  responses: [fixture.consump, fixture.consump].map((values) => Float64Array.from(values)),
  responseLabels: ["demand", "supply"],
};
const start = places.map(() => 0);

function expectNear(actual: readonly number[], expected: readonly number[], bound: number) {
  expect(actual.length).toBe(expected.length);
  actual.forEach((value, k) => {
    expect(Math.abs(value / expected[k] - 1)).toBeLessThan(bound);
  });
}

describe.each(["reflected", "summed"] as const)("Kmenta's food market by rows %s", (reduction) => {
  const moments = reduceRows(source, "kmenta", QUIET, reduction);
  const estimation = {
    moments,
    form: linearForm(2, 5, places),
    equations: [0, 1],
    coefficientLabels: places.map(String),
  };
  const first = leastSquares(estimation, false, start, QUIET);
  const squares = covarianceOf(first.residuals, 1);

  it("equation by equation, with the divisor T − k", () => {
    expectNear(first.theta, fixture.leastSquares.coefficients, 1e-9);
    // Printed: demand 99.8954, −0.3163, 0.3346; supply 58.2754, 0.1604, 0.2481, 0.2483 (citation from memory).
    expectNear(first.theta, [99.8954, -0.3163, 0.3346, 58.2754, 0.1604, 0.2481, 0.2483], 5e-4);
    TERMS.forEach((terms, equation) => {
      const form = linearForm(
        2,
        5,
        terms.map((term) => [equation, term] as const),
      );
      const alone = { ...estimation, form, equations: [equation], coefficientLabels: terms.map(String) };
      const none = terms.map(() => 0);
      const unscaled = conventionalCovariance(alone, leastSquares(alone, false, none, QUIET));
      const variance = squares[equation][equation] / (T - terms.length);
      const from = equation === 0 ? 0 : 3;
      const expected = fixture.leastSquares.standardErrors.slice(from, from + terms.length);
      expectNear(
        unscaled.map((row, a) => Math.sqrt(variance * row[a])),
        expected,
        1e-9,
      );
    });
  });

  it("residual covariance of least squares with systemfit's geometric-mean divisor", () => {
    const divisor = (i: number, j: number) => Math.sqrt((T - TERMS[i].length) * (T - TERMS[j].length));
    const scaled = squares.map((row, i) => row.map((value, j) => value / divisor(i, j)));
    expectNear(scaled.flat(), fixture.leastSquares.residualCovariance.flat(), 1e-9);
  });

  it("seemingly unrelated, residual covariance divided by T", () => {
    const solution = seeminglyUnrelated(estimation, first, start, QUIET);
    const reference = fixture.seeminglyUnrelatedByT;
    expectNear(solution.theta, reference.coefficients, 1e-9);
    const errors = conventionalCovariance(estimation, solution).map((row, a) => Math.sqrt(row[a]));
    expectNear(errors, reference.standardErrors, 1e-9);
    expectNear(covarianceOf(solution.residuals, T).flat(), reference.residualCovariance.flat(), 1e-9);
  });
});
