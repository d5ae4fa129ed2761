import { describe, expect, it } from "vitest";
import { seededRandom } from "../../shared/numerics/random.ts";
import { ESTIMATOR_NAMES } from "../../shared/schemas/system.ts";
import type { RestrictionName, SystemName } from "../../shared/systems/names.ts";
import { estimated, largestDifference } from "../support/estimating.ts";
import { simulateShares } from "../support/simulated-shares.ts";

const SYSTEMS_UNDER: [form: SystemName, impose: RestrictionName[]][] = [
  ["la-aids", []],
  ["la-aids", ["homogeneity", "symmetry"]],
  ["aids", []],
  ["aids", ["homogeneity", "symmetry"]],
  ["quaids", ["homogeneity", "symmetry"]],
  ["les", []],
];

describe.each(SYSTEMS_UNDER)("%s %j without noise", (form, impose) => {
  it.each(ESTIMATOR_NAMES)("returns the coefficients the shares were made from (%s)", (estimator) => {
    const { data, theta } = simulateShares({ form, impose, goods: 4, rows: 200, random: seededRandom(5), noise: 0 });
    const finding = estimated(data, { form, impose, estimator });
    expect(largestDifference(finding.fitted.theta, theta)).toBeLessThan(1e-9);
  });

  it("also from sums, whose residuals stop at their rounding", () => {
    const { data, theta } = simulateShares({ form, impose, goods: 4, rows: 200, random: seededRandom(5), noise: 0 });
    expect(largestDifference(estimated(data, { form, impose }, "summed").fitted.theta, theta)).toBeLessThan(1e-9);
  });
});

describe.each(SYSTEMS_UNDER)("%s %j with noise", (form, impose) => {
  it("covers the truth: squared errors over their variances average one", () => {
    const random = seededRandom(77);
    let sum = 0;
    let count = 0;
    for (let round = 0; round < 60; round++) {
      // Coefficients are drawn anew each round; only their standardised errors are compared.
      const { data, theta } = simulateShares({ form, impose, goods: 3, rows: 400, random, noise: 0.02 });
      const { fitted } = estimated(data, { form, impose });
      theta.forEach((truth, a) => {
        const variance = fitted.covariance[a][a];
        if (variance < 1e-14) return;
        sum += (fitted.theta[a] - truth) ** 2 / variance;
        count++;
      });
    }
    // The average of at least sixty (correlated within a round) χ²(1): a standard deviation of at most √(2/60).
    expect(Math.abs(sum / count - 1)).toBeLessThan(3 * Math.sqrt(2 / 60));
  });
});
