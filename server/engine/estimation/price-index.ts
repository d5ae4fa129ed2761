import type { PriceIndex } from "../../../shared/systems/demand-system.ts";
import type { PriceIndexName } from "../../../shared/systems/names.ts";
import { priceIndexOf } from "../../../shared/systems/price-indices.ts";
import type { PreparedData } from "../columns/prepared-data.ts";

export const DEFAULT_INDEX: PriceIndexName = "tornqvist";

/** Means over the rows, which every specification on the same rows shares. */
const known = new WeakMap<PreparedData, Map<PriceIndexName, PriceIndex>>();

/** The price index of LA-AIDS with the sample means it is evaluated with. */
export function priceIndexFor(data: PreparedData, name: PriceIndexName = DEFAULT_INDEX): PriceIndex {
  if (!known.has(data)) known.set(data, new Map());
  const indices = known.get(data)!;
  const index = indices.get(name) ?? priceIndexOf(name, data.shares, data.logPrices, data.weights);
  indices.set(name, index);
  return index;
}
