import type { PreparedData } from "../../columns/prepared-data.ts";
import { weightedMean } from "../../columns/weighted.ts";

const known = new WeakMap<PreparedData, Float64Array>();

/**
 * y = ln x − Σ_j w̄_j ln p_j with w̄ the weighted mean shares: real expenditure without parameters and without the
 * current shares, which in the index of Stone would make it depend on the errors (Lewbel & Pendakur 2009).
 */
export function realExpenditureByMeans(data: PreparedData): Float64Array {
  const cached = known.get(data);
  if (cached !== undefined) return cached;
  const means = meanShares(data);
  const real = data.logTotal.slice();
  data.logPrices.forEach((column, j) => {
    for (let t = 0; t < real.length; t++) real[t] -= means[j] * column[t];
  });
  known.set(data, real);
  return real;
}

/** w̄, weighted. */
export function meanShares({ shares, weights }: PreparedData): readonly number[] {
  return shares.map((column) => weightedMean(column, weights));
}
