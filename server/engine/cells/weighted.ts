/** Positions of the values in ascending order. */
export function ascending(values: Float64Array): Uint32Array {
  return Uint32Array.from(values.keys()).sort((a, b) => values[a] - values[b]);
}

/**
 * Weighted quantiles: the smallest value up to which at least the fraction q of the weight lies (the inverse of
 * the empirical distribution function; definition 1 of Hyndman & Fan 1996, American Statistician 50).
 */
export function weightedQuantiles(
  values: Float64Array,
  fractions: readonly number[],
  weights?: Float64Array,
): number[] {
  const order = ascending(values);
  const total = weights ? weights.reduce((sum, weight) => sum + weight, 0) : values.length;
  return fractions.map((fraction) => {
    // The last digits of a sum of weights must not push a quantile one row up.
    const wanted = fraction * total * (1 - 1e-12);
    let reached = 0;
    for (const t of order) {
      reached += weights ? weights[t] : 1;
      if (reached >= wanted) return values[t];
    }
    return values[order[order.length - 1]];
  });
}

/** For each value its tenth, 0 to 9: where the middle of its own weight falls among all weight in ascending order. */
export function tenths(values: Float64Array, weights?: Float64Array): Uint8Array {
  const total = weights ? weights.reduce((sum, weight) => sum + weight, 0) : values.length;
  const tenth = new Uint8Array(values.length);
  let reached = 0;
  for (const t of ascending(values)) {
    const weight = weights ? weights[t] : 1;
    tenth[t] = Math.min(9, Math.floor((10 * (reached + weight / 2)) / total));
    reached += weight;
  }
  return tenth;
}

/**
 * For each value its group of `count` of equal weight, 0 the lowest: where the middle of the weight of all values
 * equal to it falls among all weight in ascending order, so that equal values are never parted.
 */
export function quantileGroups(values: Float64Array, count: number, weights?: Float64Array): Uint8Array {
  const weightOf = (t: number) => (weights ? weights[t] : 1);
  const total = weights ? weights.reduce((sum, weight) => sum + weight, 0) : values.length;
  const group = new Uint8Array(values.length);
  const order = ascending(values);
  let reached = 0;
  for (let from = 0; from < order.length; ) {
    let to = from;
    let weight = 0;
    while (to < order.length && values[order[to]] === values[order[from]]) weight += weightOf(order[to++]);
    const own = Math.min(count - 1, Math.floor((count * (reached + weight / 2)) / total));
    for (; from < to; from++) group[order[from]] = own;
    reached += weight;
  }
  return group;
}
