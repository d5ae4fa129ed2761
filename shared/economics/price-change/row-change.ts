import type { PriceQuestion } from "../../schemas/price-change.ts";
import type { CostEvaluator, Evaluator } from "../../systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../../systems/index.ts";
import { whyNoCost } from "./exact-welfare.ts";
import { changedPrice } from "./question.ts";

/** Why a row has no answer. */
export const ROW_GAPS = ["price", "shares", "utility before", "utility after"] as const;
export type RowGap = (typeof ROW_GAPS)[number];

/** What a price change does to one household, overwritten by each call of `at`; units of estimation. */
export interface RowChange {
  /** Where not all of what follows is defined: why; then it is of no meaning. */
  gap: RowGap | undefined;
  compensating: number;
  equivalent: number;
  secondOrder: number;
  revenue: number;
  paidByBuyers: number;
  raised: number;
  /** Predicted shares before and after, and the household's own after, n. */
  readonly predictedBefore: Float64Array;
  readonly predictedAfter: Float64Array;
  readonly ownAfter: Float64Array;
  readonly pricesAfter: Float64Array;
  /** Quantities before, and their changes, n. */
  readonly before: Float64Array;
  readonly change: Float64Array;
  readonly substitution: Float64Array;
  at(logPrices: ArrayLike<number>, logTotal: number, demographics: ArrayLike<number>, spent: ArrayLike<number>): void;
}

/**
 * `householdMeasures` without derivatives for every row: the same formulas on numbers, nothing allocated from one row to
 * the next.
 */
export function rowChange(
  fitted: Omit<FittedCoefficients, "covariance">,
  question: PriceQuestion,
  priceScale: readonly number[],
): RowChange {
  const { system, size } = systemOf(fitted);
  const n = size.goods;
  const evaluator = system.evaluator(fitted.theta, size);
  const cost =
    "absent" in system.cost || whyNoCost(fitted) !== undefined ? undefined : system.cost.evaluator(fitted.theta, size);
  const changes = fitted.goods.map((good) =>
    Object.hasOwn(question.prices, good) ? question.prices[good] : undefined,
  );
  const logMoney = Math.log1p(question.expenditure / 100);
  const vector = () => new Float64Array(n);
  const prices = vector();
  const after = vector();
  const logAfter = vector();
  const rates = vector();
  const borne = vector();
  const relative = vector();

  const reprice = (logPrices: ArrayLike<number>) => {
    for (let i = 0; i < n; i++) {
      prices[i] = Math.exp(logPrices[i]);
      const change = changes[i];
      if (change === undefined) {
        after[i] = prices[i];
        logAfter[i] = logPrices[i];
        rates[i] = borne[i] = relative[i] = 0;
        continue;
      }
      const { price, tax } = changedPrice(change, prices[i], priceScale[i]);
      if (!(price > 0)) return false;
      after[i] = price;
      logAfter[i] = Math.log(price);
      rates[i] = tax / price;
      borne[i] = tax === 0 ? 0 : (price - prices[i]) / price;
      relative[i] = price / prices[i] - 1;
    }
    return true;
  };

  const row: RowChange = {
    gap: undefined,
    compensating: 0,
    equivalent: 0,
    secondOrder: 0,
    revenue: 0,
    paidByBuyers: 0,
    raised: 0,
    predictedBefore: vector(),
    predictedAfter: vector(),
    ownAfter: vector(),
    pricesAfter: after,
    before: vector(),
    change: vector(),
    substitution: vector(),
    at(logPrices, logTotal, demographics, spent) {
      row.gap = undefined;
      if (!reprice(logPrices)) {
        row.gap = "price";
        return;
      }
      const total = Math.exp(logTotal);
      const totalAfter = total * (1 + question.expenditure / 100);
      evaluator.at(logPrices, logTotal, demographics);
      row.predictedBefore.set(evaluator.shares);
      row.secondOrder = total * secondOrderRate(evaluator, relative) - (totalAfter - total);
      evaluator.at(logAfter, logTotal + logMoney, demographics);
      row.predictedAfter.set(evaluator.shares);
      if (Number.isNaN(row.predictedBefore[0]) || Number.isNaN(row.predictedAfter[0])) {
        row.gap = "shares";
        return;
      }
      respond(row, spent, { prices, after, total, totalAfter });
      levy(row, evaluator, { rates, borne, totalAfter });
      if (cost) exact(logPrices, logTotal, demographics, spent, cost);
    },
  };

  const exact = (
    logPrices: ArrayLike<number>,
    logTotal: number,
    demographics: ArrayLike<number>,
    spent: ArrayLike<number>,
    { utility, logCost }: CostEvaluator,
  ) => {
    const total = Math.exp(logTotal);
    const kept = logCost(logAfter, utility(logPrices, logTotal, demographics), demographics);
    if (!Number.isFinite(kept)) {
      row.gap = "utility before";
      return;
    }
    const reached = logCost(logPrices, utility(logAfter, logTotal + logMoney, demographics), demographics);
    if (!Number.isFinite(reached)) {
      row.gap = "utility after";
      return;
    }
    row.compensating = total * (Math.expm1(kept - logTotal) - question.expenditure / 100);
    row.equivalent = -total * Math.expm1(reached - logTotal);
    evaluator.at(logAfter, kept, demographics);
    if (Number.isNaN(evaluator.shares[0])) {
      row.gap = "shares";
      return;
    }
    const money = Math.exp(kept);
    for (let i = 0; i < n; i++) {
      const share = spent[i] + evaluator.shares[i] - row.predictedBefore[i];
      row.substitution[i] = (share * money) / after[i] - row.before[i];
    }
  };
  return row;
}

/** Σ w_i r_i + ½ Σ r_i K_i, K_i = Σ_j μ_ij r_j + (μ_i + w_i) R − w_i r_i, R = Σ w_j r_j. */
function secondOrderRate({ shares, total, prices }: Evaluator, relative: Float64Array): number {
  const n = shares.length;
  let dearer = 0;
  for (let j = 0; j < n; j++) dearer += shares[j] * relative[j];
  let sum = dearer;
  for (let i = 0; i < n; i++) {
    if (relative[i] === 0) continue;
    let moved = (total[i] + shares[i]) * dearer - shares[i] * relative[i];
    for (let j = 0; j < n; j++) moved += prices[i * n + j] * relative[j];
    sum += 0.5 * relative[i] * moved;
  }
  return sum;
}

interface Budget {
  readonly prices: Float64Array;
  readonly after: Float64Array;
  readonly total: number;
  readonly totalAfter: number;
}

/** What the household buys, which keeps its residual. */
function respond(row: RowChange, spent: ArrayLike<number>, { prices, after, total, totalAfter }: Budget): void {
  for (let i = 0; i < spent.length; i++) {
    const share = spent[i] + row.predictedAfter[i] - row.predictedBefore[i];
    row.ownAfter[i] = share;
    row.before[i] = (spent[i] * total) / prices[i];
    row.change[i] = (share * totalAfter) / after[i] - row.before[i];
  }
}

interface Levy {
  readonly rates: Float64Array;
  readonly borne: Float64Array;
  readonly totalAfter: number;
}

/** `taxSums`: what is lost by a further unit is what buyers pay. */
function levy(row: RowChange, { prices }: Evaluator, { rates, borne, totalAfter }: Levy): void {
  const n = rates.length;
  let revenue = 0;
  let paid = 0;
  let moved = 0;
  for (let i = 0; i < n; i++) {
    if (rates[i] === 0) continue;
    revenue += rates[i] * row.ownAfter[i];
    paid += borne[i] * row.ownAfter[i];
    let slope = -row.ownAfter[i] * borne[i];
    for (let j = 0; j < n; j++) slope += prices[i * n + j] * borne[j];
    moved += rates[i] * slope;
  }
  row.revenue = totalAfter * revenue;
  row.paidByBuyers = totalAfter * paid;
  row.raised = totalAfter * (revenue + moved);
}
