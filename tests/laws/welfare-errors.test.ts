import { describe, expect, test } from "vitest";
import { compensatingVariation, equivalentVariation } from "../../shared/economics/welfare.ts";
import { compensatingVariationWithError, equivalentVariationWithError } from "../../shared/economics/welfare-errors.ts";
import { standardError } from "../../shared/numerics/matrix.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { CostFunction } from "../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import { SYSTEM_NAMES } from "../../shared/systems/names.ts";
import { fittedFrom } from "../support/fitted.ts";
import { derivative, gap, moved } from "./derivatives.ts";
import { randomCase } from "./random-systems.ts";

const CASES = 15;
/** Central differences of h = 2e-3, extrapolated: their own error is about 1e-9 of derivatives of order one. */
const RELATIVE = 1e-7;

const withCost = SYSTEM_NAMES.filter((name) => !("absent" in SYSTEMS[name].cost));

function casesOf(name: (typeof SYSTEM_NAMES)[number], seed: number) {
  const random = seededRandom(seed);
  const impose = ["homogeneity", "symmetry"] as const;
  const list = [];
  while (list.length < CASES) {
    const { size, free, theta, point } = randomCase(random, name, impose);
    const fitted = fittedFrom(random, name, size, impose, free, theta);
    const cost = SYSTEMS[name].cost as CostFunction;
    const prices = point.prices.map((price) => price * Math.exp(0.1 * random.normal()));
    const defined = [point, { ...point, prices }].every((at) => {
      const utility = cost.utility(theta, size, at);
      return [point.prices, prices].every((p) =>
        Number.isFinite(cost.logCost(theta, size, utility, p, at.demographics)),
      );
    });
    if (defined) list.push({ fitted, point, prices, cost, size, theta });
  }
  return list;
}

describe.each(withCost)("%s", (name) => {
  test("derivatives of ln c by utility and by every coefficient are those of numerical derivatives", () => {
    for (const { cost, size, theta, point } of casesOf(name, 21)) {
      const utility = cost.utility(theta, size, point);
      const at = (coefficients: readonly number[], u: number) => [
        cost.logCost(coefficients, size, u, point.prices, point.demographics),
      ];
      const exact = cost.logCostDerivatives(theta, size, utility, point.prices, point.demographics);
      const [byUtility] = derivative((step) => at(theta, utility + step), 2e-3);
      expect(Math.abs(exact.utility - byUtility)).toBeLessThan(RELATIVE * (1 + Math.abs(byUtility)));
      const byTheta = theta.map((_, a) => derivative((step) => at(moved(theta, a, step), utility), 2e-3)[0]);
      expect(gap(exact.theta, byTheta)).toBeLessThan(RELATIVE);
    }
  });

  test.each([
    ["compensating", compensatingVariation, compensatingVariationWithError],
    ["equivalent", equivalentVariation, equivalentVariationWithError],
  ] as const)(
    "the %s variation's gradient and standard error are those of numerical derivatives",
    (_, of, withError) => {
      for (const { fitted, point, prices } of casesOf(name, 22)) {
        const { value, gradient, standardError: error } = withError(fitted, point, prices);
        expect(value).toBe(of(fitted, point, prices));
        const numerical = fitted.theta.map(
          (__, a) =>
            derivative((step) => [of({ ...fitted, theta: moved(fitted.theta, a, step) }, point, prices)], 2e-3)[0],
        );
        const largest = Math.max(...numerical.map(Math.abs));
        expect(gap(gradient, numerical)).toBeLessThan(RELATIVE * (1 + largest));
        const expected = standardError(fitted.covariance, numerical);
        expect(Math.abs(error - expected)).toBeLessThan(RELATIVE * (1 + expected));
      }
    },
  );

  test("where no price moves there is no variation and no error", () => {
    for (const { fitted, point } of casesOf(name, 23)) {
      for (const of of [compensatingVariationWithError, equivalentVariationWithError]) {
        const { value, standardError: error } = of(fitted, point, point.prices);
        expect(Math.abs(value)).toBeLessThan(1e-12 * point.total);
        expect(error).toBeLessThan(1e-12 * (1 + point.total));
      }
    }
  });
});
