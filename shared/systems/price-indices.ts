import type { PriceIndex } from "./demand-system.ts";
import type { PriceIndexName } from "./names.ts";

/**
 * An index of this family: ln P = Σ_k (own·w_k + mean·w̄_k)(ln p_k − ln p̄_k), without the ln p̄_k
 * where it is not relative to a base.
 */
export interface IndexWeights {
  /** How much of the weight is the row's own share. */
  readonly own: number;
  /** How much is the sample mean's. */
  readonly mean: number;
  readonly relative: boolean;
}

/**
 * Stone (1954), and with the shares of the period before, Eales & Unnevehr (1988); the log-linear Laspeyres,
 * Paasche ("corrected Stone") and Törnqvist indices as Moschini (1995, American Journal of Agricultural Economics 77, 63–68) writes them, which unlike Stone's do not
 * depend on the units of prices.
 */
export const INDEX_WEIGHTS: Readonly<Record<PriceIndexName, IndexWeights>> = {
  tornqvist: { own: 0.5, mean: 0.5, relative: true },
  stone: { own: 1, mean: 0, relative: false },
  laspeyres: { own: 0, mean: 1, relative: true },
  paasche: { own: 1, mean: 0, relative: true },
  /** Where no period before is observed, its shares are taken to be the sample's mean. */
  "lagged stone": { own: 0, mean: 1, relative: false },
};

/**
 * ln P_t for each of T rows, from the rows' own shares w_kt and log prices (n columns of T).
 * Subtracted from ln x it gives the deflated log total of LA-AIDS.
 */
export function logPriceIndex(
  index: PriceIndex,
  shares: readonly ArrayLike<number>[],
  logPrices: readonly ArrayLike<number>[],
): Float64Array {
  const goods = logPrices.length;
  for (const [name, length] of [
    ["shares", shares.length],
    ["mean shares", index.meanShares.length],
    ["mean prices", index.meanPrices.length],
  ] as const) {
    if (length !== goods) throw new RangeError(`${name} has ${length} goods, prices has ${goods}`);
  }
  const { own, mean, relative } = INDEX_WEIGHTS[index.name];
  const logIndex = new Float64Array(logPrices[0]?.length ?? 0);
  for (let k = 0; k < goods; k++) {
    const share = shares[k];
    const logPrice = logPrices[k];
    const fixed = mean * index.meanShares[k];
    const base = relative ? Math.log(index.meanPrices[k]) : 0;
    for (let t = 0; t < logIndex.length; t++) logIndex[t] += (own * share[t] + fixed) * (logPrice[t] - base);
  }
  return logIndex;
}

/** w̄ and p̄ of an index: weighted means over T rows of the shares and of the prices themselves. */
export function priceIndexOf(
  name: PriceIndexName,
  shares: readonly ArrayLike<number>[],
  logPrices: readonly ArrayLike<number>[],
  weights?: ArrayLike<number>,
): PriceIndex {
  return {
    name,
    meanShares: shares.map((column) => weightedMean(column, (share) => share, weights)),
    meanPrices: logPrices.map((column) => weightedMean(column, Math.exp, weights)),
  };
}

function weightedMean(column: ArrayLike<number>, of: (value: number) => number, weights?: ArrayLike<number>): number {
  let sum = 0;
  let weight = 0;
  for (let t = 0; t < column.length; t++) {
    const h = weights === undefined ? 1 : weights[t];
    sum += h * of(column[t]);
    weight += h;
  }
  return sum / weight;
}
