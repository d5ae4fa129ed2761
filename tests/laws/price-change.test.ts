import { describe, expect, test } from "vitest";
import { integratedCost } from "../../shared/economics/price-change/integrated-cost.ts";
import { measuresAt } from "../../shared/economics/price-change/measures.ts";
import { createRowChecker } from "../../shared/economics/sample.ts";
import { secondOrderVariation } from "../../shared/economics/welfare.ts";
import type { PriceQuestion } from "../../shared/schemas/price-change.ts";
import type { CostFunction } from "../../shared/systems/demand-system.ts";
import { SYSTEMS, systemOf } from "../../shared/systems/index.ts";
import { SYSTEM_NAMES } from "../../shared/systems/names.ts";
import { integral } from "../support/quadrature.ts";
import { derivative, gap } from "./derivatives.ts";
import { type ChangeCase, changeCases, reported, values } from "./price-changes.ts";

const CASES = 20;
/** Numbers of order one that pass through exp and ln a few times. */
const ROUNDING = 1e-12;

const inLevels = SYSTEM_NAMES.filter((name) => SYSTEMS[name].kind === "levels");
const withCost = SYSTEM_NAMES.filter((name) => !("absent" in SYSTEMS[name].cost));
/** Those whose slopes are the derivatives of their own share function: the others hold the weights of an index. */
const ownSlopes = inLevels.filter((name) => SYSTEMS[name].sharesNear === undefined);

const spent = (prices: readonly number[], quantities: readonly number[]) =>
  quantities.reduce((sum, quantity, i) => sum + prices[i] * quantity, 0);

/** The same question with every change `scale` times as large; only changes in per cent. */
const scaled = ({ prices, expenditure }: PriceQuestion, scale: number): PriceQuestion => ({
  prices: Object.fromEntries(
    Object.entries(prices).map(([good, change]) => [
      good,
      { ...change, "per cent": scale * (change["per cent"] ?? 0) },
    ]),
  ),
  expenditure: scale * expenditure,
});
const perCent: Parameters<typeof changeCases>[4] = (random, { goods }) => ({
  prices: Object.fromEntries(goods.map((good) => [good, { "per cent": 10 * random.normal() }])),
  expenditure: 5 * random.normal(),
});

describe.each(inLevels)("%s", (name) => {
  test("effects add up to the change of quantities, and budgets are spent", () => {
    for (const { measures, point } of changeCases(name, 1, CASES)) {
      const { bundles, hicks, slutsky, total, after } = measures;
      const all = values(total ?? []);
      const both = [hicks, slutsky].filter((parts) => parts !== undefined);
      for (const { substitution, income } of both) {
        expect(
          gap(
            values(substitution).map((part, i) => part + income[i].value),
            all,
          ),
        ).toBeLessThan(ROUNDING);
      }
      const before = values(bundles.before.quantities);
      expect(
        gap(
          before.map((quantity, i) => quantity + all[i]),
          values(bundles.after?.quantities ?? []),
        ),
      ).toBeLessThan(ROUNDING);
      expect(Math.abs(spent(point.prices, before) - point.total)).toBeLessThan(ROUNDING * point.total);
      expect(Math.abs(spent(after.prices, values(bundles.after!.quantities)) - after.total)).toBeLessThan(
        ROUNDING * after.total,
      );
    }
  });

  test("Slutsky's bundle costs what the bundle before costs at the new prices", () => {
    for (const { measures } of changeCases(name, 2, CASES)) {
      const { bundles, after } = measures;
      const before = spent(after.prices, values(bundles.before.quantities));
      expect(Math.abs(spent(after.prices, values(bundles.slutsky!.quantities)) - before)).toBeLessThan(
        ROUNDING * before,
      );
      expect(Math.abs(measures.costOfLiving.laspeyres.value * bundles.before.total.value - before)).toBeLessThan(
        ROUNDING * before,
      );
    }
  });

  test("no change is no change, with no error", () => {
    for (const { measures } of changeCases(name, 3, 5, undefined, () => ({ prices: {}, expenditure: 0 }))) {
      const all = reported(measures);
      const none = ["hicks", "slutsky", "infinitesimal"].flatMap((of) => [`${of} substitution`, `${of} income`]);
      for (const of of [...none, "total", "compensating", "equivalent", "secondOrder", "marshallian"]) {
        for (const { value, gradient } of all[of] ?? []) {
          expect(Math.abs(value), of).toBeLessThan(ROUNDING);
          expect(Math.max(...gradient.map(Math.abs)), of).toBeLessThan(1e-11);
        }
      }
      for (const of of ["atUtilityBefore", "laspeyres", "paasche"]) {
        for (const { value } of all[of]) expect(Math.abs(value - 1), of).toBeLessThan(ROUNDING);
      }
      expect(measures.tax).toBeUndefined();
    }
  });

  test("the second-order variation is Σ q Δp + ½ Σ S Δp Δp, and the Marshallian loss of one price its integral", () => {
    for (const { fitted, point, measures } of changeCases(name, 4, CASES, undefined, (random, { goods }) => ({
      prices: { [goods[0]]: { "per cent": 40 * random.uniform() } },
      expenditure: 0,
    }))) {
      const { prices } = measures.after;
      expect(Math.abs(measures.secondOrder.value - secondOrderVariation(fitted, point, prices))).toBeLessThan(ROUNDING);
      const { system, size } = systemOf(fitted);
      const quantity = (price: number) => {
        const at = { ...point, prices: [price, ...point.prices.slice(1)] };
        return (system.slopes(fitted.theta, size, at).shares[0] * point.total) / price;
      };
      const surplus = integral(quantity, point.prices[0], prices[0]);
      expect(Math.abs(measures.marshallian!.value - surplus)).toBeLessThan(1e-11 * point.total);
    }
  });
});

describe.each(ownSlopes)("%s", (name) => {
  test("the effects of a small change are the differentials", () => {
    for (const { fitted, point, question, measures } of changeCases(name, 5, 8, undefined, perCent)) {
      const along = (of: string) =>
        derivative((step) =>
          values(reported(measuresAt({ fitted, derivatives: false }, point, scaled(question, step)))[of]),
        );
      const { substitution, income } = measures.infinitesimal;
      const size = Math.max(1, ...values(measures.bundles.before.quantities).map(Math.abs));
      for (const of of ["slutsky", ...(measures.hicks ? ["hicks"] : [])]) {
        expect(gap(along(`${of} substitution`), values(substitution)) / size, of).toBeLessThan(1e-7);
        expect(gap(along(`${of} income`), values(income)) / size, of).toBeLessThan(1e-7);
      }
    }
  });

  test("the marginal cost of funds is what buyers lose by what revenue gains as every tax rises alike", () => {
    const specific: Parameters<typeof changeCases>[4] = (random, { goods }, { prices }) => ({
      prices: Object.fromEntries(
        goods
          .slice(0, -1)
          .map((good, i) => [good, { specific: 0.2 * prices[i] * random.uniform(), "pass-through": 0.7 }]),
      ),
      expenditure: 0,
    });
    for (const { fitted, point, question, measures } of changeCases(name, 6, 8, undefined, specific)) {
      const at = (step: number) => {
        const raised = Object.entries(question.prices).map(([good, one]) => [
          good,
          { ...one, specific: one.specific! * (1 + step) },
        ]);
        const there = measuresAt({ fitted, derivatives: false }, point, {
          ...question,
          prices: Object.fromEntries(raised),
        });
        return [there.tax!.revenue.value, there.marshallian!.value];
      };
      // The loss at the margin is −∂CS/∂s = Σ q ∂p/∂s, whatever measure of welfare is used further on.
      const [revenue, lost] = derivative(at);
      const { marginalCost, noMarginalCost } = measures.tax!;
      if (marginalCost === undefined) expect(noMarginalCost, String(revenue)).toContain("no more revenue");
      else expect(Math.abs(marginalCost.value - lost / revenue) / marginalCost.value).toBeLessThan(1e-7);
    }
  });
});

describe.each(withCost)("%s", (name) => {
  test("Hicks's bundle has the utility before and costs c(p1, u0)", () => {
    for (const { fitted, point, measures } of changeCases(name, 7, CASES)) {
      const { system, size } = systemOf(fitted);
      const cost = system.cost as CostFunction;
      const { after, bundles, compensating } = measures;
      const utility = cost.utility(fitted.theta, size, point);
      const kept = after.total + compensating!.value;
      expect(Math.abs(spent(after.prices, values(bundles.hicks!.quantities)) - kept)).toBeLessThan(ROUNDING * kept);
      const reached = cost.utility(fitted.theta, size, { ...after, total: kept });
      expect(Math.abs(reached - utility)).toBeLessThan(1e-11 * (1 + Math.abs(utility)));
      const logCost = cost.logCost(fitted.theta, size, utility, after.prices, point.demographics);
      expect(Math.abs(Math.log(kept) - logCost)).toBeLessThan(ROUNDING);
    }
  });

  test("both variations come out of integrating compensated demand, without the formula of cost", () => {
    for (const { fitted, point, measures } of changeCases(name, 8, 8)) {
      const { system, size } = systemOf(fitted);
      const demand = (prices: readonly number[], total: number) =>
        system
          .slopes(fitted.theta, size, { prices, total, demographics: point.demographics })
          .shares.map((share, i) => (share * total) / prices[i]);
      const { after } = measures;
      const kept = integratedCost(demand, point.prices, after.prices, point.total);
      expect(Math.abs(measures.compensating!.value - (kept - after.total))).toBeLessThan(1e-10 * point.total);
      const reached = integratedCost(demand, after.prices, point.prices, after.total);
      expect(Math.abs(measures.equivalent!.value - (point.total - reached))).toBeLessThan(1e-10 * point.total);
    }
  });

  test("where all prices and expenditure move alike nothing is lost and nothing changes", () => {
    for (const { measures } of changeCases(name, 9, CASES, undefined, (random, { goods }) => {
      const alike = 30 * random.normal();
      return {
        prices: Object.fromEntries(goods.map((good) => [good, { "per cent": Math.abs(alike) }])),
        expenditure: Math.abs(alike),
      };
    })) {
      const { compensating, equivalent, total } = measures;
      const size = measures.after.total;
      expect(Math.abs(compensating!.value)).toBeLessThan(10 * ROUNDING * size);
      expect(Math.abs(equivalent!.value)).toBeLessThan(10 * ROUNDING * size);
      expect(Math.max(...values(total!).map(Math.abs))).toBeLessThan(1e-11 * size * 10);
    }
  });

  test("where cost is concave Laspeyres and Paasche bound the variations and the excess burden of taxes is not negative", () => {
    let compared = 0;
    const taxes: Parameters<typeof changeCases>[4] = (random, { goods }) => ({
      prices: Object.fromEntries(
        goods.map((good) => [
          good,
          { "ad valorem": 30 * (random.uniform() - 0.3), "pass-through": 0.6 + random.uniform() },
        ]),
      ),
      expenditure: 0,
    });
    for (const one of changeCases(name, 10, 60, undefined, taxes)) {
      if (!concaveAlong(one)) continue;
      compared++;
      const { measures, point } = one;
      const slack = 1e-12 * point.total;
      const { costOfLiving, compensating, equivalent, tax, after, bundles } = measures;
      expect(costOfLiving.atUtilityBefore!.value).toBeLessThanOrEqual(costOfLiving.laspeyres.value + 1e-12);
      const change = after.prices.map((price, i) => price - point.prices[i]);
      expect(compensating!.value).toBeLessThanOrEqual(spent(change, values(bundles.before.quantities)) + slack);
      expect(equivalent!.value).toBeGreaterThanOrEqual(spent(change, values(bundles.after!.quantities)) - slack);
      expect(tax!.excessBurden!.value).toBeGreaterThanOrEqual(-slack);
    }
    expect(compared).toBeGreaterThan(3);
  });
});

/** Whether the Slutsky matrix is negative semidefinite along the path, at the utility before and at that after. */
function concaveAlong({ fitted, point, measures: { after } }: ChangeCase): boolean {
  const { system, size } = systemOf(fitted);
  const cost = system.cost as CostFunction;
  const checker = createRowChecker(fitted);
  return [point, after].every((home) => {
    const utility = cost.utility(fitted.theta, size, home);
    return Array.from({ length: 41 }, (_, step) => step / 40).every((s) => {
      const prices = point.prices.map((price, i) => price + s * (after.prices[i] - price));
      const logCost = cost.logCost(fitted.theta, size, utility, prices, point.demographics);
      checker.evaluate(prices.map(Math.log), logCost, point.demographics);
      return checker.largestEigenvalue() <= 0;
    });
  });
}
