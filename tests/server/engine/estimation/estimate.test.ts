import { describe, expect, it } from "vitest";
import { accumulateMoments, estimateSystem, momentsRequest } from "../../../../server/engine/estimation/index.ts";
import { QUIET } from "../../../../server/engine/run.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import type { Progress } from "../../../../shared/schemas/status.ts";
import { estimated, largestDifference, systemOver } from "../../../support/estimating.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";

const { data } = simulateShares({
  form: "aids",
  goods: 4,
  rows: 400,
  random: seededRandom(8),
  noise: 0.02,
  impose: ["homogeneity", "symmetry"],
  demographics: 1,
});

describe("an estimate", () => {
  const finding = estimated(data, { form: "aids", impose: ["homogeneity", "symmetry"] });

  it("names every coefficient of every good, with its block, price and demographic", () => {
    expect(finding.coefficients.length).toBe(4 * (1 + 1 + 4 + 1));
    const [alpha, shift, gamma, beta] = [0, 4, 9, 27].map((a) => finding.coefficients[a]);
    expect(alpha).toMatchObject({ block: "alpha", symbol: "α", good: "good 1" });
    expect(shift).toMatchObject({ block: "demographic", good: "good 1", column: "z1" });
    expect(gamma).toMatchObject({ block: "gamma", good: "good 1", column: "good 2" });
    expect(beta).toMatchObject({ block: "beta", good: "good 4" });
    expect(finding.coefficients.map(({ estimate }) => estimate)).toEqual(finding.fitted.theta);
  });

  it("adds up: coefficients, their covariance and residuals", () => {
    const { theta, covariance } = finding.fitted;
    const gamma = (i: number, j: number) => 8 + 4 * i + j;
    const goods = [0, 1, 2, 3];
    expect(goods.reduce((sum, i) => sum + theta[i], 0)).toBeCloseTo(1, 14);
    for (const j of goods) {
      expect(goods.reduce((sum, i) => sum + theta[gamma(i, j)], 0)).toBeCloseTo(0, 14);
      for (const row of covariance) expect(goods.reduce((sum, i) => sum + row[gamma(i, j)], 0)).toBeCloseTo(0, 14);
    }
    for (const row of finding.residualCovariance) expect(row.reduce((sum, v) => sum + v, 0)).toBeCloseTo(0, 14);
  });

  it("counts what it says: AIC, BIC, R², degrees of freedom", () => {
    expect(finding.freeCoefficients).toBe(3 + 3 + 6 + 3);
    expect(finding.aic).toBeCloseTo(-2 * finding.logLikelihood + 2 * 15, 8);
    expect(finding.bic).toBeCloseTo(-2 * finding.logLikelihood + 15 * Math.log(400), 8);
    for (const value of [...finding.rSquared, finding.systemRSquared]) {
      expect(value).toBeGreaterThan(0);
      expect(value).toBeLessThan(1);
    }
    expect(finding.tests.map((test) => test.degreesOfFreedom)).toEqual([3, 3]);
    expect(finding.tests.every((test) => test.exact === undefined)).toBe(true);
  });

  it("converges as it says", () => {
    expect(finding.convergence.largestStep).toBeLessThanOrEqual(1e-10);
    expect(finding.convergence.gradient).toBeLessThan(1e-6);
    expect(finding.convergence.condition).toBeGreaterThan(1);
  });

  it("speaks while it iterates and while it reads", () => {
    const said: Parameters<typeof QUIET.progress>[0][] = [];
    const control = { ...QUIET, progress: (now: Omit<Progress, "elapsedMs" | "aboutMs">) => said.push(now) };
    const specification = systemOver(data, { form: "aids" });
    const moments = accumulateMoments(data, momentsRequest(specification, data), control);
    estimateSystem(specification, data, moments, control);
    expect(said.some((now) => now.step === "accumulating moments")).toBe(true);
    expect(said.some((now) => now.step === "iterating" && now.logLikelihood !== undefined)).toBe(true);
  });
});

describe("estimators", () => {
  it("iterated SUR and maximum likelihood end at the same place", () => {
    for (const impose of [[], ["homogeneity"], ["homogeneity", "symmetry"]]) {
      const [iterated, likelihood] = ["iterated seemingly unrelated", "maximum likelihood"].map((estimator) =>
        estimated(data, { form: "aids", impose, estimator }),
      );
      expect(largestDifference(iterated.fitted.theta, likelihood.fitted.theta)).toBeLessThan(1e-9);
      expect(iterated.logLikelihood).toBeCloseTo(likelihood.logLikelihood, 7);
    }
  });

  it("maximum likelihood has the highest likelihood, least squares the smallest sum of squares", () => {
    const specification = { form: "aids", impose: ["homogeneity", "symmetry"] };
    const names = ["least squares", "seemingly unrelated", "maximum likelihood"];
    const [least, one, likelihood] = names.map((estimator) => estimated(data, { ...specification, estimator }));
    expect(likelihood.logLikelihood).toBeGreaterThan(one.logLikelihood);
    expect(one.logLikelihood).toBeGreaterThan(least.logLikelihood);
    const squares = (finding: typeof least) => finding.residualCovariance.reduce((sum, row, i) => sum + row[i], 0);
    expect(squares(least)).toBeLessThan(squares(one));
    expect(squares(least)).toBeLessThan(squares(likelihood));
  });

  it("least squares and one-step SUR do not depend on the dropped good either", () => {
    for (const estimator of ["least squares", "seemingly unrelated"]) {
      const specification = { form: "aids", impose: ["homogeneity", "symmetry"], estimator };
      const last = estimated(data, specification);
      const first = estimated(data, { ...specification, dropped: "good 1" });
      expect(largestDifference(first.fitted.theta, last.fitted.theta)).toBeLessThan(1e-9);
      expect(largestDifference(first.fitted.covariance.flat(), last.fitted.covariance.flat())).toBeLessThan(1e-9);
    }
  });

  it("unrestricted LA-AIDS: standard errors of least squares are those of maximum likelihood", () => {
    const [least, likelihood] = ["least squares", "maximum likelihood"].map((estimator) =>
      estimated(data, { form: "la-aids", estimator }),
    );
    expect(largestDifference(least.fitted.covariance.flat(), likelihood.fitted.covariance.flat())).toBeLessThan(1e-12);
  });

  it("Laitinen's test is exact only where the index holds no current share and rows weigh the same", () => {
    const approximate = (rows: typeof data, index: string) =>
      estimated(rows, { form: "la-aids", index }).tests[0].exact!.approximate;
    expect(approximate(data, "laspeyres")).toBe(false);
    for (const index of ["tornqvist", "stone", "paasche"]) expect(approximate(data, index)).toBe(true);
    expect(approximate({ ...data, weights: new Float64Array(data.rows).fill(1) }, "laspeyres")).toBe(true);
  });

  it("two goods: one equation", () => {
    const two = simulateShares({ form: "aids", goods: 2, rows: 200, random: seededRandom(4), noise: 0.02 });
    for (const form of ["aids", "la-aids", "les"]) {
      const finding = estimated(two.data, { form, impose: form === "les" ? [] : ["homogeneity", "symmetry"] });
      expect(finding.rSquared[0]).toBeCloseTo(finding.rSquared[1], 12);
      expect(finding.rSquared[0]).toBeCloseTo(finding.systemRSquared, 12);
      expect(finding.tests.map((test) => test.restriction)).toEqual(form === "les" ? [] : ["homogeneity"]);
    }
  });
});

describe("Durbin–Watson", () => {
  const specification = { form: "aids", impose: ["homogeneity"] };
  it("is given in the order of time, whatever the order of rows", () => {
    const time = Float64Array.from({ length: data.rows }, (_, t) => (t * 7919) % 4001);
    const order = Array.from(time.keys()).sort((one, two) => time[one] - time[two]);
    const sort = (column: Float64Array) => Float64Array.from(order, (row) => column[row]);
    const sorted = {
      ...data,
      shares: data.shares.map(sort),
      logPrices: data.logPrices.map(sort),
      logTotal: sort(data.logTotal),
      numeric: new Map([["z1", sort(data.numeric.get("z1")!)]]),
      time: sort(time),
    };
    const shuffled = estimated({ ...data, time }, specification).durbinWatson!;
    expect(largestDifference(shuffled, estimated(sorted, specification).durbinWatson!)).toBeLessThan(1e-10);
    for (const value of shuffled) expect(Math.abs(value - 2)).toBeLessThan(0.4);
  });

  it("is left out where rows share a time, and without one", () => {
    const time = Float64Array.from({ length: data.rows }, (_, t) => Math.floor(t / 2));
    expect(estimated({ ...data, time }, specification).durbinWatson).toBeUndefined();
    expect(estimated(data, specification).durbinWatson).toBeUndefined();
  });
});
