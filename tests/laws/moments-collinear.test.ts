import { Matrix, QrDecomposition } from "ml-matrix";
import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { type Random, seededRandom } from "../../shared/numerics/random.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import type { InteractionName, RestrictionName } from "../../shared/systems/names.ts";
import { logPriceIndex } from "../../shared/systems/price-indices.ts";
import { easiRowByRow } from "../support/easi-row-by-row.ts";
import { estimated } from "../support/estimating.ts";
import { rowByRow } from "../support/row-by-row.ts";
import { simulateEasi } from "../support/simulated-easi.ts";
import { madeRows } from "../support/simulated-errors.ts";
import { simulateRotterdam } from "../support/simulated-rotterdam.ts";
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

type SharesOf = "aids" | "la-aids" | "quaids" | "les";

function collinearSample(form: SharesOf, goods: number, impose: RestrictionName[], noise = 0.02) {
  const random = seededRandom(12);
  const logPrices = collinearLogPrices(goods, 400, random);
  expect(conditionNumber(logPrices)).toBeGreaterThan(1e6);
  return simulateShares({ form, goods, rows: 400, random, noise, impose, logPrices, index: "laspeyres" });
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

  /**
   * Committed quantities c enter times each other's marginal shares, and prices that move as one say nothing of their
   * sum: errors of shares of 0.02 would leave it anywhere within 0.02/4e-7, so that the errors here are as small as the
   * identification is weak.
   */
  it.each([
    ["aids", ["homogeneity", "symmetry"], 0.02],
    ["quaids", ["homogeneity", "symmetry"], 0.02],
    ["les", [], 1e-4],
  ] as const)("%s under %j agrees with dense least squares on its rows to 1e-8", (form, impose, noise) => {
    const { data, size } = collinearSample(form, 3, [...impose], noise);
    const finding = estimated(data, { form, impose }, reduction);
    const slow = rowByRow(form, impose, data, size);
    expect(relativeDifference(finding.fitted.theta, slow.theta)).toBeLessThan(1e-8);
  });

  /**
   * With errors of 0.02 it does: c ± 1,500, b to three digits. Steps of c and b from nothing committed creep along their
   * valley for longer than anyone waits, the reference's too, which therefore starts where the estimator ended and
   * shows that this is where it stays.
   */
  it("les with errors of 0.02 ends where dense least squares on its rows stays, to 1e-8", () => {
    const { data, size, theta: truth } = collinearSample("les", 3, []);
    const { fitted, coefficients, convergence } = estimated(data, { form: "les" }, reduction);
    const slow = rowByRow("les", [], data, size, 2, fitted.theta);
    expect(relativeDifference(fitted.theta, slow.theta)).toBeLessThan(1e-8);
    expect(convergence.iterations).toBeLessThan(50);
    coefficients.forEach(({ estimate, standardError }, a) => {
      expect(Math.abs(estimate - truth[a])).toBeLessThan(3 * standardError);
    });
  });

  it("Rotterdam agrees with an orthogonal factorisation of its changes to 1e-8", () => {
    const random = seededRandom(13);
    const logPrices = collinearLogPrices(3, 200, random);
    const errors = madeRows({ goods: 3, rows: 200, random, errors: "independent", noise: 5e-4, prices: 1 }).errors;
    const { data } = simulateRotterdam(logPrices, errors, random);
    const changes = logPrices.map((column) => column.slice(1).map((value, t) => value - column[t]));
    expect(conditionNumber(changes)).toBeGreaterThan(1e6);
    const contributions = data.shares.map((share, i) =>
      Array.from({ length: 199 }, (_, t) => {
        const logQuantity = (row: number) => Math.log(share[row]) + data.logTotal[row] - logPrices[i][row];
        return 0.5 * (share[t] + share[t + 1]) * (logQuantity(t + 1) - logQuantity(t));
      }),
    );
    const volume = contributions[0].map((_, t) => contributions.reduce((sum, column) => sum + column[t], 0));
    const x = new Matrix(volume.map((value, t) => [...changes.map((column) => column[t]), value]));
    const expected = new QrDecomposition(x).solve(new Matrix(contributions).transpose()).to2DArray();
    const { theta } = estimated(data, { form: "rotterdam", estimator: "least squares" }, reduction).fitted;
    const ours = data.goods.flatMap((_, i) => [...theta.slice(3 + 3 * i, 6 + 3 * i), theta[i]]);
    const theirs = data.goods.flatMap((_, i) => expected.map((row) => row[i]));
    expect(relativeDifference(ours, theirs)).toBeLessThan(1e-8);
  });

  it("EASI with linear real expenditure agrees with an orthogonal factorisation of its regressors to 1e-8", () => {
    const random = seededRandom(14);
    const logPrices = collinearLogPrices(3, 300, random);
    const size = { degree: 2, interactions: [] };
    const { data } = simulateEasi({ goods: 3, rows: 300, random, noise: 0.02, easi: size, impose: [], logPrices });
    const means = data.shares.map((share) => share.reduce((sum, value) => sum + value, 0) / data.rows);
    const rows = Array.from(data.logTotal, (logTotal, t) => {
      const y = logTotal - means.reduce((sum, mean, i) => sum + mean * logPrices[i][t], 0);
      return [1, y, y * y, ...logPrices.map((column) => column[t])];
    });
    const y = new Matrix(data.shares.map((column) => [...column])).transpose();
    const expected = new QrDecomposition(new Matrix(rows)).solve(y).to2DArray();
    const specification = { form: "easi", degree: 2, "real expenditure": "approximate", estimator: "least squares" };
    const { theta } = estimated(data, specification, reduction).fitted;
    data.goods.forEach((_, i) => {
      const ours = [theta[i], ...theta.slice(3 + 2 * i, 5 + 2 * i), ...theta.slice(9 + 3 * i, 12 + 3 * i)];
      const theirs = expected.map((row) => row[i]);
      expect(relativeDifference(ours, theirs)).toBeLessThan(1e-8);
    });
  });
});

/**
 * Implicit utility moves with the price effects, of which single ones lie anywhere within 0.02/4e-7: rounds that solved
 * for them in log prices as they are would never settle.
 */
describe("log prices of condition number 1e6", () => {
  it.each([
    ["least squares", "alike", [], []],
    ["least squares", "alike", ["homogeneity", "symmetry"], ["prices with demographics"]],
    ["iterated seemingly unrelated", "by residuals", [], ["prices with expenditure"]],
    ["iterated seemingly unrelated", "by residuals", ["homogeneity", "symmetry"], ["prices with expenditure"]],
  ] as const)(
    "EASI with exact real expenditure by %s agrees with iterated orthogonal factorisations of its rows to 1e-8: %s, %j, %j",
    (estimator, weighting, restrictions, crossed) => {
      const impose: RestrictionName[] = [...restrictions];
      const interactions: InteractionName[] = [...crossed];
      const random = seededRandom(14);
      const logPrices = collinearLogPrices(3, 300, random);
      expect(conditionNumber(logPrices)).toBeGreaterThan(1e6);
      const easi = { degree: 2, interactions };
      const drawn = { goods: 3, rows: 300, random, noise: 0.02, easi, impose, logPrices };
      const { data, size } = simulateEasi({ ...drawn, demographics: crossed.length, weighted: true });
      const specification = { form: "easi", degree: 2, interactions, "real expenditure": "exact", estimator, impose };
      const { fitted, convergence } = estimated(data, specification);
      const slow = easiRowByRow(data, size, SYSTEMS.easi.free(size, impose), weighting);

      expect(relativeDifference(fitted.theta, slow.theta)).toBeLessThan(1e-8);
      expect(convergence.largestStep).toBeLessThanOrEqual(1e-10);
    },
  );
});
