import { Matrix, solve } from "ml-matrix";
import { expect, it } from "vitest";
import { accumulateMoments, momentsRequest } from "../../../../../server/engine/estimation/index.ts";
import { systemTests } from "../../../../../server/engine/inference/system-tests.ts";
import { QUIET } from "../../../../../server/engine/run.ts";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import type { HypothesisName } from "../../../../../shared/schemas/tests.ts";
import { estimated, systemOver } from "../../../../support/estimating.ts";
import { simulateEasi } from "../../../../support/simulated-easi.ts";

const easi = { degree: 2, interactions: ["expenditure with demographics", "prices with demographics"] as const };
const { data } = simulateEasi({ goods: 3, rows: 250, random: seededRandom(12), noise: 0.03, easi, demographics: 1 });
const asked = { form: "easi", ...easi, estimator: "iterated seemingly unrelated" };

function tested(impose: readonly string[], names: readonly HypothesisName[] = ["homogeneity", "demographics"]) {
  const specification = systemOver(data, { ...asked, impose });
  const { fitted } = estimated(data, { ...asked, impose });
  const moments = accumulateMoments(data, momentsRequest(specification, data), QUIET);
  return systemTests(names, specification, fitted, data, moments, QUIET).tests;
}

it("homogeneity is tested by Wald from the exact unrestricted fit, every matrix of price effects in it", () => {
  const [homogeneity] = tested(["homogeneity", "symmetry"]);
  if ("because" in homogeneity) throw new Error(homogeneity.reason);
  const { fitted, coefficients } = estimated(data, { ...asked, impose: [] });
  // Row sums of A_0 and A_1, of the first two goods: the third's follow.
  const sums = ["price", "price demographic"].flatMap((block) =>
    ["good 1", "good 2"].map((good) => coefficients.map((one) => (one.block === block && one.good === good ? 1 : 0))),
  );
  const selection = new Matrix(sums);
  const value = selection.mmul(Matrix.columnVector(fitted.theta));
  const spread = selection.mmul(new Matrix(fitted.covariance)).mmul(selection.transpose());
  const statistic = value.transpose().mmul(solve(spread, value)).get(0, 0);
  expect(homogeneity.degreesOfFreedom).toBe(4);
  if (!("statistic" in homogeneity.wald)) throw new Error(homogeneity.wald.absent);
  expect(Math.abs(homogeneity.wald.statistic / statistic - 1)).toBeLessThan(1e-8);
  expect(homogeneity.likelihoodRatio).toHaveProperty("absent");
});

it("demographics are tested in every block they enter", () => {
  const [, demographics] = tested(["homogeneity", "symmetry"]);
  if ("because" in demographics) throw new Error(demographics.reason);
  // C and D, two equations each, and three free entries of a symmetric A_1 whose rows sum to nothing.
  expect(demographics.degreesOfFreedom).toBe(7);
  if (!("pValue" in demographics.wald)) throw new Error(demographics.wald.absent);
  expect(demographics.wald.pValue).toBeLessThan(1e-6);
});

it("does not say of bent Engel curves that there are no quadratic terms", () => {
  const [quadratic] = tested(["homogeneity", "symmetry"], ["quadratic terms"]);
  expect(quadratic).toMatchObject({
    because: "nothing to test",
    reason:
      "Quadratic terms are those of the quadratic almost ideal system; powers of real expenditure up to 2 in the exact affine Stone index system are not tested here.",
  });
});
