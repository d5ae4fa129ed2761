import { describe, expect, test } from "vitest";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { compensatingVariation } from "../../shared/economics/welfare.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { Point, SystemSize } from "../../shared/systems/demand-system.ts";
import { easiPlaces } from "../../shared/systems/easi-layout.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import { SYSTEM_NAMES, type SystemName } from "../../shared/systems/names.ts";
import { quaidsPlaces } from "../../shared/systems/quaids-parts.ts";
import { fittedFrom } from "../support/fitted.ts";
import { gap } from "./derivatives.ts";
import { randomCase } from "./random-systems.ts";

/**
 * Units are a choice: with prices in other units (p_j → k_j p_j) and money in others (x → c x, p → c p) the
 * same behaviour has other coefficients, found by each system's own rule, and nothing that is read changes.
 */
interface Rescaled {
  readonly theta: number[];
  readonly size: SystemSize;
}
type Rule = (
  theta: readonly number[],
  size: SystemSize,
  priceFactors: readonly number[],
  moneyFactor: number,
) => Rescaled;

/** Per system: the factors are those of the numbers that stand for prices (k_j) and for money (c). */
const RULES: Record<SystemName, Rule> = {
  /**
   * α_i* = α_i − Σ_j γ_ij ln k_j, α₀* = α₀ + ln c − Σ_j α_j ln k_j + ½ Σ_ij γ_ij ln k_i ln k_j; with demographics
   * the shift of α₀ would depend on z, so the check is made at z = 0.
   */
  aids: (theta, size, priceFactors, moneyFactor) => {
    const n = size.goods;
    const logs = priceFactors.map(Math.log);
    const gammaAt = n + n * size.demographics;
    const gamma = (i: number, j: number) => theta[gammaAt + i * n + j];
    const shifted = logs.map((_, i) => theta[i] - logs.reduce((sum, log, j) => sum + gamma(i, j) * log, 0));
    const square = logs.reduce((sum, a, i) => sum + logs.reduce((inner, b, j) => inner + gamma(i, j) * a * b, 0), 0);
    const alpha0 =
      size.alpha0 + Math.log(moneyFactor) - logs.reduce((sum, log, j) => sum + theta[j] * log, 0) + 0.5 * square;
    return { theta: [...shifted, ...theta.slice(n)], size: { ...size, alpha0 } };
  },
  /** As AIDS, and b(p) is Π k_j^β_j times itself, so that λ_i* = λ_i Π k_j^β_j. */
  quaids: (theta, size, priceFactors, moneyFactor) => {
    const n = size.goods;
    const places = quaidsPlaces(size);
    const rescaled = RULES.aids(theta, size, priceFactors, moneyFactor);
    const factor = Math.exp(priceFactors.reduce((sum, of, j) => sum + theta[places.beta(j)] * Math.log(of), 0));
    return { ...rescaled, theta: rescaled.theta.map((entry, a) => (a < theta.length - n ? entry : entry * factor)) };
  },
  /** α_i* = α_i − Σ_j γ_ij ln k_j − β_i ln c, and the base prices of the index are in the new units. */
  "la-aids": (theta, size, priceFactors, moneyFactor) => {
    const n = size.goods;
    const logs = priceFactors.map(Math.log);
    const gammaAt = n + n * size.demographics;
    const betaAt = gammaAt + n * n;
    const shifted = logs.map(
      (_, i) =>
        theta[i] -
        logs.reduce((sum, log, j) => sum + theta[gammaAt + i * n + j] * log, 0) -
        theta[betaAt + i] * Math.log(moneyFactor),
    );
    const index = size.index!;
    const meanPrices = index.meanPrices.map((price, j) => price * priceFactors[j]);
    return { theta: [...shifted, ...theta.slice(n)], size: { ...size, index: { ...index, meanPrices } } };
  },
  /**
   * With u* = a + h u (a straight line only where Engel curves are: degree one, at z = 0):
   * h = 1 − κ'b_1 + ½ κ'Bκ, a = ln c − κ'b_0 + ½ κ'Aκ, κ = ln k; B* = B/h, A* = A − a B*, b_1* = (b_1 − Bκ)/h and
   * b_0* = b_0 − Aκ − a b_1*.
   */
  easi: (theta, size, priceFactors, moneyFactor) => {
    const n = size.goods;
    const { power, price, tilt, tilted } = easiPlaces(size);
    const logs = priceFactors.map(Math.log);
    const times = (entry: (i: number, j: number) => number) =>
      logs.map((_, i) => logs.reduce((sum, log, j) => sum + entry(i, j) * log, 0));
    const along = (vector: readonly number[]) => vector.reduce((sum, value, i) => sum + value * logs[i], 0);
    const a = (i: number, j: number) => theta[price(i, j)];
    const b = (i: number, j: number) => (tilted > 0 ? theta[tilt(i, j)] : 0);
    const [ak, bk] = [times(a), times(b)];
    const level = logs.map((_, i) => theta[power(i, 0)]);
    const first = logs.map((_, i) => theta[power(i, 1)]);
    const h = 1 - along(first) + 0.5 * along(bk);
    const shift = Math.log(moneyFactor) - along(level) + 0.5 * along(ak);
    const other = [...theta];
    for (let i = 0; i < n; i++) {
      const slope = (first[i] - bk[i]) / h;
      other[power(i, 1)] = slope;
      other[power(i, 0)] = level[i] - ak[i] - shift * slope;
      for (let j = 0; j < n; j++) {
        other[price(i, j)] = a(i, j) - (shift * b(i, j)) / h;
        if (tilted > 0) other[tilt(i, j)] = b(i, j) / h;
      }
    }
    return { theta: other, size };
  },
  /** c_i* = c_i · c / k_i, and so for its shifts. */
  les: (theta, size, priceFactors, moneyFactor) => ({
    theta: theta.map((entry, at) => {
      const { block, good } = SYSTEMS.les.layout(size)[at];
      return block === "marginal" ? entry : (entry * moneyFactor) / priceFactors[good];
    }),
    size,
  }),
  /** Changes of logs and observed shares have no units. */
  rotterdam: (theta, size) => ({ theta: [...theta], size }),
};

/** Coefficients of order one moved by logs of order two: a few hundred roundings. */
const ROUNDING = 1e-12;

describe.each(SYSTEM_NAMES)("%s", (name) => {
  test("the matrix, its quantity form in units uploaded and welfare do not depend on units", () => {
    const random = seededRandom(98);
    for (let repeat = 0; repeat < 60; repeat++) {
      const { size: drawn, free, theta, point: at } = randomCase(random, name, ["homogeneity", "symmetry"]);
      // Curved Engel curves in real expenditure at unit prices depend on which prices are one.
      if (drawn.easi && drawn.easi.degree > 1) continue;
      // Stone's index depends on units by its nature (Moschini 1995): it is the next test's.
      const size =
        drawn.index?.name === "stone" || drawn.index?.name === "lagged stone"
          ? { ...drawn, index: { ...drawn.index, name: "tornqvist" as const } }
          : drawn;
      const point: Point = { ...at, demographics: at.demographics.map(() => 0) };
      const priceFactors = point.prices.map(() => Math.exp(random.normal()));
      const moneyFactor = Math.exp(random.normal());
      const other = RULES[name](theta, size, priceFactors, moneyFactor);
      const moved = {
        ...point,
        prices: point.prices.map((price, j) => price * priceFactors[j]),
        total: point.total * moneyFactor,
      };
      const one = fittedFrom(random, name, size, ["homogeneity", "symmetry"], free, theta);
      const two = fittedFrom(random, name, other.size, ["homogeneity", "symmetry"], free, other.theta);
      const first = matrixAt(one, point, { priceScale: point.prices.map(() => 1), totalScale: 1, pointName: "one" });
      const second = matrixAt(two, moved, {
        priceScale: priceFactors.map((factor) => 1 / factor),
        totalScale: 1 / moneyFactor,
        pointName: "two",
      });
      expect(gap(second.shares, first.shares)).toBeLessThan(ROUNDING);
      expect(gap(second.share.flat(), first.share.flat())).toBeLessThan(ROUNDING);
      const scale = Math.max(...first.quantity.flat().map(Math.abs));
      expect(gap(second.quantity.flat(), first.quantity.flat())).toBeLessThan(100 * ROUNDING * (1 + scale));
      const { cost } = SYSTEMS[name];
      if ("absent" in cost || !Number.isFinite(cost.utility(theta, size, point))) continue;
      const dearer = (prices: readonly number[]) => prices.map((price, j) => (j === 0 ? price * 1.05 : price));
      const loss = compensatingVariation(one, point, dearer(point.prices));
      const otherLoss = compensatingVariation(two, moved, dearer(moved.prices)) / moneyFactor;
      expect(Math.abs(otherLoss - loss)).toBeLessThan(ROUNDING * (1 + point.total));
    }
  });
});

test("Stone's index depends on the units of prices, the others do not (Moschini 1995)", () => {
  const random = seededRandom(99);
  const { size, theta, point } = randomCase(random, "la-aids", ["homogeneity", "symmetry"]);
  const factors = point.prices.map((_, j) => 1 + j);
  const changed = (index: "stone" | "lagged stone" | "tornqvist") => {
    const own = { ...size, index: { ...size.index!, name: index } };
    const other = RULES["la-aids"](theta, own, factors, 1);
    const moved = { ...point, prices: point.prices.map((price, j) => price * factors[j]) };
    const { shares } = SYSTEMS["la-aids"].slopes(theta, own, point);
    return gap(SYSTEMS["la-aids"].slopes(other.theta, other.size, moved).shares, shares);
  };
  expect(changed("stone")).toBeGreaterThan(1e-3);
  expect(changed("lagged stone")).toBeGreaterThan(1e-3);
  expect(changed("tornqvist")).toBeLessThan(ROUNDING);
});
