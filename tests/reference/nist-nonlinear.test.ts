import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import type { CoefficientForm } from "../../server/engine/estimation/coefficient-form.ts";
import { conventionalCovariance } from "../../server/engine/estimation/covariance.ts";
import { leastSquares, maximumLikelihood } from "../../server/engine/estimation/estimators.ts";
import type { Moments } from "../../server/engine/estimation/moments.ts";
import { covarianceOf } from "../../server/engine/estimation/weighting.ts";
import { Refusal } from "../../server/engine/refusal.ts";
import { QUIET } from "../../server/engine/run.ts";

/**
 * Nonlinear regressions of the NIST Statistical Reference Datasets, from NIST's two starts each, by the
 * optimiser that demand systems use. What it minimises is linear in terms with coefficients C(φ); with every row
 * a term of its own and C_t(φ) = f(x_t, φ) that is any least-squares problem whatever.
 *
 * Certified values from memory; the fits reproduce them to the digits asked for here.
 */
interface Problem {
  readonly x: number[];
  readonly y: number[];
}
const data = JSON.parse(readFileSync(new URL("./fixtures/nist.json", import.meta.url), "utf8")) as Record<
  string,
  Problem
>;

/** f(x, φ) and ∂f/∂φ. */
type Curve = (x: number, phi: readonly number[]) => { value: number; slopes: number[] };

function problem({ x, y }: Problem, curve: Curve, coefficients: number) {
  const rows = y.length;
  const identity = { rows, columns: rows, values: new Float64Array(rows * rows) };
  for (let t = 0; t < rows; t++) identity.values[t * rows + t] = 1;
  const moments: Moments = {
    key: "curve",
    rows,
    weighted: false,
    responseLabels: ["y"],
    terms: identity,
    responses: { rows, columns: 1, values: Float64Array.from(y) },
    dependent: [],
  };
  const all = Array.from({ length: coefficients }, (_, f) => f);
  const form: CoefficientForm = {
    free: coefficients,
    coefficients: (phi) => [x.map((at) => curve(at, phi).value)],
    derivatives: (phi) => {
      const slopes = x.map((at) => curve(at, phi).slopes);
      return all.map((f) => slopes.map((row, t) => [0, t, row[f]] as const));
    },
    expand: { matrix: all.map((a) => all.map((b) => (a === b ? 1 : 0))), offset: all.map(() => 0), places: all },
  };
  return { moments, form, equations: [0], coefficientLabels: all.map((f) => `b${f + 1}`) };
}

const misra1a: Curve = (x, [b1, b2]) => {
  const decay = Math.exp(-b2 * x);
  return { value: b1 * (1 - decay), slopes: [1 - decay, b1 * x * decay] };
};
const power: Curve = (x, [b1, b2]) => ({ value: b1 * x ** b2, slopes: [x ** b2, b1 * x ** b2 * Math.log(x)] });
const rational: Curve = (x, [b1, b2, b3, b4]) => {
  const above = x * x + x * b2;
  const below = x * x + x * b3 + b4;
  const value = (b1 * above) / below;
  return { value, slopes: [above / below, (b1 * x) / below, (-value * x) / below, -value / below] };
};

interface Certified {
  readonly name: string;
  readonly curve: Curve;
  readonly starts: number[][];
  readonly estimates: number[];
  readonly standardErrors?: number[];
  readonly residualSquares: number;
}
const CERTIFIED: Certified[] = [
  {
    name: "misra1a",
    curve: misra1a,
    starts: [
      [500, 0.0001],
      [250, 0.0005],
    ],
    estimates: [2.3894212918e2, 5.5015643181e-4],
    residualSquares: 1.2455138894e-1,
  },
  {
    name: "danWood",
    curve: power,
    starts: [
      [1, 5],
      [0.7, 4],
    ],
    estimates: [7.6886226176e-1, 3.8604055871],
    standardErrors: [1.828197386e-2, 5.1726610913e-2],
    residualSquares: 4.3173084083e-3,
  },
  {
    name: "boxBod",
    curve: misra1a,
    starts: [
      [1, 1],
      [100, 0.75],
    ],
    estimates: [2.1380940889e2, 5.4723748542e-1],
    residualSquares: 1.1680088766e3,
  },
  {
    name: "mgh09",
    curve: rational,
    // NIST's farther start is the next test's.
    starts: [[0.25, 0.39, 0.415, 0.39]],
    estimates: [1.9280693458e-1, 1.9128232873e-1, 1.2305650693e-1, 1.3606233068e-1],
    residualSquares: 3.0750560385e-4,
  },
];

function expectDigits(actual: readonly number[], certified: readonly number[], digits: number) {
  const worst = Math.max(...actual.map((value, k) => Math.abs(value / certified[k] - 1)));
  expect(-Math.log10(worst)).toBeGreaterThan(digits);
}

describe.each(CERTIFIED)("$name", ({ name, curve, starts, estimates, standardErrors, residualSquares }) => {
  const { x, y } = data[name];

  it.each(starts.map((start) => ({ start })))("by least squares from $start", ({ start }) => {
    const estimation = problem({ x, y }, curve, start.length);
    const solution = leastSquares(estimation, false, start, QUIET);
    expectDigits(solution.theta, estimates, 7);
    expectDigits(covarianceOf(solution.residuals, 1)[0], [residualSquares], 8);
    if (standardErrors === undefined) return;
    const unscaled = conventionalCovariance(estimation, solution);
    const variance = residualSquares / (y.length - start.length);
    expectDigits(
      unscaled.map((row, a) => Math.sqrt(variance * row[a])),
      standardErrors,
      7,
    );
  });

  it("by maximum likelihood from the nearer start", () => {
    const estimation = problem({ x, y }, curve, estimates.length);
    expectDigits(maximumLikelihood(estimation, false, starts.at(-1)!, "newton", QUIET).theta, estimates, 7);
  });
});

it("mgh09 from NIST's farther start runs off to where its coefficients are told apart no more, and says so", () => {
  const start = [25, 39, 41.5, 39];
  const estimation = problem(data.mgh09, rational, start.length);
  const refused = () => leastSquares(estimation, false, start, QUIET);
  expect(refused).toThrow(Refusal);
  expect(refused).toThrow("the data do not tell b4 apart from the other coefficients");
});
