import { symmetricEigen } from "../../../shared/numerics/eigen.ts";
import { placesOf } from "./distances.ts";
import { type Weights, weightedCorrelation, weightedDeviation, weightedMean } from "./weighted.ts";

export interface PricePair {
  readonly goods: readonly [number, number];
  readonly correlation: number;
}

/**
 * How far log prices move together: correlations of all pairs, largest in size first, and the condition number
 * √(λ_max / λ_min) of their correlation matrix (Belsley, Kuh & Welsch 1980, *Regression Diagnostics*, chapter 3, who
 * take 30 for strong collinearity; from memory). Prices that do not vary at all are left out of both.
 */
export function priceStructure(logPrices: readonly Float64Array[], weights: Weights) {
  const varying = [...logPrices.keys()].filter((good) => weightedDeviation(logPrices[good], weights) > 0);
  const pairs: PricePair[] = [];
  const matrix = varying.map((i, row) =>
    varying.map((j, column) => {
      if (column >= row) return column === row ? 1 : 0;
      const correlation = weightedCorrelation(logPrices[i], logPrices[j], weights);
      pairs.push({ goods: [j, i], correlation });
      return correlation;
    }),
  );
  pairs.sort((a, b) => Math.abs(b.correlation) - Math.abs(a.correlation));
  if (varying.length < 2) return { pairs };
  const { values } = symmetricEigen(matrix);
  const least = values[values.length - 1];
  return { pairs, condition: least > 0 ? Math.sqrt(values[0] / least) : Number.POSITIVE_INFINITY };
}

/** How many different prices there are, as far as `most`, and the rows that have the commonest one. */
export function distinctPrices(values: Float64Array, most: number) {
  const counts = new Map<number, number>();
  for (const value of values) {
    counts.set(value, (counts.get(value) ?? 0) + 1);
    if (counts.size > most) return undefined;
  }
  const [commonest] = [...counts].sort((a, b) => b[1] - a[1])[0];
  return { count: counts.size, at: placesOf(values, (value) => value === commonest) };
}

/** Rows by how far the two log prices stand apart, each in its own standard deviations: those that tell them apart first. */
export function partingRows(one: Float64Array, other: Float64Array, weights: Weights, correlation: number) {
  const standard = (values: Float64Array) => {
    const mean = weightedMean(values, weights);
    const deviation = weightedDeviation(values, weights, mean);
    return values.map((value) => (value - mean) / deviation);
  };
  const [u, v] = [standard(one), standard(other)];
  const apart = u.map((value, at) => value - Math.sign(correlation) * v[at]);
  const at = Int32Array.from(apart.keys()).sort((a, b) => Math.abs(apart[b]) - Math.abs(apart[a]) || a - b);
  return { at, apart };
}
