import { describe, expect, it } from "vitest";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { RestrictionName, SystemName } from "../../shared/systems/names.ts";
import { estimated, largestDifference } from "../support/estimating.ts";
import { rowByRow } from "../support/row-by-row.ts";
import { simulateShares } from "../support/simulated-shares.ts";

/** The same answer from the moments, read once, and from every row again in every iteration. */
const CASES: [form: SystemName, impose: RestrictionName[], goods: number, demographics: number, weighted: boolean][] = [
  ["la-aids", [], 3, 1, false],
  ["la-aids", ["homogeneity", "symmetry"], 4, 0, true],
  ["aids", [], 3, 0, true],
  ["aids", ["homogeneity"], 3, 1, false],
  ["aids", ["homogeneity", "symmetry"], 4, 1, true],
  ["aids", ["homogeneity", "symmetry"], 2, 0, false],
  ["quaids", [], 3, 1, false],
  ["quaids", ["homogeneity"], 3, 0, true],
  ["quaids", ["homogeneity", "symmetry"], 4, 1, true],
  ["quaids", ["homogeneity", "symmetry"], 2, 0, false],
  ["les", [], 4, 0, true],
  ["les", [], 2, 0, false],
];

describe.each(["reflected", "summed"] as const)("moments (%s) against rows", (reduction) => {
  it.each(CASES)("%s %j, %d goods, %d demographics, weighted %s", (form, impose, goods, demographics, weighted) => {
    const random = seededRandom(41);
    const { data, size } = simulateShares({
      form,
      goods,
      rows: 150,
      random,
      noise: 0.02,
      impose,
      demographics,
      weighted,
      alpha0: form === "aids" || form === "quaids" ? 0.3 : 0,
    });
    const alpha0 = size.alpha0;
    const finding = estimated(data, { form, impose, alpha0, estimator: "maximum likelihood" }, reduction);
    const index = finding.fitted.index && {
      name: finding.fitted.index,
      meanShares: finding.fitted.indexMeans!.shares,
      meanPrices: finding.fitted.indexMeans!.prices,
    };
    const slow = rowByRow(form, impose, data, { ...size, index });
    expect(largestDifference(finding.fitted.theta, slow.theta)).toBeLessThan(1e-10);
    expect(largestDifference([finding.logLikelihood], [slow.logLikelihood])).toBeLessThan(1e-10);
    const errors = finding.coefficients.map((coefficient) => coefficient.standardError);
    expect(largestDifference(errors, slow.standardErrors)).toBeLessThan(1e-10);
    expect(largestDifference(finding.residualCovariance.flat(), slow.residualCovariance.flat())).toBeLessThan(1e-10);
  });
});

describe.each(["reflected", "summed"] as const)("prices that only a few villages know (%s)", (reduction) => {
  // Fewer price vectors than products of prices: many terms depend on others, the coefficients do not.
  it("AIDS agrees with dense least squares on its rows", () => {
    const random = seededRandom(23);
    const villages = Array.from({ length: 9 }, () => Array.from({ length: 4 }, () => 0.3 * random.normal()));
    const logPrices = Array.from({ length: 4 }, (_, i) =>
      Float64Array.from({ length: 180 }, (_, t) => villages[t % 9][i]),
    );
    const impose: RestrictionName[] = ["homogeneity", "symmetry"];
    const { data, size } = simulateShares({
      form: "aids",
      goods: 4,
      rows: 180,
      random,
      noise: 0.02,
      impose,
      logPrices,
    });
    const finding = estimated(data, { form: "aids", impose }, reduction);
    const slow = rowByRow("aids", impose, data, size);
    expect(largestDifference(finding.fitted.theta, slow.theta)).toBeLessThan(1e-10);
    expect(largestDifference([finding.logLikelihood], [slow.logLikelihood])).toBeLessThan(1e-10);
  });
});
