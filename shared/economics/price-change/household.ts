import type { PriceQuestion } from "../../schemas/price-change.ts";
import type { Point } from "../../systems/demand-system.ts";
import { bundleAt, lengthOf, type Subject } from "./bundle.ts";
import { secondOrder } from "./decomposition.ts";
import { combination, constant, type Dual, difference } from "./dual.ts";
import { exactMeasures } from "./exact-welfare.ts";
import { newPricesOf } from "./question.ts";
import { type TaxSums, taxSums } from "./tax.ts";

/** What adds up over households: money, and quantities by good; units of estimation, each with its derivative in θ. */
export interface HouseholdMeasures {
  readonly secondOrder: Dual;
  readonly compensating?: Dual;
  readonly equivalent?: Dual;
  readonly tax: TaxSums;
  /** q1 − q0, by good. */
  readonly change: readonly Dual[];
  /** q(p1, u0) − q0, by good. */
  readonly substitution?: readonly Dual[];
}

/**
 * What a price change does to one household, which keeps its own residual: ŵ(p1) = w + f(p1, x1) − f(p0, x0), with f the
 * shares the system predicts and w what it spent. Welfare is that of the system, without the residual (methods 3.4).
 * One row with its derivatives; `RowChange` is the same without them, for every row.
 * Errors: as for `measuresAt`.
 */
export function householdMeasures(
  subject: Subject,
  point: Point,
  spent: readonly number[],
  question: PriceQuestion,
  priceScale?: readonly number[],
): HouseholdMeasures {
  const { fitted } = subject;
  const { prices, taxes } = newPricesOf(question, fitted.goods, point.prices, priceScale);
  const after = { ...point, prices, total: point.total * (1 + question.expenditure / 100) };
  const moreMoney = after.total - point.total;
  const k = lengthOf(subject);
  const predicted = bundleAt(subject, point.prices, constant(point.total, k), point.demographics);
  const reached = bundleAt(subject, prices, constant(after.total, k), point.demographics);
  const exact = exactMeasures(subject, point, after);
  const own = (at: { readonly shares: readonly Dual[] }) =>
    at.shares.map((share, i) => {
      const moved = difference(share, predicted.shares[i]);
      return { value: spent[i] + moved.value, gradient: moved.gradient };
    });
  const quantity = (share: Dual, total: Dual, price: number): Dual => ({
    value: (share.value * total.value) / price,
    gradient: share.gradient.map((entry, a) => (entry * total.value + share.value * total.gradient[a]) / price),
  });
  const before = spent.map((share, i) => (share * point.total) / point.prices[i]);
  const changeTo = (shares: readonly Dual[], total: Dual) =>
    shares.map((share, i) => combination([1, quantity(share, total, prices[i])], [-before[i], constant(1, k)]));
  const shares = own(reached);
  return {
    secondOrder: secondOrder(
      predicted,
      prices.map((price, i) => price / point.prices[i] - 1),
      moreMoney,
    ),
    ...("hicks" in exact && {
      compensating: exact.compensating,
      equivalent: exact.equivalent,
      substitution: changeTo(own(exact.hicks), exact.hicks.total),
    }),
    tax: taxSums(reached, shares, point.prices, taxes),
    change: changeTo(shares, reached.total),
  };
}
