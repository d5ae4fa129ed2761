import type { GoodPriceSpecification, PriceQuestion } from "../../schemas/price-change.ts";

/** Prices after a change, with the taxes in them; in the units of the prices given, by good. */
export interface NewPrices {
  readonly prices: number[];
  /** Tax per unit t_i; 0 where the change is none. */
  readonly taxes: number[];
}

/** Whether a change of price is a tax: ad valorem and specific by their names, the others where they say so. */
export function isTax(change: GoodPriceSpecification): boolean {
  return change.tax ?? (change["ad valorem"] !== undefined || change.specific !== undefined);
}

/**
 * The price of one good after a change, and the tax per unit in it. With p the price before and ρ the share passed on,
 * p1 = p + ρ t, where
 *
 *     specific        t as said
 *     ad valorem τ    t = τ (p1 − t), of what the seller receives, hence t = τ p / (1 + τ (1 − ρ))
 *     per cent, to    p1 as said and, where that is a tax, t = (p1 − p)/ρ
 *
 * `scale` leads from the units of `price` to those uploaded, in which `to` and `specific` are said.
 */
export function changedPrice(
  change: GoodPriceSpecification | undefined,
  price: number,
  scale = 1,
): { price: number; tax: number } {
  if (change === undefined) return { price, tax: 0 };
  const passed = change["pass-through"] ?? 1;
  const taxed = isTax(change);
  if (change.specific !== undefined || change["ad valorem"] !== undefined) {
    const rate = (change["ad valorem"] ?? 0) / 100;
    const tax = change.specific === undefined ? (rate * price) / (1 + rate * (1 - passed)) : change.specific / scale;
    return { price: price + passed * tax, tax: taxed ? tax : 0 };
  }
  const after = change.to === undefined ? price * (1 + (change["per cent"] ?? 0) / 100) : change.to / scale;
  return { price: after, tax: taxed ? (after - price) / passed : 0 };
}

/** The same of every good. Errors: `RangeError` where a subsidy leaves a good without a positive price. */
export function newPricesOf(
  { prices: changes }: Pick<PriceQuestion, "prices">,
  goods: readonly string[],
  before: readonly number[],
  priceScale?: readonly number[],
): NewPrices {
  const after = goods.map((good, i) => {
    const own = Object.hasOwn(changes, good) ? changes[good] : undefined;
    return changedPrice(own, before[i], priceScale?.[i]);
  });
  const bad = after.findIndex(({ price }) => !(price > 0));
  if (bad >= 0) {
    const scale = priceScale?.[bad] ?? 1;
    throw new RangeError(
      `the subsidy takes the price of ${goods[bad]} from ${before[bad] * scale} to ${after[bad].price * scale}; prices stay positive`,
    );
  }
  return { prices: after.map(({ price }) => price), taxes: after.map(({ tax }) => tax) };
}

/** Whether anything but taxes changes: then no part of the loss is the excess burden of a tax. */
export function otherChanges(question: PriceQuestion): string[] {
  const goods = Object.entries(question.prices).filter(([, change]) => !isTax(change));
  return [
    ...goods.map(([good]) => `the price of ${good}`),
    ...(question.expenditure === 0 ? [] : ["total expenditure"]),
  ];
}
