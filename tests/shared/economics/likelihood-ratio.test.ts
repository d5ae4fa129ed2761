import { expect, it } from "vitest";
import { likelihoodRatio } from "../../../shared/economics/likelihood-ratio.ts";

it("has twice the difference of the likelihoods on the coefficients between", () => {
  const { statistic, degreesOfFreedom, pValue } = likelihoodRatio(
    { logLikelihood: -100, freeCoefficients: 10 },
    { logLikelihood: -97.5, freeCoefficients: 12 },
  );
  expect([statistic, degreesOfFreedom]).toEqual([5, 2]);
  // P(χ²(2) > x) = e^{-x/2}.
  expect(pValue).toBeCloseTo(Math.exp(-2.5), 14);
});

it("is nought where the larger fits no better, within the tolerance of iterations", () => {
  const ratio = likelihoodRatio(
    { logLikelihood: -100, freeCoefficients: 10 },
    { logLikelihood: -100.00001, freeCoefficients: 12 },
  );
  expect(ratio).toEqual({ statistic: 0, degreesOfFreedom: 2, pValue: 1 });
});

it("refuses a larger system that fits worse, and one that is no larger, with both numbers", () => {
  const smaller = { logLikelihood: -100, freeCoefficients: 10 };
  expect(() => likelihoodRatio(smaller, { logLikelihood: -101, freeCoefficients: 12 })).toThrow(
    /-101\.000.*-100\.000.*stopped short/,
  );
  expect(() => likelihoodRatio(smaller, { logLikelihood: -99, freeCoefficients: 10 })).toThrow(
    /10 free coefficients.*10/,
  );
});
