import { describe, expect, it } from "vitest";
import { householdMeasures } from "../../../shared/economics/price-change/household.ts";
import { measuresAt } from "../../../shared/economics/price-change/measures.ts";
import { rowChange } from "../../../shared/economics/price-change/row-change.ts";
import { seededRandom } from "../../../shared/numerics/random.ts";
import type { CostFunction } from "../../../shared/systems/demand-system.ts";
import { SYSTEMS, systemOf } from "../../../shared/systems/index.ts";
import { SYSTEM_NAMES } from "../../../shared/systems/names.ts";
import { derivative, gap, moved } from "../../laws/derivatives.ts";
import { changeCases, values } from "../../laws/price-changes.ts";
import { exactly } from "../../support/fitted.ts";

const inLevels = SYSTEM_NAMES.filter((name) => SYSTEMS[name].kind === "levels");
const withCost = SYSTEM_NAMES.filter((name) => !("absent" in SYSTEMS[name].cost));

/** What a household spent: the system's shares, or these with a residual that sums to nothing. */
function spentBy(predicted: readonly number[], random: ReturnType<typeof seededRandom>, size: number): number[] {
  const residual = predicted.map(() => size * random.normal());
  const mean = residual.reduce((sum, one) => sum + one, 0) / residual.length;
  return predicted.map((share, i) => share + residual[i] - mean);
}

describe.each(inLevels)("a household of %s", (name) => {
  it("has the same numbers row by row as in the loop that allocates nothing, with one price scale or another", () => {
    const random = seededRandom(41);
    for (const { fitted, point, question, measures } of changeCases(name, 41, 15)) {
      const scale = point.prices.map((_, i) => 0.5 + 0.1 * i);
      const spent = spentBy(values(measures.bundles.before.shares), random, 0.05);
      const slow = householdMeasures({ fitted, derivatives: false }, point, spent, question, scale);
      const fast = rowChange(fitted, question, scale);
      fast.at(point.prices.map(Math.log), Math.log(point.total), point.demographics, spent);
      // `to` and specific amounts are other prices under another scale: utility may end there.
      if (fast.gap !== undefined) continue;
      const close = (one: number, other: number) =>
        expect(Math.abs(one - other)).toBeLessThan(1e-11 * (1 + Math.abs(other)));
      close(fast.secondOrder, slow.secondOrder.value);
      close(fast.revenue, slow.tax.revenue.value);
      close(fast.paidByBuyers, slow.tax.paidByBuyers.value);
      close(fast.raised, slow.tax.raised.value);
      expect(gap([...fast.change], values(slow.change))).toBeLessThan(1e-10);
      if (slow.compensating === undefined) continue;
      close(fast.compensating, slow.compensating.value);
      close(fast.equivalent, slow.equivalent!.value);
      expect(gap([...fast.substitution], values(slow.substitution!))).toBeLessThan(1e-10);
    }
  });

  it("without a residual is the system at its point, and a residual moves quantities alone", () => {
    const random = seededRandom(42);
    for (const { fitted, point, question, measures } of changeCases(name, 42, 8)) {
      const shares = values(measures.bundles.before.shares);
      const plain = householdMeasures({ fitted, derivatives: false }, point, shares, question);
      expect(gap(values(plain.change), values(measures.total!))).toBeLessThan(1e-11);
      expect(plain.compensating?.value).toBe(measures.compensating?.value);
      if (measures.tax) expect(plain.tax.revenue.value).toBeCloseTo(measures.tax.revenue.value, 12);
      const spent = spentBy(shares, random, 0.1);
      const own = householdMeasures({ fitted, derivatives: false }, point, spent, question);
      expect(own.equivalent?.value).toBe(plain.equivalent?.value);
      expect(own.secondOrder.value).toBe(plain.secondOrder.value);
      // ŵ(p1) − w is what the system's own share moves by (methods 3.4).
      const { after } = measures;
      const moves = values(own.change).map(
        (change, i) =>
          ((change + (spent[i] * point.total) / point.prices[i]) * after.prices[i]) / after.total - spent[i],
      );
      const system = values(measures.bundles.after!.shares).map((share, i) => share - shares[i]);
      expect(gap(moves, system)).toBeLessThan(1e-11);
    }
  });

  it("has the derivatives in θ of numerical differentiation", () => {
    const random = seededRandom(43);
    for (const { fitted, point, question, measures } of changeCases(name, 43, 3)) {
      const spent = spentBy(values(measures.bundles.before.shares), random, 0.05);
      const listed = (theta: readonly number[], derivatives: boolean) => {
        const one = householdMeasures({ fitted: { ...fitted, theta }, derivatives }, point, spent, question);
        const { tax } = one;
        const welfare = one.compensating ? [one.compensating, one.equivalent!, ...one.substitution!] : [];
        return [...welfare, one.secondOrder, tax.revenue, tax.paidByBuyers, tax.lost, tax.raised, ...one.change];
      };
      const numerical = fitted.theta.map((_, a) =>
        derivative((step) => values(listed(moved(fitted.theta, a, step), false)), 1e-3),
      );
      listed(fitted.theta, true).forEach(({ gradient }, place) => {
        const expected = numerical.map((column) => column[place]);
        expect(gap(gradient, expected) / Math.max(1, ...expected.map(Math.abs))).toBeLessThan(1e-7);
      });
    }
  });
});

describe.each(withCost)("%s", (name) => {
  it("has one utility and one cost, with and without allocating", () => {
    for (const { fitted, point, measures } of changeCases(name, 44, 20)) {
      const { system, size } = systemOf(fitted);
      const cost = system.cost as CostFunction;
      const evaluator = cost.evaluator(fitted.theta, size);
      const utility = cost.utility(fitted.theta, size, point);
      const fast = evaluator.utility(point.prices.map(Math.log), Math.log(point.total), point.demographics);
      expect(Math.abs(fast - utility)).toBeLessThan(1e-13 * (1 + Math.abs(utility)));
      const logCost = cost.logCost(fitted.theta, size, utility, measures.after.prices, point.demographics);
      const fastCost = evaluator.logCost(measures.after.prices.map(Math.log), utility, point.demographics);
      expect(Math.abs(fastCost - logCost)).toBeLessThan(1e-13 * (1 + Math.abs(logCost)));
    }
  });
});

describe("a row without an answer", () => {
  const needs = exactly("les", ["food", "rest"], [0.6, 0, 0.3, 0.7]);
  const at = (question: Parameters<typeof rowChange>[1], total: number) => {
    const row = rowChange(needs, question, [1, 1]);
    row.at([0, 0], Math.log(total), [], [0.7, 0.3]);
    return row.gap;
  };

  it("says whether utility ends before the change or after it, or a subsidy eats the price", () => {
    const dearer = { prices: { food: { "per cent": 100 } }, expenditure: 0 };
    expect(at(dearer, 2)).toBeUndefined();
    // 0.6 is committed before, 1.2 after.
    expect(at(dearer, 0.5)).toBe("utility before");
    expect(at(dearer, 1)).toBe("utility after");
    expect(at({ prices: { food: { specific: -1 } }, expenditure: 0 }, 2)).toBe("price");
    expect(() =>
      measuresAt(
        { fitted: needs, derivatives: false },
        { prices: [1, 1], total: 2, demographics: [] },
        { prices: { food: { specific: -1.5 } }, expenditure: 0 },
      ),
    ).toThrow("the subsidy takes the price of food from 1 to -0.5");
  });

  it("is told of a linear approximate system where its index ends", () => {
    const bent = exactly("la-aids", ["a", "b"], [0.5, 0.5, 0, 0, 0, 0, -0.9, 0.9], {
      index: "stone",
      indexMeans: { shares: [0.5, 0.5], prices: [1, 1] },
    });
    const row = rowChange(bent, { prices: { a: { "per cent": 300 } }, expenditure: 0 }, [1, 1]);
    row.at([0, 0], 0, [], [0.5, 0.5]);
    expect(row.gap).toBe("shares");
  });
});

it("where the income effect is none, all three losses are one", () => {
  // Of the first good a fixed quantity is bought, whatever the money: 0.2 · Δp is lost.
  const fixed = exactly("les", ["salt", "rest"], [0.2, 0, 0, 1]);
  const point = { prices: [1, 1], total: 1, demographics: [] };
  const { compensating, equivalent, marshallian } = measuresAt({ fitted: fixed, derivatives: false }, point, {
    prices: { salt: { "per cent": 50 } },
    expenditure: 0,
  });
  for (const one of [compensating, equivalent, marshallian]) expect(one?.value).toBeCloseTo(0.1, 13);
});
