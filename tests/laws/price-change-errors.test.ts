import { describe, expect, test } from "vitest";
import { changeAt } from "../../shared/economics/price-change/change-at.ts";
import { measuresAt } from "../../shared/economics/price-change/measures.ts";
import { standardError } from "../../shared/numerics/matrix.ts";
import { SYSTEM_NAMES } from "../../shared/systems/names.ts";
import { derivative, gap, moved } from "./derivatives.ts";
import { changeCases, reported, values } from "./price-changes.ts";

const CASES = 5;
/** Central differences of h = 1e-3, extrapolated: their own error is about 1e-9 of derivatives of order one. */
const RELATIVE = 1e-7;

describe.each(SYSTEM_NAMES)("%s", (name) => {
  test("the derivative in θ of every number reported is that of numerical derivatives", () => {
    const seen = new Set<string>();
    for (const { fitted, point, question, measures } of changeCases(name, 31, CASES)) {
      const exact = reported(measures);
      const names = Object.keys(exact).filter((of) => exact[of].length > 0);
      const at = (theta: readonly number[]) => {
        const there = reported(measuresAt({ fitted: { ...fitted, theta }, derivatives: false }, point, question));
        return names.flatMap((of) => values(there[of]));
      };
      const numerical = fitted.theta.map((_, a) => derivative((step) => at(moved(fitted.theta, a, step)), 1e-3));
      const duals = names.flatMap((of) => exact[of].map((dual) => ({ of, dual })));
      duals.forEach(({ of, dual }, place) => {
        seen.add(of);
        const expected = numerical.map((column) => column[place]);
        const largest = Math.max(1, ...expected.map(Math.abs));
        expect(gap(dual.gradient, expected) / largest, of).toBeLessThan(RELATIVE);
      });
      expect(gap(at(fitted.theta), values(duals.map(({ dual }) => dual)))).toBe(0);
    }
    // So that none drops out unnoticed.
    expect(seen).toContain("infinitesimal substitution");
    if (name !== "rotterdam") for (const of of ["marshallian", "revenue", "marginalCost"]) expect(seen).toContain(of);
    if (!["rotterdam", "la-aids"].includes(name))
      for (const of of ["equivalent", "hicks income"]) expect(seen).toContain(of);
  });

  test("standard errors are √(g'V g), in the units uploaded", () => {
    const priceScale = (n: number) => Array.from({ length: n }, (_, i) => 0.5 + i);
    for (const { fitted, point, measures } of changeCases(name, 32, 3, undefined, (_, { goods }) => ({
      prices: { [goods[0]]: { "per cent": 10 } },
      expenditure: 0,
    }))) {
      const options = { priceScale: priceScale(fitted.goods.length), totalScale: 40, level: 0.9 };
      const question = { prices: { [fitted.goods[0]]: { "per cent": 10 } }, expenditure: 0 };
      const told = changeAt(fitted, point, question, options);
      const error = 40 * standardError(fitted.covariance, [...measures.secondOrder.gradient]);
      expect(told.secondOrder.error).toBeCloseTo(error, 12);
      expect(told.secondOrder.value).toBeCloseTo(40 * measures.secondOrder.value, 12);
      // 1.6448536269514722 is the 95th percentile of the normal distribution (common practice).
      expect(told.secondOrder.high - told.secondOrder.value).toBeCloseTo(1.6448536269514722 * error, 10);
      const first = measures.infinitesimal.substitution[0];
      expect(told.infinitesimal.substitution.errors[0]).toBeCloseTo(
        (40 / 0.5) * standardError(fitted.covariance, [...first.gradient]),
        10,
      );
    }
  });
});
