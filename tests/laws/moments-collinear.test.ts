import { Matrix, QrDecomposition } from "ml-matrix";
import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { type Random, seededRandom } from "../../shared/numerics/random.ts";
import type { RestrictionName } from "../../shared/systems/names.ts";
import { logPriceIndex } from "../../shared/systems/price-indices.ts";
import { estimated } from "../support/estimating.ts";
import { rowByRow } from "../support/row-by-row.ts";
import { simulateShares } from "../support/simulated-shares.ts";

/** Log prices that share one movement but for parts in a million: condition number 1e6 and a bit. */
function collinearLogPrices(goods: number, rows: number, random: Random): Float64Array[] {
  const common = Float64Array.from({ length: rows }, () => 0.4 * random.normal());
  return Array.from({ length: goods }, () => common.map((value) => value + 0.4e-6 * random.normal()));
}

function conditionNumber(columns: readonly Float64Array[]): number {
  const centred = columns.map((column) => {
    const mean = column.reduce((sum, value) => sum + value, 0) / column.length;
    return Array.from(column, (value) => value - mean);
  });
  const triangle = new QrDecomposition(new Matrix(centred).transpose()).upperTriangularMatrix;
  const inverse = new QrDecomposition(triangle).solve(Matrix.eye(columns.length));
  return triangle.norm() * inverse.norm();
}

function relativeDifference(left: readonly number[], right: readonly number[]): number {
  const size = right.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  return left.reduce((most, value, k) => Math.max(most, Math.abs(value - right[k]) / size), 0);
}

function collinearSample(form: "aids" | "la-aids", goods: number, impose: RestrictionName[]) {
  const random = seededRandom(12);
  const logPrices = collinearLogPrices(goods, 400, random);
  expect(conditionNumber(logPrices)).toBeGreaterThan(1e6);
  return simulateShares({ form, goods, rows: 400, random, noise: 0.02, impose, logPrices, index: "laspeyres" });
}

/** Regressors of LA-AIDS by row: constant, ln p, ln(x/P). */
function regressors(data: PreparedData, logIndex: Float64Array): number[][] {
  return Array.from(data.logTotal, (logTotal, t) => [
    1,
    ...data.logPrices.map((column) => column[t]),
    logTotal - logIndex[t],
  ]);
}

describe.each(["reflected", "summed"] as const)("log prices of condition number 1e6 (%s)", (reduction) => {
  it("LA-AIDS agrees with an orthogonal factorisation of its regressors to 1e-8", () => {
    const { data } = collinearSample("la-aids", 4, []);
    const finding = estimated(data, { form: "la-aids", index: "laspeyres", estimator: "least squares" }, reduction);
    const means = finding.fitted.indexMeans!;
    const index = { name: "laspeyres" as const, meanShares: means.shares, meanPrices: means.prices };
    const x = new Matrix(regressors(data, logPriceIndex(index, data.shares, data.logPrices)));
    const y = new Matrix(data.shares.map((column) => [...column])).transpose();
    const expected = new QrDecomposition(x).solve(y).to2DArray();
    const { theta } = finding.fitted;
    data.goods.forEach((_, i) => {
      const ours = [theta[i], ...theta.slice(4 + 4 * i, 8 + 4 * i), theta[20 + i]];
      expect(
        relativeDifference(
          ours,
          expected.map((row) => row[i]),
        ),
      ).toBeLessThan(1e-8);
    });
  });

  it("AIDS agrees with dense least squares on its rows to 1e-8", () => {
    const impose: RestrictionName[] = ["homogeneity", "symmetry"];
    const { data, size } = collinearSample("aids", 3, impose);
    const finding = estimated(data, { form: "aids", impose }, reduction);
    const slow = rowByRow("aids", impose, data, size);
    expect(relativeDifference(finding.fitted.theta, slow.theta)).toBeLessThan(1e-8);
  });
});
