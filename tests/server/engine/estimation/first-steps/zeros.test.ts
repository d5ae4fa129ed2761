import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../../../../server/engine/columns/prepared-data.ts";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import { SYSTEMS } from "../../../../../shared/systems/index.ts";
import { estimated, largestDifference } from "../../../../support/estimating.ts";
import { simulateShares } from "../../../../support/simulated-shares.ts";

const THEORY = { impose: ["homogeneity", "symmetry"], demographics: [] };
const SIZE = { goods: 3, demographics: 0, alpha0: 0 };
/** Correlation of the errors of participation with those of the shares. */
const CORRELATION = 0.6;

/**
 * Shonkwiler & Yen's own case: w_i = d_i w*_i with w* = f + ε, d_i = 1 where an index in ln x and the distance to a market,
 * plus an error correlated with ε_i, is above zero. The first two goods have zeros, the third is always bought. As in
 * their paper nothing makes the observed w add up, so the second step is true as it stands: δ_i = CORRELATION · sd(ε_i).
 */
function censoredShares(rows: number, seed = 11): { data: PreparedData; theta: number[]; deviations: number[] } {
  const random = seededRandom(seed);
  const { data, theta, size } = simulateShares({
    form: "aids",
    goods: 3,
    rows,
    noise: 0.04,
    impose: ["homogeneity", "symmetry"],
    random,
  });
  const evaluator = SYSTEMS.aids.evaluator(theta, size);
  const errors = data.shares.map((share) => share.slice());
  for (let t = 0; t < rows; t++) {
    evaluator.at(
      data.logPrices.map((column) => column[t]),
      data.logTotal[t],
      [],
    );
    for (let i = 0; i < 3; i++) errors[i][t] -= evaluator.shares[i];
  }
  const deviations = errors.map((error) => Math.sqrt(error.reduce((sum, value) => sum + value * value, 0) / rows));
  const market = Float64Array.from({ length: rows }, () => random.normal());
  const shares = data.shares.map((share, i) =>
    share.map((value, t) => {
      if (i === 2) return value;
      const noise = Math.sqrt(1 - CORRELATION ** 2) * random.normal() + (CORRELATION * errors[i][t]) / deviations[i];
      return 0.7 + 0.6 * data.logTotal[t] - 0.5 * market[t] + noise > 0 ? value : 0;
    }),
  );
  return { data: { ...data, shares, numeric: new Map([["market", market]]) }, theta, deviations };
}

const zeros = { "two-step": ["market"] };

describe("goods not bought, in two steps", () => {
  it("recovers the latent system, which one step does not", () => {
    const { data, theta, deviations } = censoredShares(4000);
    const distances = ({ coefficients }: ReturnType<typeof estimated>, block: string) =>
      SYSTEMS.aids.layout(SIZE).flatMap((place, a) => {
        const { estimate, standardError } = coefficients[a];
        return place.block === block ? [Math.abs(estimate - theta[a]) / standardError] : [];
      });
    const two = estimated(data, { form: "aids", ...THEORY, zeros });
    const one = estimated(data, { form: "aids", ...THEORY });
    expect(Math.max(...distances(one, "alpha"))).toBeGreaterThan(20);
    expect(Math.max(...distances(one, "beta"))).toBeGreaterThan(10);
    for (const block of ["alpha", "beta", "gamma"]) expect(Math.max(...distances(two, block)), block).toBeLessThan(4);
    const { corrections, goods } = two.zeros!;
    corrections.forEach(({ estimate, standardError }, i) => {
      expect(Math.abs(estimate - CORRELATION * deviations[i])).toBeLessThan(4 * standardError);
    });
    const { coefficients } = goods[0].probit!;
    const truth = { constant: 0.7, "ln total expenditure": 0.6, market: -0.5 };
    for (const [name, value] of Object.entries(truth)) {
      const found = coefficients.find((coefficient) => coefficient.name === name)!;
      expect(Math.abs(found.estimate - value), name).toBeLessThan(4 * found.standardError);
    }
    expect(goods[2]).toEqual({ good: "good 3", boughtNone: 0, rowsWithout: 0 });
  });

  it("leaves no good out: nothing depends on the one named as dropped", () => {
    const { data } = censoredShares(500);
    for (const estimator of ["least squares", "seemingly unrelated", "maximum likelihood"]) {
      const told = data.goods.map((dropped) => {
        const finding = estimated(data, { form: "la-aids", ...THEORY, zeros, estimator, dropped });
        const { corrections, predictedSum } = finding.zeros!;
        return [
          ...finding.fitted.theta,
          ...finding.coefficients.map(({ standardError }) => standardError),
          ...corrections.flatMap((correction) => [correction.estimate, correction.standardError]),
          ...Object.values(predictedSum),
          finding.logLikelihood,
        ];
      });
      expect(largestDifference(told[0], told[2]), estimator).toBeLessThan(1e-9);
      expect(largestDifference(told[1], told[2]), estimator).toBeLessThan(1e-9);
    }
  });

  it("keeps the latent system's own restrictions, and a residual covariance that lacks one rank and no more", () => {
    const { data } = censoredShares(500);
    const { coefficients, residualCovariance } = estimated(data, { form: "la-aids", ...THEORY, zeros });
    const sum = (block: string) =>
      coefficients.filter((one) => one.block === block).reduce((total, { estimate }) => total + estimate, 0);
    expect(sum("alpha")).toBeCloseTo(1, 12);
    expect(sum("beta")).toBeCloseTo(0, 12);
    for (const row of residualCovariance) expect(row.reduce((total, value) => total + value, 0)).toBeCloseTo(0, 14);
    const [[a, b], [c, d]] = residualCovariance;
    expect((a * d - b * c) / (a * d)).toBeGreaterThan(0.01);
  });

  it("hardly moves β where few go without, and for no reason", () => {
    // Bought by all but every fiftieth, who are like the others: Φ is nearly constant.
    const plain = simulateShares({ form: "aids", goods: 3, rows: 500, noise: 0.02, random: seededRandom(8) });
    const shares = plain.data.shares.map((share, i) => share.map((value, t) => (i === 0 && t % 50 === 3 ? 0 : value)));
    const finding = estimated({ ...plain.data, shares }, { form: "la-aids", demographics: [], zeros: "two-step" });
    const kept = estimated(plain.data, { form: "la-aids", demographics: [] });
    const beta = (one: typeof finding) => one.coefficients.filter(({ block }) => block === "beta");
    beta(finding).forEach(({ estimate, standardError }, i) => {
      expect(Math.abs(estimate - beta(kept)[i].estimate)).toBeLessThan(4 * standardError);
    });
  });
});
