import type { PriceChangeFinding } from "../../schemas/price-change.ts";
import type { CostEvaluator } from "../../systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../../systems/index.ts";
import { costOf } from "../welfare.ts";
import { whyNoCost } from "./exact-welfare.ts";
import { type Curve, curveAlong, type Spot } from "./indifference-curve.ts";

/** By which the household is made up for the price: its utility before, or its bundle before. */
export type Compensation = "hicks" | "slutsky";

/** A price and a total: where bundles of a good and of money for the rest cost no more. */
export interface Budget {
  readonly price: number;
  readonly total: number;
}

/**
 * One price changes and no other: a good against everything else, which is money, since at prices that stand still the
 * rest of a budget is one good (Hicks 1939, Value and Capital). Units uploaded: q of the good, m = x − p q for the rest.
 */
export interface OnePrice {
  readonly good: string;
  readonly budgets: { readonly before: Budget; readonly compensated?: Budget; readonly after: Budget };
  readonly bundles: { readonly before: Spot; readonly compensated?: Spot; readonly after?: Spot };
  /** Indifference curves through the bundles before and after, by cost function. */
  readonly curves?: { readonly before: Curve; readonly after: Curve };
  /** Why there are no curves, as a clause. */
  readonly noCurves?: string;
  /** c(p1, u0) − x; of Slutsky's compensation what the bundle before costs more. */
  readonly compensation?: number;
}

type Picked = Pick<PriceChangeFinding, "fitted" | "point" | "at" | "priceScale" | "totalScale">;

/** A household's bundle of good i and money for the rest, at log prices and a log total in units of estimation. */
type Demand = (logPrice: number, logTotal: number) => Spot;

export function onePrice(finding: Picked, good: string, by: Compensation): OnePrice {
  const { fitted, point, at, priceScale, totalScale } = finding;
  const i = fitted.goods.indexOf(good);
  const logPrices = point.prices.map(Math.log);
  const before = logPrices[i];
  const after = Math.log(at.pricesAfter[i] / priceScale[i]);
  const logTotal = Math.log(point.total);
  const budget = (logPrice: number, own: number): Budget => ({
    price: Math.exp(logPrice) * priceScale[i],
    total: Math.exp(own) * totalScale,
  });
  const ends = { before: budget(before, logTotal), after: budget(after, logTotal) };
  const reason = whyNoCost(fitted);
  if (systemOf(fitted).system.shareFunction) {
    const quantity = at.quantities.before.values[i];
    const bundle = { quantity, rest: ends.before.total - ends.before.price * quantity };
    return { good, budgets: ends, bundles: { before: bundle }, noCurves: reason ?? "the system predicts no shares" };
  }
  const bought = demandOf(finding, i, logPrices);
  const bundles = { before: bought(before, logTotal), after: bought(after, logTotal) };
  const cost = reason === undefined ? costAlong(fitted, point.demographics, i, logPrices) : undefined;
  const kept = by === "hicks" ? cost?.(before, logTotal)(after) : affordable(bundles.before, ends);
  const logKept = by === "hicks" ? kept : kept === undefined ? undefined : Math.log(kept / totalScale);
  const compensated = logKept !== undefined && Number.isFinite(logKept) ? budget(after, logKept) : undefined;
  return {
    good,
    budgets: { ...ends, ...(compensated && { compensated }) },
    bundles: { ...bundles, ...(compensated && { compensated: bought(after, logKept as number) }) },
    ...(compensated && { compensation: compensated.total - ends.after.total }),
    ...(cost
      ? {
          curves: {
            before: curveAlong(before, after, cost(before, logTotal), bought),
            after: curveAlong(after, before, cost(after, logTotal), bought),
          },
        }
      : { noCurves: reason }),
  };
}

/** What the bundle before costs at the new price. */
const affordable = (bundle: Spot, { after }: { readonly after: Budget }) => bundle.rest + after.price * bundle.quantity;

function demandOf({ fitted, point, priceScale, totalScale }: Picked, i: number, held: readonly number[]): Demand {
  const { system, size } = systemOf(fitted);
  const evaluator = system.evaluator(fitted.theta, size);
  const logPrices = [...held];
  return (logPrice, logTotal) => {
    logPrices[i] = logPrice;
    evaluator.at(logPrices, logTotal, point.demographics);
    const spent = Math.exp(logTotal) * totalScale;
    const share = evaluator.shares[i];
    return { quantity: (share * spent) / (Math.exp(logPrice) * priceScale[i]), rest: (1 - share) * spent };
  };
}

/** ln c(p, u) as the price of good i moves, at the utility that a total buys at one price of it. */
function costAlong(
  fitted: FittedCoefficients,
  demographics: readonly number[],
  i: number,
  held: readonly number[],
): (logPrice: number, logTotal: number) => (logPrice: number) => number {
  const { cost, size } = costOf(fitted);
  const evaluator: CostEvaluator = cost.evaluator(fitted.theta, size);
  const at = (logPrice: number) => held.map((own, j) => (j === i ? logPrice : own));
  return (home, logTotal) => {
    const utility = evaluator.utility(at(home), logTotal, demographics);
    return (logPrice) => evaluator.logCost(at(logPrice), utility, demographics);
  };
}

/** The good whose price changes most, in proportion: the picture's first. */
export function mostChanged({ at, fitted }: Picked): string {
  const size = (i: number) => Math.abs(Math.log(at.pricesAfter[i] / at.pricesBefore[i]));
  const order = fitted.goods.map((_, i) => i).sort((a, b) => size(b) - size(a));
  return fitted.goods[order[0]];
}
