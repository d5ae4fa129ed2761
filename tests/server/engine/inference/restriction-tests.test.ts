import { describe, expect, it } from "vitest";
import {
  laitinenTest,
  likelihoodRatioTest,
  restrictionTests,
} from "../../../../server/engine/inference/restriction-tests.ts";
import { chiSquareTail, fTail } from "../../../../shared/numerics/distributions.ts";

/** x with P(X > x) = p for X ~ χ²(df). */
function chiSquarePoint(p: number, df: number): number {
  let [low, high] = [0, 1000];
  for (let halving = 0; halving < 200; halving++) {
    const middle = (low + high) / 2;
    if (chiSquareTail(middle, df) > p) low = middle;
    else high = middle;
  }
  return low;
}

describe("Laitinen's (1978) exact distribution of the homogeneity test", () => {
  // T = 31, Rotterdam with n + 1 regressors: true sizes of the nominal χ² test, recomputed from the distribution.
  it.each([
    [5, 0.1169, 0.0444],
    [8, 0.2495, 0.1327],
    [11, 0.5228, 0.3789],
    [14, 0.8888, 0.8256],
  ])("n = %d: the 5 %% test rejects in %d, the 1 %% test in %d", (goods, five, one) => {
    const equations = goods - 1;
    const freedom = 31 - (goods + 1);
    const trueSize = (level: number) => {
      const tSquared = chiSquarePoint(level, equations);
      const likelihoodRatio = 31 * Math.log1p(tSquared / freedom);
      const unrestricted = { logLikelihood: 0, freeCoefficients: equations * (goods + 1) };
      const test = laitinenTest(likelihoodRatio, unrestricted, { rows: 31, equations }, true)!;
      expect(test.tSquared).toBeCloseTo(tSquared, 9);
      expect(test.denominator).toBe(31 - 2 * goods + 1);
      return test.pValue;
    };
    expect(trueSize(0.05)).toBeCloseTo(five, 4);
    expect(trueSize(0.01)).toBeCloseTo(one, 4);
  });

  it("has no denominator left when goods are many for the rows", () => {
    const unrestricted = { logLikelihood: 0, freeCoefficients: 15 * 17 };
    expect(laitinenTest(5, unrestricted, { rows: 31, equations: 15 }, true)).toBeUndefined();
  });
});

describe("Italianer's (1985) correction", () => {
  it("equals Anderson's Bartlett factor where q restrictions act in each equation", () => {
    const [rows, equations, regressors, perEquation] = [40, 4, 7, 1];
    const wide = { logLikelihood: 10, freeCoefficients: equations * regressors };
    const narrow = { logLikelihood: 6, freeCoefficients: equations * (regressors - perEquation) };
    const test = likelihoodRatioTest("homogeneity", wide, narrow, { rows, equations })!;
    const bartlett = (rows - regressors - (equations - perEquation + 1) / 2) / rows;
    expect(test.statistic).toBe(8);
    expect(test.corrected.statistic).toBeCloseTo(8 * bartlett, 12);
    expect(test.degreesOfFreedom).toBe(4);
    expect(test.pValue).toBeCloseTo(0.0915782, 7);
  });

  it("gives no test where it would be negative, nor where nothing is restricted", () => {
    const wide = { logLikelihood: 10, freeCoefficients: 20 };
    const narrow = { logLikelihood: 6, freeCoefficients: 18 };
    expect(likelihoodRatioTest("homogeneity", wide, narrow, { rows: 6, equations: 4 })).toBeUndefined();
    expect(likelihoodRatioTest("homogeneity", wide, wide, { rows: 60, equations: 4 })).toBeUndefined();
  });
});

describe("the tests of a system", () => {
  const unrestricted = { logLikelihood: 30, freeCoefficients: 15 };
  const homogeneity = { logLikelihood: 27, freeCoefficients: 12 };
  const symmetry = { logLikelihood: 26, freeCoefficients: 9 };
  const system = { rows: 50, equations: 3 };

  it("are those whose fits exist; the others say why there is none", () => {
    const none = { refused: "The moments are singular." };
    const named = (fits: Parameters<typeof restrictionTests>[0]) => {
      const { tests, untested } = restrictionTests(fits, system);
      return [tests.map((test) => test.restriction), untested.map((test) => test.restriction)];
    };
    const [first, second] = ["homogeneity", "symmetry given homogeneity"];
    expect(named({ unrestricted, homogeneity, symmetry })).toEqual([[first, second], []]);
    expect(named({ unrestricted: none, homogeneity, symmetry })).toEqual([[second], [first]]);
    expect(named({ unrestricted, homogeneity })).toEqual([[first], []]);
    expect(named({ unrestricted, homogeneity: none, symmetry })).toEqual([[], [first, second]]);
    const { untested } = restrictionTests({ unrestricted, homogeneity: none, symmetry }, system);
    expect(untested[0].reason).toBe("Under the restriction there is no fit: The moments are singular.");
    expect(untested[1].reason).toBe("Without the restriction there is no fit: The moments are singular.");
  });

  it("are none where rows are too few to correct them, and say so with the numbers", () => {
    const wide = { logLikelihood: 30, freeCoefficients: 20 };
    const { tests, untested } = restrictionTests(
      { unrestricted: wide, homogeneity: { ...wide, freeCoefficients: 16 } },
      { rows: 6, equations: 4 },
    );
    expect(tests).toEqual([]);
    expect(untested[0].reason).toMatch(/^6 rows are too few .* 20 coefficients in 4 equations/);
  });

  it("have Laitinen's beside homogeneity in linear systems only, exact or not as the index says", () => {
    const fits = { unrestricted, homogeneity, symmetry };
    expect(restrictionTests(fits, system).tests[0].exact).toBeUndefined();
    const [first, second] = restrictionTests(fits, { ...system, linear: { exact: false } }).tests;
    expect(first.exact).toMatchObject({ numerator: 3, denominator: 50 - 5 - 3 + 1, approximate: true });
    expect(first.exact!.pValue).toBeCloseTo(fTail(first.exact!.f, 3, 43), 14);
    expect(second.exact).toBeUndefined();
  });

  it("count a likelihood that rounding made larger as equal", () => {
    const rounded = { logLikelihood: 30 + 1e-12, freeCoefficients: 12 };
    const [test] = restrictionTests({ unrestricted, homogeneity: rounded }, system).tests;
    expect([test.statistic, test.pValue]).toEqual([0, 1]);
  });
});
