import { Matrix, QrDecomposition } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { SYSTEMS } from "../../../../../shared/systems/index.ts";
import { estimated, largestDifference } from "../../../../support/estimating.ts";
import { endogenousShares, RHO } from "./endogenous.ts";

const THEORY = { impose: ["homogeneity", "symmetry"], demographics: [] };
const SIZE = { goods: 3, demographics: 0, alpha0: 0 };

/** |estimate − truth| in standard errors, for each coefficient of a block. */
function distances(finding: ReturnType<typeof estimated>, theta: readonly number[], block: string): number[] {
  return SYSTEMS.aids.layout(SIZE).flatMap((place, a) => {
    const { estimate, standardError } = finding.coefficients[a];
    return place.block === block ? [Math.abs(estimate - theta[a]) / standardError] : [];
  });
}

describe("endogenous expenditure", () => {
  it("biases β without instruments and not with them", () => {
    const { data, theta } = endogenousShares();
    const without = estimated(data, { form: "aids", ...THEORY });
    // The bias is ρ_i cov(v, ln x)/var(ln x) = ρ_i/2, some thirty standard errors for the first good.
    expect(Math.max(...distances(without, theta, "beta"))).toBeGreaterThan(20);
    const instrumented = estimated(data, { form: "aids", ...THEORY, instruments: ["earnings"] });
    expect(
      Math.max(...distances(instrumented, theta, "beta"), ...distances(instrumented, theta, "alpha")),
    ).toBeLessThan(4);
    const { residual, exogeneity, firstStage } = instrumented.endogeneity!;
    residual.forEach(({ estimate, standardError }, i) => {
      expect(Math.abs(estimate - RHO[i])).toBeLessThan(4 * standardError);
    });
    expect(exogeneity.wald!.pValue).toBeLessThan(1e-12);
    expect(exogeneity.likelihoodRatio!.pValue).toBeLessThan(1e-12);
    expect(firstStage.f.statistic).toBeGreaterThan(1000);
  });

  it("leaves β alone and does not reject exogeneity where the residual is noise", () => {
    const { data, theta } = endogenousShares({ rho: [0, 0, 0] });
    const { endogeneity, ...finding } = estimated(data, { form: "aids", ...THEORY, instruments: ["earnings"] });
    expect(Math.max(...distances(finding as never, theta, "beta"))).toBeLessThan(4);
    expect(endogeneity!.exogeneity.wald!.pValue).toBeGreaterThan(0.01);
    expect(endogeneity!.exogeneity.likelihoodRatio!.statistic).toBeCloseTo(endogeneity!.exogeneity.wald!.statistic, 1);
  });

  it.each(["la-aids", "aids"] as const)("depends on no dropped good: %s", (form) => {
    const { data } = endogenousShares({ rows: 400, weighted: true });
    const told = data.goods.map((dropped) => {
      const finding = estimated(data, { form, ...THEORY, instruments: ["earnings", "rent"], dropped });
      const { residual, exogeneity } = finding.endogeneity!;
      return [
        ...finding.fitted.theta,
        ...finding.coefficients.map((one) => one.standardError),
        ...residual.flatMap((one) => [one.estimate, one.standardError]),
        exogeneity.wald!.statistic,
        exogeneity.likelihoodRatio!.statistic,
      ];
    });
    expect(largestDifference(told[0], told[2])).toBeLessThan(1e-9);
    expect(largestDifference(told[1], told[2])).toBeLessThan(1e-9);
  });

  it("has residual coefficients that sum to zero, and θ of the system alone", () => {
    const { data } = endogenousShares({ rows: 300 });
    for (const form of ["la-aids", "aids", "les", "quaids"] as const) {
      const theory = form === "les" ? { impose: [], demographics: [] } : THEORY;
      const { fitted, endogeneity, coefficients } = estimated(data, { form, ...theory, instruments: ["earnings"] });
      const sum = endogeneity!.residual.reduce((total, { estimate }) => total + estimate, 0);
      expect(Math.abs(sum), form).toBeLessThan(1e-12);
      const count = SYSTEMS[form].layout(SIZE).length;
      expect([fitted.theta.length, fitted.covariance.length, fitted.covariance[0].length, coefficients.length]).toEqual(
        new Array(4).fill(count),
      );
    }
  });

  it("is two-stage least squares, where equations are linear in ln x and ask for no restriction", () => {
    const { data } = endogenousShares({ rows: 250 });
    const finding = estimated(data, {
      form: "la-aids",
      index: "laspeyres",
      estimator: "least squares",
      demographics: [],
      instruments: ["earnings", "rent"],
    });
    const rows = Array.from({ length: data.rows }, (_, t) => [1, ...data.logPrices.map((column) => column[t])]);
    const given = new Matrix(
      rows.map((row, t) => [...row, data.numeric.get("earnings")![t], data.numeric.get("rent")![t]]),
    );
    const total = Matrix.columnVector([...data.logTotal]);
    const predicted = given.mmul(new QrDecomposition(given).solve(total)).to1DArray();
    const second = new Matrix(rows.map((row, t) => [...row, predicted[t]]));
    const slopes = data.shares.map((share) =>
      new QrDecomposition(second).solve(Matrix.columnVector([...share])).get(4, 0),
    );
    const beta = finding.coefficients.filter(({ block }) => block === "beta").map(({ estimate }) => estimate);
    expect(largestDifference(beta, slopes)).toBeLessThan(1e-10);
  });

  it("says when instruments are weak by a small F", () => {
    const { data } = endogenousShares({ rows: 200, strength: 0 });
    const { firstStage } = estimated(data, { form: "aids", ...THEORY, instruments: ["earnings"] }).endogeneity!;
    expect(firstStage.f.statistic).toBeLessThan(10);
    expect(firstStage.f).toMatchObject({ numerator: 1, denominator: 200 - 5 });
  });

  it("has larger errors by the bootstrap, which estimates the first stage again", () => {
    const { data } = endogenousShares({ rows: 300, strength: 0.3 });
    const common = { form: "la-aids", ...THEORY, instruments: ["earnings"] };
    const asData = estimated(data, common);
    const drawn = estimated(data, { ...common, "standard errors": { bootstrap: "rows", replicates: 60, seed: 2 } });
    expect([asData, drawn].map(({ endogeneity }) => endogeneity!.firstStageIgnored)).toEqual([true, false]);
    const errors = ({ coefficients }: typeof drawn) =>
      coefficients.filter(({ block }) => block === "beta").map(({ standardError }) => standardError);
    // The residual is ρ_i v beside noise of the same size, so that its own error weighs as much as the equations'.
    expect(errors(drawn)[0] / errors(asData)[0]).toBeGreaterThan(1.15);
    expect(drawn.fitted.theta).toEqual(asData.fitted.theta);
  });
});
