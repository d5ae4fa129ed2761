import { describe, expect, it } from "vitest";
import { spaced } from "../../shared/economics/curves/curve.ts";
import { demandCurves } from "../../shared/economics/curves/demand.ts";
import { engelCurves } from "../../shared/economics/curves/engel.ts";
import { eigenvalueCurve } from "../../shared/economics/curves/largest-eigenvalue.ts";
import { elasticitiesAt } from "../../shared/economics/elasticities.ts";
import { percentileInterval } from "../../shared/economics/percentile.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { normalQuantile } from "../../shared/numerics/normal.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { Point } from "../../shared/systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../../shared/systems/index.ts";
import { changeCases } from "./price-changes.ts";

const LEVEL = { level: 0.95 };
const NAMES = ["aids", "quaids", "les", "easi"] as const;
const cases = NAMES.flatMap((name, i) => changeCases(name, 4100 + i, 12).map((one) => ({ name, ...one })));
const near = (value: number, wanted: number, digits: number) =>
  expect(Math.abs(value - wanted) / Math.max(Math.abs(wanted), 1e-3)).toBeLessThan(10 ** -digits);

const matrixOf = (fitted: FittedCoefficients, point: Point) =>
  matrixAt(fitted, point, { priceScale: fitted.goods.map(() => 1), totalScale: 1, pointName: "the point" });

describe("Engel curves", () => {
  it("are the system's own shares, add up, and have the matrix's errors", () => {
    for (const { fitted, point } of cases) {
      const totals = spaced(point.total * 0.97, point.total * 1.03, 3, "logarithmic");
      const goods = fitted.goods.map((_, i) => i);
      const { totals: kept, curves } = engelCurves(fitted, point, totals, goods, LEVEL);
      const { system, size } = systemOf(fitted);
      kept.forEach((total, t) => {
        const { shares } = system.slopes(fitted.theta, size, { ...point, total });
        expect(curves.map(({ values }) => values[t])).toEqual(shares);
        expect(curves.reduce((sum, { values }) => sum + values[t], 0)).toBeCloseTo(1, 9);
        for (const { values, errors, low, high } of curves) {
          expect(high[t] - values[t]).toBeCloseTo(normalQuantile(0.975) * errors[t], 12);
          expect(values[t] - low[t]).toBeCloseTo(high[t] - values[t], 12);
        }
      });
    }
  });

  it("have errors by derivatives that numbers confirm", () => {
    for (const { fitted, point } of cases.filter((_, i) => i % 4 === 0)) {
      const { curves } = engelCurves(fitted, point, [point.total], [0], LEVEL);
      const { system, size } = systemOf(fitted);
      const shareAt = (theta: readonly number[]) => system.slopes(theta, size, point).shares[0];
      const step = 1e-5;
      const gradient = fitted.theta.map((_, a) => {
        const moved = (by: number) => shareAt(fitted.theta.map((value, b) => (a === b ? value + by : value)));
        return (moved(step) - moved(-step)) / (2 * step);
      });
      const variance = gradient.reduce(
        (sum, g, a) => sum + gradient.reduce((row, h, b) => row + g * fitted.covariance[a][b] * h, 0),
        0,
      );
      near(curves[0].errors[0], Math.sqrt(variance), 5);
    }
  });

  it("leave out the totals at which the system has no utility", () => {
    let without = 0;
    for (const { fitted, point } of cases.filter(({ name }) => name === "quaids")) {
      const asked = spaced(point.total * 1e-6, point.total * 1e6, 15, "logarithmic");
      const { system, size } = systemOf(fitted);
      const { cost } = system;
      if ("absent" in cost) throw new Error("quadratic systems have a cost function");
      const defined = asked.filter((total) => Number.isFinite(cost.utility(fitted.theta, size, { ...point, total })));
      without += asked.length - defined.length;
      expect(engelCurves(fitted, point, asked, [0], LEVEL).totals).toEqual(defined);
    }
    expect(without).toBeGreaterThan(0);
  });

  it("have percentiles of the shares at every draw for intervals, where draws are enough", () => {
    const [{ fitted, point }] = cases;
    const random = seededRandom(77);
    const draws = Array.from({ length: 60 }, () => fitted.theta.map((value) => value + 1e-3 * random.normal()));
    const { curves, draws: used } = engelCurves(fitted, point, [point.total], [1], { level: 0.9, draws });
    const { system, size } = systemOf(fitted);
    const drawn = draws.map((theta) => system.slopes(theta, size, point).shares[1]);
    expect([curves[0].low[0], curves[0].high[0]]).toEqual(percentileInterval(drawn, 0.9));
    expect(used).toBe(60);
    expect(
      engelCurves(fitted, point, [point.total], [1], { level: 0.9, draws: draws.slice(0, 39) }).draws,
    ).toBeUndefined();
  });
});

describe("demand curves", () => {
  const step = 1e-4;
  const around = (price: number) => [price * (1 - step), price, price * (1 + step)];

  it("meet at the point, where one slopes as its elasticity says and the other as the Slutsky matrix does", () => {
    for (const { fitted, point } of cases) {
      const good = fitted.goods.length - 1;
      const price = point.prices[good];
      const { prices, uncompensated, compensated } = demandCurves(fitted, point, good, around(price), LEVEL);
      if (prices.length < 3 || compensated === undefined) throw new Error("a case is not defined around its point");
      near(compensated.values[1], uncompensated.values[1], 9);
      near(compensated.errors[1], uncompensated.errors[1], 9);

      const slope = (values: readonly number[]) => (values[2] - values[0]) / (prices[2] - prices[0]);
      const elasticity = (slope(uncompensated.values) * price) / uncompensated.values[1];
      near(elasticity, elasticitiesAt(fitted, point).uncompensated[good][good], 5);
      near(slope(compensated.values), matrixOf(fitted, point).quantity[good][good], 4);
    }
  });

  it("are quantities w x / p of the shares there", () => {
    for (const { fitted, point } of cases) {
      const price = point.prices[0] * 1.02;
      const { uncompensated, prices } = demandCurves(fitted, point, 0, [price], LEVEL);
      if (prices.length === 0) continue;
      const { system, size } = systemOf(fitted);
      const there = { ...point, prices: point.prices.map((one, j) => (j === 0 ? price : one)) };
      const [share] = system.slopes(fitted.theta, size, there).shares;
      expect(uncompensated.values[0]).toBeCloseTo((share * point.total) / price, 12);
    }
  });

  it("of a system without cost function have no compensated one, and say why", () => {
    const [{ fitted, point }] = changeCases("la-aids", 4199, 1);
    const { compensated, noCompensated, uncompensated } = demandCurves(
      fitted,
      point,
      0,
      around(point.prices[0]),
      LEVEL,
    );
    expect(compensated).toBeUndefined();
    expect(noCompensated).toMatch(/cost function/);
    expect(uncompensated.values).toHaveLength(3);
  });
});

describe("the largest eigenvalue along expenditure", () => {
  it("is the matrix's own, with its error", () => {
    for (const { fitted, point } of cases) {
      const { totals, eigenvalue } = eigenvalueCurve(fitted, point, [point.total], LEVEL);
      expect(totals).toEqual([point.total]);
      const [largest] = matrixOf(fitted, point).eigenvalues;
      near(eigenvalue.values[0], largest.value, 9);
      near(eigenvalue.errors[0], largest.standardError, 9);
    }
  });

  it("breaks in stretches that end where it crosses nought", () => {
    let crossings = 0;
    for (const { fitted, point } of cases) {
      const asked = spaced(point.total * 0.4, point.total * 2.5, 21, "logarithmic");
      const { totals, eigenvalue, breaks } = eigenvalueCurve(fitted, point, asked, LEVEL);
      const inside = (total: number) => breaks.some(({ from, to }) => total >= from && total <= to);
      totals.forEach((total, t) => {
        expect(inside(total)).toBe(eigenvalue.values[t] > 1e-8);
      });
      for (const end of breaks.flatMap(({ from, to }) => [from, to])) {
        if (totals.includes(end)) continue;
        crossings++;
        expect(Math.abs(matrixOf(fitted, { ...point, total: end }).eigenvalues[0].value)).toBeLessThan(1e-5);
      }
    }
    expect(crossings).toBeGreaterThan(0);
  });
});
