import MultivariateLinearRegression from "ml-regression-multivariate-linear";
import { describe, expect, it } from "vitest";
import { seededRandom } from "../../shared/numerics/random.ts";
import { logPriceIndex } from "../../shared/systems/price-indices.ts";
import { estimated, largestDifference } from "../support/estimating.ts";
import { simulateShares } from "../support/simulated-shares.ts";

/**
 * Unrestricted LA-AIDS is least squares equation by equation, whatever the estimator (all equations have
 * the same regressors), so a general-purpose regression package must find the same. It inverts X'X, so
 * the comparison is made on ordinary prices; moments-collinear.test.ts has the others.
 */
describe.each(["least squares", "seemingly unrelated", "iterated seemingly unrelated", "maximum likelihood"])(
  "unrestricted LA-AIDS by %s",
  (estimator) => {
    it.each(["reflected", "summed"] as const)("equals ml-regression-multivariate-linear (%s)", (reduction) => {
      const { data } = simulateShares({ form: "la-aids", goods: 4, rows: 500, random: seededRandom(9), noise: 0.03 });
      const finding = estimated(data, { form: "la-aids", estimator }, reduction);
      const means = finding.fitted.indexMeans!;
      const index = { name: finding.fitted.index!, meanShares: means.shares, meanPrices: means.prices };
      const logIndex = logPriceIndex(index, data.shares, data.logPrices);
      const rows = Array.from(data.logTotal.keys());
      const x = rows.map((t) => [...data.logPrices.map((column) => column[t]), data.logTotal[t] - logIndex[t]]);
      const y = rows.map((t) => data.shares.map((column) => column[t]));
      const { weights } = new MultivariateLinearRegression(x, y, { intercept: true, statistics: false });
      const { theta } = finding.fitted;
      data.goods.forEach((_, i) => {
        const ours = [...theta.slice(4 + 4 * i, 8 + 4 * i), theta[20 + i], theta[i]];
        const theirs = weights.map((row) => row[i]);
        expect(largestDifference(ours, theirs)).toBeLessThan(1e-11);
      });
      expect(finding.fitted.covariance.length).toBe(24);
    });
  },
);
