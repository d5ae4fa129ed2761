import type { UnseenPrice } from "../../schemas/price-change.ts";

/** The goods whose new price lies outside the sample's own prices, with both numbers; all in the units uploaded. */
export function unseenPrices(
  goods: readonly string[],
  after: readonly number[],
  { low, high }: { readonly low: readonly number[]; readonly high: readonly number[] },
): UnseenPrice[] {
  return goods.flatMap((good, i): UnseenPrice[] => {
    if (after[i] > high[i]) return [{ good, price: after[i], bound: high[i], side: "above" }];
    if (after[i] < low[i]) return [{ good, price: after[i], bound: low[i], side: "below" }];
    return [];
  });
}
