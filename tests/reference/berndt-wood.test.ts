import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { linearForm } from "../../server/engine/estimation/coefficient-form.ts";
import { conventionalCovariance, leastSquaresCovariance } from "../../server/engine/estimation/covariance.ts";
import type { Estimation } from "../../server/engine/estimation/estimation.ts";
import { leastSquares, maximumLikelihood, seeminglyUnrelated } from "../../server/engine/estimation/estimators.ts";
import { fitMeasures } from "../../server/engine/estimation/fit-measures.ts";
import type { MomentSource } from "../../server/engine/estimation/moment-source.ts";
import { reduceRows } from "../../server/engine/estimation/moments.ts";
import { nestedForm } from "../../server/engine/inference/nested-form.ts";
import { restrictionTests } from "../../server/engine/inference/restriction-tests.ts";
import { scoreTest } from "../../server/engine/inference/score-test.ts";
import { waldTest } from "../../server/engine/inference/wald-test.ts";
import { QUIET } from "../../server/engine/run.ts";
import { chiSquareTail } from "../../shared/numerics/distributions.ts";
import { symmetricEigen } from "../../shared/numerics/eigen.ts";
import { type Dependence, freeForm, remainder } from "../../shared/systems/free-form.ts";

/**
 * Berndt & Wood's (1975) manufacturing cost shares 1947–71, translog: s = α + Γ ln p, four inputs, one
 * dropped (Greene 2003, chapter 14). Numbers recomputed with R's systemfit 1.1.28, to the digits kept.
 */
const fixture = JSON.parse(readFileSync(new URL("./fixtures/berndt-wood.json", import.meta.url), "utf8")) as {
  inputs: string[];
  year: number[];
  shares: number[][];
  printedMaterials: number[];
  prices: number[][];
};
const INPUTS = [0, 1, 2, 3];
const [K, L, E, M] = INPUTS;
const rows = fixture.year.length;
const alpha = (i: number) => i;
const gamma = (i: number, j: number) => 4 + 4 * i + j;

function sourceWith(materials: (t: number) => number): MomentSource {
  return {
    rows,
    columns: INPUTS.map((i) => Float64Array.from(fixture.prices, (row) => Math.log(row[i]))),
    columnLabels: fixture.inputs.map((input) => `ln price of ${input}`),
    terms: [[0, 0], ...INPUTS.map((i) => [0, i + 1] as const)],
    responses: INPUTS.map((i) => Float64Array.from(fixture.shares, (row, t) => row[i] ?? materials(t))),
    responseLabels: fixture.inputs,
  };
}
const addingUp = reduceRows(
  sourceWith((t) => 1 - fixture.shares[t][0] - fixture.shares[t][1] - fixture.shares[t][2]),
  "berndt-wood",
  QUIET,
);

type Restrictions = "none" | "homogeneity" | "symmetry";

function translog(impose: Restrictions) {
  const dependences: Dependence[] = [remainder(INPUTS.map(alpha), 1)];
  for (const j of INPUTS)
    dependences.push(
      remainder(
        INPUTS.map((i) => gamma(i, j)),
        0,
      ),
    );
  if (impose !== "none") {
    for (const i of [K, L, E])
      dependences.push(
        remainder(
          INPUTS.map((j) => gamma(i, j)),
          0,
        ),
      );
  }
  if (impose === "symmetry") {
    for (const [i, j] of [
      [L, K],
      [E, K],
      [E, L],
    ])
      dependences.push({ place: gamma(i, j), constant: 0, on: [[gamma(j, i), 1]] });
  }
  const places = [
    ...INPUTS.map((i) => [i, 0] as const),
    ...INPUTS.flatMap((i) => INPUTS.map((j) => [i, j + 1] as const)),
  ];
  return linearForm(4, 5, places, freeForm(20, dependences));
}

function estimationOf(impose: Restrictions, dropped = M, moments = addingUp): Estimation {
  return {
    moments,
    form: translog(impose),
    equations: INPUTS.filter((i) => i !== dropped),
    coefficientLabels: Array.from({ length: 20 }, (_, a) => `coefficient ${a}`),
  };
}

function iterated(impose: Restrictions, dropped = M, moments = addingUp, step: "update" | "newton" = "update") {
  const estimation = estimationOf(impose, dropped, moments);
  const start = new Array<number>(estimation.form.free).fill(0);
  const solution = maximumLikelihood(estimation, true, start, step, QUIET);
  return { estimation, solution, logLikelihood: fitMeasures(estimation, solution).logLikelihood };
}

function expectDigits(actual: number, expected: number, digits: number) {
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(0.5000001 * 10 ** -digits);
}

const symmetric = iterated("symmetry");

describe("iterated SUR with homogeneity and symmetry", () => {
  const expected: [place: number, estimate: number, standardError: number][] = [
    [alpha(K), 0.0568924781, 0.0013453978],
    [alpha(L), 0.2534380119, 0.002094503],
    [alpha(E), 0.0444099934, 0.0008533455],
    [gamma(K, K), 0.0294832676, 0.0057956416],
    [gamma(K, L), -0.0000470909, 0.003847865],
    [gamma(K, E), -0.0106754149, 0.0033883112],
    [gamma(L, L), 0.0754328717, 0.0067572442],
    [gamma(L, E), -0.0047563365, 0.0023440983],
    [gamma(E, E), 0.0183386989, 0.0049858552],
  ];

  it("estimates and standard errors", () => {
    const covariance = conventionalCovariance(symmetric.estimation, symmetric.solution);
    for (const [place, estimate, standardError] of expected) {
      expectDigits(symmetric.solution.theta[place], estimate, 10);
      expectDigits(Math.sqrt(covariance[place][place]), standardError, 10);
    }
  });

  it("the coefficients that the restrictions imply", () => {
    const { theta } = symmetric.solution;
    expectDigits(theta[alpha(M)], 0.6452595166, 10);
    expectDigits(theta[gamma(K, M)], -0.0187608, 7);
    expectDigits(theta[gamma(L, M)], -0.0706294, 7);
    expectDigits(theta[gamma(E, M)], -0.0029069, 7);
    expectDigits(theta[gamma(M, M)], 0.0922972, 7);
  });

  it.each([
    ["none", 356.0769255],
    ["homogeneity", 350.8875431],
    ["symmetry", 344.4673779],
  ] as const)("log-likelihood, %s imposed", (impose, expectedLogLikelihood) => {
    expectDigits(iterated(impose).logLikelihood, expectedLogLikelihood, 7);
    expectDigits(iterated(impose, M, addingUp, "newton").logLikelihood, expectedLogLikelihood, 7);
  });
});

describe("the deleted equation", () => {
  it("does not matter to iterated SUR", () => {
    for (const dropped of [K, L, E]) {
      const other = iterated("symmetry", dropped);
      expect(other.logLikelihood).toBeCloseTo(symmetric.logLikelihood, 9);
      other.solution.theta.forEach((value, a) => {
        expect(value).toBeCloseTo(symmetric.solution.theta[a], 10);
      });
    }
  });

  it.each([
    [K, 0.043736],
    [L, 0.042468],
    [E, 0.054325],
    [M, 0.029383],
  ])("does to one step from least squares with symmetry imposed (%d dropped)", (dropped, energy) => {
    const estimation = estimationOf("symmetry", dropped);
    const start = new Array<number>(estimation.form.free).fill(0);
    const first = leastSquares(estimation, false, start, QUIET);
    const { theta } = seeminglyUnrelated(estimation, first, start, QUIET);
    expectDigits(theta[gamma(E, E)], energy, 6);
  });

  it("does not matter to one step from least squares under homogeneity alone", () => {
    const oneStep = (dropped: number) => {
      const within = estimationOf("homogeneity", dropped);
      const first = leastSquares(within, true, new Array<number>(within.form.free).fill(0), QUIET);
      const estimation = estimationOf("symmetry", dropped);
      return seeminglyUnrelated(estimation, first, new Array<number>(estimation.form.free).fill(0), QUIET).theta;
    };
    const expected = oneStep(M);
    for (const dropped of [K, L, E]) {
      oneStep(dropped).forEach((value, a) => {
        expect(value).toBeCloseTo(expected[a], 11);
      });
    }
  });

  it.each([
    [K, 0.018216],
    [L, 0.018318],
    [E, 0.0186],
    [M, 0.018339],
  ])("matters even to iterated SUR where printed shares do not add up (%d dropped)", (dropped, energy) => {
    const printed = reduceRows(
      sourceWith((t) => fixture.printedMaterials[t]),
      "printed",
      QUIET,
    );
    expectDigits(iterated("symmetry", dropped, printed).solution.theta[gamma(E, E)], energy, 6);
  });
});

describe("tests", () => {
  const fitOf = (impose: Restrictions) => {
    const { estimation, logLikelihood } = iterated(impose);
    return { logLikelihood, freeCoefficients: estimation.form.free };
  };
  const [homogeneity, symmetry] = restrictionTests(
    { unrestricted: fitOf("none"), homogeneity: fitOf("homogeneity"), symmetry: fitOf("symmetry") },
    { rows, equations: 3, linear: { exact: true } },
  ).tests;

  it("homogeneity: LR, Italianer's LR, Laitinen's exact T² and F", () => {
    // From R's lm and qr on these data; systemfit's iterates stop at 10.37876481, half a unit of the last digit off.
    expectDigits(homogeneity.statistic, 10.37876480492805, 11);
    expect(homogeneity.degreesOfFreedom).toBe(3);
    expectDigits(homogeneity.pValue, 0.015606, 6);
    expectDigits(homogeneity.corrected.statistic, 7.680285956, 9);
    expectDigits(homogeneity.corrected.pValue, 0.0531027, 7);
    const exact = homogeneity.exact!;
    expect([exact.numerator, exact.denominator, exact.approximate]).toEqual([3, 18, false]);
    expectDigits(exact.tSquared, 10.29197621, 8);
    expectDigits(exact.f, 3.087592862, 9);
    expectDigits(exact.pValue, 0.05338436, 8);
  });

  it("homogeneity: Wald from the unrestricted fit, score from the restricted, W ≥ LR ≥ LM", () => {
    const [wide, narrow] = [iterated("none"), iterated("homogeneity")];
    const covariance = conventionalCovariance(wide.estimation, wide.solution);
    const { places } = wide.estimation.form.expand;
    const ofFree = places.map((a) => places.map((b) => covariance[a][b]));
    const restrictions = nestedForm(wide.estimation.form.expand, narrow.estimation.form.expand);
    const wald = waldTest(wide.solution.free, ofFree, restrictions);
    const score = scoreTest(wide.estimation, narrow.solution.theta, restrictions.normals.columns);
    if ("absent" in wald || "absent" in score) throw new Error("a test is absent");
    expectDigits(wald.statistic, 12.86497026, 8);
    expectDigits(wald.pValue, 0.004938, 6);
    expectDigits(score.statistic, 8.49397885, 8);
    expectDigits(score.pValue, 0.036833, 6);
  });

  it("homogeneity: Wald and score as they follow from T²", () => {
    const { tSquared } = homogeneity.exact!;
    const wald = (rows * tSquared) / 20;
    const score = (rows * tSquared) / (20 + tSquared);
    expectDigits(wald, 12.86497026, 8);
    expectDigits(score, 8.49397885, 8);
    expectDigits(chiSquareTail(wald, 3), 0.004938, 6);
    expectDigits(chiSquareTail(score, 3), 0.036833, 6);
    expect(wald).toBeGreaterThan(homogeneity.statistic);
    expect(homogeneity.statistic).toBeGreaterThan(score);
  });

  it("homogeneity equation by equation: t of Σ_j γ_ij, divisor T − k", () => {
    const estimation = estimationOf("none");
    const solution = leastSquares(estimation, true, new Array<number>(estimation.form.free).fill(0), QUIET);
    const covariance = leastSquaresCovariance(estimation, solution);
    const t = (i: number) => {
      const places = INPUTS.map((j) => gamma(i, j));
      const sum = places.reduce((total, a) => total + solution.theta[a], 0);
      const variance = places.reduce((total, a) => total + places.reduce((row, b) => row + covariance[a][b], 0), 0);
      return Math.abs(sum) / Math.sqrt((variance * rows) / 20);
    };
    expectDigits(t(K), 2.360980716, 9);
    expectDigits(t(L), 1.108522807, 9);
    expectDigits(t(E), 0.7863512762, 10);
  });

  it("symmetry given homogeneity: LR and Italianer's LR", () => {
    expectDigits(symmetry.statistic, 12.8403304, 8);
    expect(symmetry.degreesOfFreedom).toBe(3);
    expectDigits(symmetry.pValue, 0.0049949, 7);
    expectDigits(symmetry.corrected.statistic, 10.01545771, 8);
    expectDigits(symmetry.corrected.pValue, 0.0184352, 7);
    expect(symmetry.exact).toBeUndefined();
  });
});

describe("what the estimates imply", () => {
  const { theta } = symmetric.solution;
  const sharesIn = (t: number) =>
    INPUTS.map((i) =>
      INPUTS.reduce((sum, j) => sum + theta[gamma(i, j)] * Math.log(fixture.prices[t][j]), theta[alpha(i)]),
    );
  const compensated = (w: number[], i: number, j: number) => theta[gamma(i, j)] / w[i] + w[j] - (i === j ? 1 : 0);
  const in1959 = sharesIn(fixture.year.indexOf(1959));

  it("fitted shares and compensated elasticities of 1959", () => {
    [0.05639809, 0.27452024, 0.04388882, 0.62519286].forEach((share, i) => {
      expectDigits(in1959[i], share, 8);
    });
    const elasticities = [
      [-0.42083, 0.27369, -0.1454, 0.29254],
      [0.05623, -0.4507, 0.02656, 0.36791],
      [-0.18684, 0.16615, -0.53827, 0.55896],
      [0.02639, 0.16155, 0.03924, -0.22718],
    ];
    for (const i of INPUTS) for (const j of INPUTS) expectDigits(compensated(in1959, i, j), elasticities[i][j], 5);
  });

  it("Allen elasticities of substitution of 1959", () => {
    const allen: [number, number, number][] = [
      [K, K, -7.4618],
      [K, L, 0.997],
      [K, E, -3.3129],
      [K, M, 0.4679],
      [L, L, -1.6418],
      [L, E, 0.6052],
      [L, M, 0.5885],
      [E, E, -12.2643],
      [E, M, 0.8941],
      [M, M, -0.3634],
    ];
    for (const [i, j, value] of allen) expectDigits(compensated(in1959, i, j) / in1959[j], value, 4);
  });

  it("concavity at every observation: the largest eigenvalue is the null one, the next below zero", () => {
    const seconds = fixture.year.map((_, t) => {
      const w = sharesIn(t);
      const matrix = INPUTS.map((i) => INPUTS.map((j) => theta[gamma(i, j)] + w[i] * w[j] - (i === j ? w[i] : 0)));
      const { values } = symmetricEigen(matrix);
      expect(Math.abs(values[0])).toBeLessThan(1e-15);
      return values[1];
    });
    expectDigits(Math.max(...seconds), -0.0101281843, 10);
  });
});
