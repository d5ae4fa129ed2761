import { expect, test } from "vitest";
import { elasticityValues } from "../../shared/economics/elasticities.ts";
import { responsesValuesAt } from "../../shared/economics/responses.ts";
import { unconditionalValues } from "../../shared/economics/two-stage.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { exactly } from "../support/fitted.ts";
import { derivative, gap } from "./derivatives.ts";

/**
 * A utility tree that is neither additive nor homothetic anywhere, maximised by number:
 * U = 1.3 ln(1 + v₁) + 2 √v₂ with v_r = Π (q_i − c_i)^b_i over the goods of branch r.
 */
const BRANCHES = [
  { committed: [0.5, 0.2, 0.1], marginal: [0.2, 0.3, 0.5] },
  { committed: [0.3, 0.4], marginal: [0.6, 0.4] },
] as const;
const PRICES = [1.2, 0.8, 1.5, 0.9, 1.1];
const TOTAL = 6;
const sum = (of: readonly number[]) => of.reduce((all, one) => all + one, 0);
const needsOf = (r: number, prices: readonly number[]) => sum(BRANCHES[r].committed.map((c, i) => c * prices[i]));
/** Π (p_i / b_i)^b_i: what one more of v_r costs. */
const costOf = (r: number, prices: readonly number[]) =>
  Math.exp(sum(BRANCHES[r].marginal.map((b, i) => b * Math.log(prices[i] / b))));

function utility(quantities: readonly number[]): number {
  const level = (r: number, from: number) =>
    Math.exp(sum(BRANCHES[r].marginal.map((b, i) => b * Math.log(quantities[from + i] - BRANCHES[r].committed[i]))));
  return 1.3 * Math.log(1 + level(0, 0)) + 2 * Math.sqrt(level(1, 3));
}

/** What is spent on the first branch: where one more unit of money is worth the same in both. By bisection. */
function spentOnFirst(prices: readonly number[], total: number): number {
  const parts = [prices.slice(0, 3), prices.slice(3)];
  const [firstNeeds, secondNeeds] = [needsOf(0, parts[0]), needsOf(1, parts[1])];
  const [firstCost, secondCost] = [costOf(0, parts[0]), costOf(1, parts[1])];
  const gain = (x: number) =>
    1.3 / (1 + (x - firstNeeds) / firstCost) / firstCost -
    1 / Math.sqrt((total - x - secondNeeds) / secondCost) / secondCost;
  let [low, high] = [firstNeeds, total - secondNeeds];
  for (let halving = 0; halving < 200; halving++) {
    const middle = (low + high) / 2;
    if (gain(middle) > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

function demand(prices: readonly number[], total: number): number[] {
  const first = spentOnFirst(prices, total);
  return [first, total - first].flatMap((x, r) => {
    const own = r === 0 ? prices.slice(0, 3) : prices.slice(3);
    const { committed, marginal } = BRANCHES[r];
    return committed.map((c, i) => c + (marginal[i] * (x - needsOf(r, own))) / own[i]);
  });
}

const logs = (of: readonly number[]) => of.map(Math.log);
/** Prices of some goods moved by `step` in logs. */
const movedFor = (goods: readonly number[], step: number) =>
  PRICES.map((price, j) => (goods.includes(j) ? price * Math.exp(step) : price));

/** The branch as a good: what is spent on it at prices of now, when all its prices or all others' move in one proportion. */
function branchAsGood() {
  const spent = spentOnFirst(PRICES, TOTAL);
  const share = spent / TOTAL;
  const byPrice = (goods: readonly number[]) =>
    derivative((h) => [Math.log(spentOnFirst(movedFor(goods, h), TOTAL))], 0.01)[0];
  const expenditure = derivative((h) => [Math.log(spentOnFirst(PRICES, TOTAL * Math.exp(h)))], 0.01)[0];
  const own = byPrice([0, 1, 2]) - 1;
  const other = byPrice([3, 4]);
  return {
    spent,
    group: {
      share,
      expenditure,
      compensated: own + share * expenditure,
      others: { uncompensated: [other], compensated: [other + (1 - share) * expenditure] },
    },
  };
}

test("what the tree demands is affordable and better than any other bundle of the same cost", () => {
  const random = seededRandom(3);
  const best = demand(PRICES, TOTAL);
  expect(sum(best.map((q, i) => q * PRICES[i]))).toBeCloseTo(TOTAL, 12);
  for (let k = 0; k < 500; k++) {
    const other = best.map((q) => q + 0.01 * random.normal());
    // Back onto the budget plane.
    const excess = (sum(other.map((q, i) => q * PRICES[i])) - TOTAL) / sum(PRICES.map((p) => p * p));
    const feasible = other.map((q, i) => q - excess * PRICES[i]);
    expect(utility(feasible)).toBeLessThan(utility(best));
  }
});

test("Carpentier and Guyomard's formulas give the elasticities of what a utility tree demands, Edgerton's do not", () => {
  const { spent, group } = branchAsGood();
  const { committed, marginal } = BRANCHES[0];
  const branch = exactly("les", ["a", "b", "c"], [...committed, ...marginal]);
  const own = elasticityValues(
    responsesValuesAt(branch, { prices: PRICES.slice(0, 3), total: spent, demographics: [] }),
  );
  const byPrice = PRICES.map((_, j) => derivative((h) => logs(demand(movedFor([j], h), TOTAL)), 0.01));
  const uncompensated = [0, 1, 2].map((i) => [0, 1, 2].map((j) => byPrice[j][i]));
  const byOthers = derivative((h) => logs(demand(movedFor([3, 4], h), TOTAL)), 0.01);
  const expenditure = derivative((h) => logs(demand(PRICES, TOTAL * Math.exp(h))), 0.01);

  const found = unconditionalValues(own, group, "carpentier guyomard");
  // Numerical derivatives of what is found by bisection.
  expect(gap(found.expenditure, expenditure.slice(0, 3))).toBeLessThan(1e-9);
  expect(gap(found.uncompensated.flat(), uncompensated.flat())).toBeLessThan(1e-9);
  expect(gap(found.others.uncompensated.flat(), byOthers.slice(0, 3))).toBeLessThan(1e-9);
  const edgerton = unconditionalValues(own, group, "edgerton");
  expect(gap(edgerton.uncompensated.flat(), uncompensated.flat())).toBeGreaterThan(0.01);
});
