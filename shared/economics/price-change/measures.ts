import type { PriceQuestion } from "../../schemas/price-change.ts";
import type { Point } from "../../systems/demand-system.ts";
import { SYSTEMS } from "../../systems/index.ts";
import { type Bundle, bundleAt, lengthOf, type Subject } from "./bundle.ts";
import { type DualEffects, finiteEffects, infinitesimalEffects, secondOrder } from "./decomposition.ts";
import { combination, constant, type Dual, difference, quotient, weighted } from "./dual.ts";
import { exactMeasures } from "./exact-welfare.ts";
import { marshallianLoss } from "./marshallian.ts";
import { newPricesOf } from "./question.ts";
import { type TaxMeasures, taxMeasures, taxSums } from "./tax.ts";

/** Everything a price change does at a point, in units of estimation, each with its derivative in θ. */
export interface Measures {
  readonly after: Point;
  readonly taxes: readonly number[];
  readonly bundles: {
    readonly before: Bundle;
    readonly hicks?: Bundle;
    readonly slutsky?: Bundle;
    readonly after?: Bundle;
  };
  readonly hicks?: DualEffects;
  readonly slutsky?: DualEffects;
  readonly infinitesimal: DualEffects;
  /** After − before. */
  readonly total?: readonly Dual[];
  readonly compensating?: Dual;
  readonly equivalent?: Dual;
  readonly secondOrder: Dual;
  readonly marshallian?: Dual;
  readonly costOfLiving: { readonly atUtilityBefore?: Dual; readonly laspeyres: Dual; readonly paasche?: Dual };
  readonly tax?: TaxMeasures;
  /** Why exact welfare and Hicks's effects are not here, as a clause. */
  readonly absent?: string;
}

/**
 * What a price change does at a point (methods 3.3, 3.4). Shapes: by good, n. A system without share function (in
 * differences) has the differentials and the second-order variation only; one without cost function no utility to keep.
 * Errors: `RangeError` where the system predicts no shares before or after, or a new price is not positive.
 */
export function measuresAt(
  subject: Subject,
  point: Point,
  question: PriceQuestion,
  priceScale?: readonly number[],
): Measures {
  const { fitted } = subject;
  const { prices, taxes } = newPricesOf(question, fitted.goods, point.prices, priceScale);
  const after = { ...point, prices, total: point.total * (1 + question.expenditure / 100) };
  const moreMoney = after.total - point.total;
  const changes = prices.map((price, i) => price / point.prices[i] - 1);
  const k = lengthOf(subject);
  const before = bundleAt(subject, point.prices, constant(point.total, k), point.demographics);
  const small = {
    infinitesimal: infinitesimalEffects(before, changes, moreMoney),
    secondOrder: secondOrder(before, changes, moreMoney),
  };
  const rises = prices.map((price, i) => price - point.prices[i]);
  // Σ p1 q0 as x0 + Σ Δp q0, which moves with θ no more than the quantities of what gets dearer do.
  const oldBundle = combination([1, before.total], [1, weighted(rises, before.quantities)]);
  const laspeyres = combination([1 / point.total, oldBundle]);
  const { shareFunction, cost } = SYSTEMS[fitted.form];
  if (shareFunction) {
    const absent = "absent" in cost ? cost.absent : shareFunction.absent;
    return { after, taxes, bundles: { before }, ...small, costOfLiving: { laspeyres }, absent };
  }
  const bought = bundleAt(subject, prices, constant(after.total, k), point.demographics);
  const affordable = bundleAt(subject, prices, oldBundle, point.demographics);
  const exact = exactMeasures(subject, point, after);
  return {
    after,
    taxes,
    bundles: { before, slutsky: affordable, after: bought, ...("hicks" in exact && { hicks: exact.hicks }) },
    slutsky: finiteEffects(before, affordable, bought),
    ...small,
    total: bought.quantities.map((own, i) => difference(own, before.quantities[i])),
    marshallian: marshallianLoss(subject, [point.prices, prices], [point.total, after.total], point.demographics),
    ...("absent" in exact
      ? { absent: exact.absent }
      : {
          hicks: finiteEffects(before, exact.hicks, bought),
          compensating: exact.compensating,
          equivalent: exact.equivalent,
        }),
    costOfLiving: {
      laspeyres,
      paasche: quotient(bought.total, combination([1, bought.total], [-1, weighted(rises, bought.quantities)])),
      ...("hicks" in exact && { atUtilityBefore: combination([1 / point.total, exact.hicks.total]) }),
    },
    ...(taxes.some((tax) => tax !== 0) && {
      tax: taxMeasures(taxSums(bought, bought.shares, point.prices, taxes), question, exact),
    }),
  };
}
