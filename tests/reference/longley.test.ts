import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { linearForm } from "../../server/engine/estimation/coefficient-form.ts";
import { conventionalCovariance } from "../../server/engine/estimation/covariance.ts";
import { leastSquares } from "../../server/engine/estimation/estimators.ts";
import { fitMeasures } from "../../server/engine/estimation/fit-measures.ts";
import type { MomentSource } from "../../server/engine/estimation/moment-source.ts";
import { reduceRows } from "../../server/engine/estimation/moments.ts";
import { covarianceOf } from "../../server/engine/estimation/weighting.ts";
import { QUIET } from "../../server/engine/run.ts";

/**
 * Longley's regression (NIST StRD, "higher difficulty"; certified to 15 digits). The condition number of
 * the centred and scaled regressors is 1e2, of the raw ones 5e9: whitening must not lose what reflections keep.
 */
const { x, y, columns, certified } = JSON.parse(
  readFileSync(new URL("./fixtures/longley.json", import.meta.url), "utf8"),
) as {
  x: number[][];
  y: number[];
  columns: string[];
  certified: {
    coefficients: number[];
    standardErrors: number[];
    residualDeviation: number;
    rSquared: number;
    residualSquares: number;
  };
};

const source: MomentSource = {
  rows: y.length,
  columns: columns.map((_, j) => Float64Array.from(x, (row) => row[j])),
  columnLabels: columns,
  terms: [[0, 0], ...columns.map((_, j) => [0, j + 1] as const)],
  responses: [Float64Array.from(y)],
  responseLabels: ["employment"],
};
const form = linearForm(
  1,
  7,
  Array.from({ length: 7 }, (_, term) => [0, term] as const),
);

function expectDigits(actual: number, expected: number, digits: number) {
  expect(Math.abs(actual - expected) / Math.abs(expected)).toBeLessThan(10 ** -digits);
}

describe.each([
  ["reflected", 11],
  // Sums of squares of whitened columns: the regressors that are left are not quite orthogonal.
  ["summed", 9],
] as const)("Longley by rows %s, to %d digits", (reduction, digits) => {
  const moments = reduceRows(source, "longley", QUIET, reduction);
  const estimation = { moments, form, equations: [0], coefficientLabels: ["constant", ...columns] };
  const solution = leastSquares(estimation, false, new Array<number>(7).fill(0), QUIET);
  const residualSquares = covarianceOf(solution.residuals, 1)[0][0];

  it("coefficients", () => {
    solution.theta.forEach((value, a) => {
      expectDigits(value, certified.coefficients[a], digits);
    });
  });

  it("residual sum of squares, R²", () => {
    expectDigits(residualSquares, certified.residualSquares, digits);
    expectDigits(fitMeasures(estimation, solution).rSquared[0], certified.rSquared, digits);
  });

  it("standard errors, with the textbook divisor T − k", () => {
    const deviation = Math.sqrt(residualSquares / (y.length - 7));
    expectDigits(deviation, certified.residualDeviation, digits);
    const unscaled = conventionalCovariance(estimation, solution);
    certified.standardErrors.forEach((expected, a) => {
      expectDigits(deviation * Math.sqrt(unscaled[a][a]), expected, digits);
    });
  });
});
