/** Weighted means and deviations over columns; a row without weights counts one. */
export type Weights = Float64Array | undefined;

/** Σ h v / Σ h. */
export function weightedMean(values: Float64Array, weights: Weights): number {
  let sum = 0;
  let total = 0;
  for (let row = 0; row < values.length; row++) {
    const weight = weights ? weights[row] : 1;
    sum += weight * values[row];
    total += weight;
  }
  return sum / total;
}

/** √(Σ h (v − v̄)² / Σ h): the spread of the rows themselves, not an estimate for others. */
export function weightedDeviation(
  values: Float64Array,
  weights: Weights,
  mean = weightedMean(values, weights),
): number {
  let sum = 0;
  let total = 0;
  for (let row = 0; row < values.length; row++) {
    const weight = weights ? weights[row] : 1;
    sum += weight * (values[row] - mean) ** 2;
    total += weight;
  }
  return Math.sqrt(sum / total);
}

/** Σ h (u − ū)(v − v̄) / (Σ h · s_u · s_v); NaN where one of them does not vary. */
export function weightedCorrelation(u: Float64Array, v: Float64Array, weights: Weights): number {
  const meanU = weightedMean(u, weights);
  const meanV = weightedMean(v, weights);
  let uv = 0;
  let uu = 0;
  let vv = 0;
  for (let row = 0; row < u.length; row++) {
    const weight = weights ? weights[row] : 1;
    const du = u[row] - meanU;
    const dv = v[row] - meanV;
    uv += weight * du * dv;
    uu += weight * du * du;
    vv += weight * dv * dv;
  }
  return uv / Math.sqrt(uu * vv);
}
