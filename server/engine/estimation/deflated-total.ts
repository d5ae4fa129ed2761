import type { PriceIndexName } from "../../../shared/systems/names.ts";
import { logPriceIndex } from "../../../shared/systems/price-indices.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { DEFAULT_INDEX, priceIndexFor } from "./price-index.ts";
import { timeOrder } from "./time-order.ts";

/** ln(x/P) by row of the data; with the lagged Stone index NaN in the first period. */
export function deflatedLogTotal(data: PreparedData, name: PriceIndexName = DEFAULT_INDEX): Float64Array {
  const logIndex =
    name === "lagged stone"
      ? laggedStoneIndex(data)
      : logPriceIndex(priceIndexFor(data, name), data.shares, data.logPrices);
  return data.logTotal.map((logTotal, t) => logTotal - logIndex[t]);
}

/**
 * ln P_t = Σ_k w_k,t−1 ln p_kt with the shares of the period before in the order of time (Eales & Unnevehr
 * 1988, American Journal of Agricultural Economics 70, 521–532), so that no current share stands on the right of
 * an equation. The first period has none before it.
 */
function laggedStoneIndex(data: PreparedData): Float64Array {
  const order = timeOrder(data);
  const logIndex = new Float64Array(data.rows).fill(Number.NaN);
  for (let place = 1; place < order.length; place++) {
    const [before, row] = [order[place - 1], order[place]];
    logIndex[row] = data.shares.reduce((sum, share, k) => sum + share[before] * data.logPrices[k][row], 0);
  }
  return logIndex;
}
