import { describe, expect, test } from "vitest";
import { createRowChecker } from "../../shared/economics/sample.ts";
import {
  compensatingVariation,
  equivalentVariation,
  secondOrderVariation,
  WelfareUndefined,
} from "../../shared/economics/welfare.ts";
import { type Random, seededRandom } from "../../shared/numerics/random.ts";
import type { CostFunction, DemandSystem, Point, SystemSize } from "../../shared/systems/demand-system.ts";
import { type FittedCoefficients, SYSTEMS } from "../../shared/systems/index.ts";
import { SYSTEM_NAMES } from "../../shared/systems/names.ts";
import { exactly, fittedFrom } from "../support/fitted.ts";
import { integral } from "../support/quadrature.ts";
import { derivative, gap, repriced } from "./derivatives.ts";
import { randomCase } from "./random-systems.ts";

const CASES = 60;
/** Costs are of order one and pass through exp and ln a few times. */
const ROUNDING = 1e-13;

interface WelfareCase {
  readonly system: DemandSystem;
  readonly cost: CostFunction;
  readonly size: SystemSize;
  readonly theta: number[];
  readonly fitted: FittedCoefficients;
  readonly point: Point;
}

const withCost = SYSTEM_NAMES.filter((name) => !("absent" in SYSTEMS[name].cost));
const withoutCost = SYSTEM_NAMES.filter((name) => "absent" in SYSTEMS[name].cost);

function casesOf(name: (typeof SYSTEM_NAMES)[number], seed: number): WelfareCase[] {
  const random = seededRandom(seed);
  const system = SYSTEMS[name];
  const list: WelfareCase[] = [];
  while (list.length < CASES) {
    const { size, free, theta, point } = randomCase(random, name, ["homogeneity", "symmetry"]);
    const fitted = fittedFrom(random, name, size, ["homogeneity", "symmetry"], free, theta);
    const cost = system.cost as CostFunction;
    // A system may leave utility undefined at a point (committed expenditure above the total); refusals have their own test.
    if (Number.isFinite(cost.utility(theta, size, point))) list.push({ system, cost, size, theta, fitted, point });
  }
  return list;
}

function randomPrices(random: Random, { prices }: Point): number[] {
  return prices.map((price) => price * Math.exp(0.1 * random.normal()));
}

describe.each(withCost)("%s", (name) => {
  test("cost undoes utility", () => {
    for (const { cost, size, theta, point } of casesOf(name, 1)) {
      const utility = cost.utility(theta, size, point);
      const back = cost.logCost(theta, size, utility, point.prices, point.demographics);
      expect(Math.abs(back - Math.log(point.total))).toBeLessThan(ROUNDING);
    }
  });

  test("Shephard: the cost function's price slopes are the shares", () => {
    for (const { system, cost, size, theta, point } of casesOf(name, 2)) {
      const utility = cost.utility(theta, size, point);
      const { shares } = system.slopes(theta, size, point);
      const slopes = shares.map(
        (_, j) =>
          derivative((step) => [
            cost.logCost(theta, size, utility, repriced(point.prices, j, step), point.demographics),
          ])[0],
      );
      expect(gap(slopes, shares)).toBeLessThan(1e-9);
    }
  });

  test("cost rises with utility and is homogeneous of degree one in prices", () => {
    for (const { cost, size, theta, point } of casesOf(name, 3)) {
      const utility = cost.utility(theta, size, point);
      const at = (u: number, factor: number) =>
        cost.logCost(
          theta,
          size,
          u,
          point.prices.map((price) => price * factor),
          point.demographics,
        );
      expect(at(utility + 1e-3, 1)).toBeGreaterThan(at(utility, 1));
      expect(Math.abs(at(utility, 3) - at(utility, 1) - Math.log(3))).toBeLessThan(10 * ROUNDING);
    }
  });

  test("a change reversed, and one in two steps", () => {
    const random = seededRandom(4);
    for (const { cost, size, theta, fitted, point } of casesOf(name, 4)) {
      const prices = randomPrices(random, point);
      if (!Number.isFinite(cost.utility(theta, size, { ...point, prices }))) continue;
      const reversed = compensatingVariation(fitted, { ...point, prices }, point.prices);
      expect(Math.abs(equivalentVariation(fitted, point, prices) + reversed)).toBeLessThan(10 * ROUNDING);
      // At the first utility the second step starts from the compensated total.
      const further = randomPrices(random, { ...point, prices });
      const first = compensatingVariation(fitted, point, prices);
      const second = compensatingVariation(fitted, { ...point, prices, total: point.total + first }, further);
      const both = compensatingVariation(fitted, point, further);
      expect(Math.abs(first + second - both)).toBeLessThan(10 * ROUNDING * (1 + Math.abs(both)));
    }
  });

  test("Laspeyres bounds the compensating and Paasche the equivalent variation wherever cost is concave", () => {
    const random = seededRandom(5);
    let compared = 0;
    for (const { cost, size, theta, fitted, point } of casesOf(name, 5)) {
      const prices = randomPrices(random, point);
      const after = { ...point, prices };
      const utilities = [point, after].map((at) => cost.utility(theta, size, at));
      if (!utilities.every((utility) => concaveAlong(fitted, cost, size, utility, point, prices))) continue;
      const spent = (at: Point) =>
        SYSTEMS[name]
          .slopes(theta, size, at)
          .shares.reduce(
            (sum, share, i) => sum + ((share * at.total) / at.prices[i]) * (prices[i] - point.prices[i]),
            0,
          );
      const slack = ROUNDING * point.total;
      expect(compensatingVariation(fitted, point, prices)).toBeLessThanOrEqual(spent(point) + slack);
      expect(equivalentVariation(fitted, point, prices)).toBeGreaterThanOrEqual(spent(after) - slack);
      compared++;
    }
    expect(compared).toBeGreaterThan(5);
  });

  test("for one dearer normal good EV ≤ ΔCS ≤ CV, the other way round for an inferior one", () => {
    let compared = 0;
    for (const { system, cost, size, theta, fitted, point } of casesOf(name, 6)) {
      const dearer = point.prices[0] * 1.1;
      const withPrice = (price: number) => ({ ...point, prices: [price, ...point.prices.slice(1)] });
      if (!Number.isFinite(cost.utility(theta, size, withPrice(dearer)))) continue;
      const along = [0, 0.25, 0.5, 0.75, 1].map((s) => {
        const { shares, total } = system.slopes(theta, size, withPrice(point.prices[0] * (1 + 0.1 * s)));
        return { share: shares[0], marginal: shares[0] + total[0] };
      });
      const normal = along.every(({ share, marginal }) => share > 0.01 && marginal > 0.01);
      const inferior = along.every(({ share, marginal }) => share > 0.01 && marginal < -0.01);
      if (!normal && !inferior) continue;
      const quantity = (price: number) =>
        (system.slopes(theta, size, withPrice(price)).shares[0] * point.total) / price;
      const surplus = integral(quantity, point.prices[0], dearer);
      const cv = compensatingVariation(fitted, point, withPrice(dearer).prices);
      const ev = equivalentVariation(fitted, point, withPrice(dearer).prices);
      const [low, high] = normal ? [ev, cv] : [cv, ev];
      expect(low).toBeLessThan(surplus);
      expect(surplus).toBeLessThan(high);
      compared++;
    }
    expect(compared).toBeGreaterThan(20);
  });

  test("the second-order approximation is right to second order", () => {
    const random = seededRandom(7);
    for (const { fitted, point } of casesOf(name, 7)) {
      const direction = point.prices.map(() => random.normal());
      const error = (step: number) => {
        const prices = point.prices.map((price, i) => price * (1 + step * direction[i]));
        return compensatingVariation(fitted, point, prices) - secondOrderVariation(fitted, point, prices);
      };
      // First and second derivatives of the error at no change, by central differences of h = 1e-3: they leave the
      // third and fourth derivatives times h², up to 1e-4 of the total; a wrong term would leave a hundredth or more.
      const h = 1e-3;
      expect(Math.abs(error(h) - error(-h)) / (2 * h)).toBeLessThan(1e-3 * point.total);
      expect(Math.abs(error(h) + error(-h)) / h ** 2).toBeLessThan(1e-3 * point.total);
      expect(Math.abs(error(0))).toBeLessThan(ROUNDING * point.total);
    }
  });

  test("welfare is refused where homogeneity or symmetry is neither imposed nor formal", () => {
    const [{ fitted, point }] = casesOf(name, 8);
    const free = { ...fitted, imposed: [] };
    if (SYSTEMS[name].heldByForm.includes("symmetry")) {
      expect(compensatingVariation(free, point, point.prices)).toBeCloseTo(0, 14);
    } else {
      expect(() => compensatingVariation(free, point, point.prices)).toThrow("homogeneity is not imposed");
      const half = { ...fitted, imposed: ["homogeneity" as const] };
      expect(() => equivalentVariation(half, point, point.prices)).toThrow("symmetry is not imposed");
    }
  });
});

describe.each(withoutCost)("%s", (name) => {
  test("has no welfare and names the system that has", () => {
    const { size, free, theta, point } = randomCase(seededRandom(1), name, ["homogeneity", "symmetry"]);
    const fitted = fittedFrom(seededRandom(2), name, size, ["homogeneity", "symmetry"], free, theta);
    expect(() => compensatingVariation(fitted, point, point.prices)).toThrow(WelfareUndefined);
    expect(() => equivalentVariation(fitted, point, point.prices)).toThrow("no cost function");
  });
});

test("committed expenditure above the total leaves utility, and so welfare, undefined", () => {
  const fitted = exactly("les", ["a", "b"], [0.8, 0.6, 0.5, 0.5]);
  const point = { prices: [1, 1], total: 1, demographics: [] };
  expect(() => compensatingVariation(fitted, point, [1, 2])).toThrow("utility is not defined at a total of 1");
});

/** Negativity at seventeen places of the compensated path. */
function concaveAlong(
  fitted: FittedCoefficients,
  cost: CostFunction,
  size: SystemSize,
  utility: number,
  point: Point,
  prices: readonly number[],
): boolean {
  const checker = createRowChecker(fitted);
  for (let s = 0; s <= 16; s++) {
    const between = point.prices.map((price, i) => price + (s / 16) * (prices[i] - price));
    const logCost = cost.logCost(fitted.theta, size, utility, between, point.demographics);
    if (!Number.isFinite(logCost)) return false;
    checker.evaluate(between.map(Math.log), logCost, point.demographics);
    if (!checker.negativityHolds()) return false;
  }
  return true;
}
