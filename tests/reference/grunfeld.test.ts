import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { linearForm } from "../../server/engine/estimation/coefficient-form.ts";
import { conventionalCovariance } from "../../server/engine/estimation/covariance.ts";
import { durbinWatson } from "../../server/engine/estimation/durbin-watson.ts";
import type { Estimation } from "../../server/engine/estimation/estimation.ts";
import { leastSquares, maximumLikelihood, seeminglyUnrelated } from "../../server/engine/estimation/estimators.ts";
import { fitMeasures } from "../../server/engine/estimation/fit-measures.ts";
import type { Solution } from "../../server/engine/estimation/minimise.ts";
import type { MomentSource } from "../../server/engine/estimation/moment-source.ts";
import { reduceRows } from "../../server/engine/estimation/moments.ts";
import { covarianceOf } from "../../server/engine/estimation/weighting.ts";
import { QUIET } from "../../server/engine/run.ts";

/**
 * Grunfeld's investment equations, each firm its own regressors (Zellner 1962, Journal of the American
 * Statistical Association 57; Greene 2003, chapter 14), residual covariances divided by T. Reference:
 * R's systemfit 1.1.28 (fixtures/grunfeld.R); the printed numbers of Zellner and Greene agree with it.
 */
interface Reference {
  readonly coefficients: number[];
  readonly standardErrors: number[];
  readonly residualCovariance: number[][];
  readonly logLikelihood: number;
}
const fixture = JSON.parse(readFileSync(new URL("./fixtures/grunfeld.json", import.meta.url), "utf8")) as {
  data: { investment: number[]; value: number[]; capital: number[] }[];
  twoFirms: Reference;
  twoFirmsIterated: Reference;
  fiveFirms: Reference;
  fiveFirmsIterated: Reference;
};

function investment(firms: readonly number[]): { estimation: Estimation; source: MomentSource } {
  const data = firms.map((firm) => fixture.data[firm]);
  const columns = data.flatMap(({ value, capital }) => [Float64Array.from(value), Float64Array.from(capital)]);
  const source: MomentSource = {
    rows: data[0].investment.length,
    columns,
    columnLabels: firms.flatMap((firm) => [`value ${firm}`, `capital ${firm}`]),
    terms: [[0, 0], ...columns.map((_, j) => [0, j + 1] as const)],
    responses: data.map((firm) => Float64Array.from(firm.investment)),
    responseLabels: firms.map((firm) => `investment ${firm}`),
  };
  const places = firms.flatMap((_, e) => [0, 2 * e + 1, 2 * e + 2].map((term) => [e, term] as const));
  const form = linearForm(firms.length, columns.length + 1, places);
  const equations = firms.map((_, e) => e);
  const moments = reduceRows(source, "grunfeld", QUIET);
  return { source, estimation: { moments, form, equations, coefficientLabels: places.map(String) } };
}

function expectNear(actual: readonly number[], expected: readonly number[], bound: number) {
  expect(actual.length).toBe(expected.length);
  actual.forEach((value, k) => {
    expect(Math.abs(value - expected[k]) / Math.abs(expected[k])).toBeLessThan(bound);
  });
}

function expectReference(estimation: Estimation, solution: Solution, reference: Reference, bound: number) {
  expectNear(solution.theta, reference.coefficients, bound);
  const covariance = conventionalCovariance(estimation, solution);
  expectNear(
    covariance.map((row, a) => Math.sqrt(row[a])),
    reference.standardErrors,
    bound,
  );
  const { rows } = estimation.moments;
  expectNear(covarianceOf(solution.residuals, rows).flat(), reference.residualCovariance.flat(), bound);
  expectNear([fitMeasures(estimation, solution).logLikelihood], [reference.logLikelihood], bound);
}

const start = (estimation: Estimation) => new Array<number>(estimation.form.free).fill(0);

describe("General Electric and Westinghouse", () => {
  const { estimation, source } = investment([2, 3]);
  const first = leastSquares(estimation, false, start(estimation), QUIET);

  it("least squares: coefficients, residual sums of squares, R², Durbin–Watson", () => {
    const expected = [-9.956306455, 0.02655118918, 0.1516938703, -0.50939018, 0.05289412622, 0.09240649187];
    expectNear(first.theta, expected, 1e-8);
    const squares = covarianceOf(first.residuals, 1);
    expectNear([squares[0][0], squares[1][1] / 17], [13216.5878, 104.3078783], 1e-8);
    expectNear(fitMeasures(estimation, first).rSquared, [0.7053066882, 0.7444461], 1e-7);
    const years = Float64Array.from({ length: 20 }, (_, t) => 1935 + t);
    expect(durbinWatson(source, years, estimation.form.coefficients(first.free))![0]).toBeCloseTo(1.0721, 4);
  });

  it("residual covariance of least squares, divided by T", () => {
    const covariance = covarianceOf(first.residuals, 20);
    expectNear([covariance[0][0], covariance[0][1], covariance[1][1]], [660.8293885, 176.4490614, 88.66169652], 1e-8);
  });

  it("seemingly unrelated, one step", () => {
    const solution = seeminglyUnrelated(estimation, first, start(estimation), QUIET);
    expectReference(estimation, solution, fixture.twoFirms, 1e-11);
  });

  it.each(["update", "newton"] as const)("iterated to maximum likelihood (%s)", (step) => {
    const solution = maximumLikelihood(estimation, false, start(estimation), step, QUIET);
    expectReference(estimation, solution, fixture.twoFirmsIterated, 1e-9);
  });
});

describe("five firms", () => {
  const { estimation } = investment([0, 1, 2, 3, 4]);

  it("seemingly unrelated, one step", () => {
    const first = leastSquares(estimation, false, start(estimation), QUIET);
    expectReference(
      estimation,
      seeminglyUnrelated(estimation, first, start(estimation), QUIET),
      fixture.fiveFirms,
      1e-10,
    );
  });

  it.each(["update", "newton"] as const)("iterated to maximum likelihood (%s)", (step) => {
    const solution = maximumLikelihood(estimation, false, start(estimation), step, QUIET);
    expectReference(estimation, solution, fixture.fiveFirmsIterated, 1e-8);
  });
});
