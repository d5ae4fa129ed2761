import { intervalOf } from "../../../shared/economics/price-change/interval.ts";
import type { Estimate } from "../../../shared/schemas/price-change.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { meanOver } from "./elasticity-points.ts";

/**
 * The weighted mean of a column over some rows with its linearised standard error,
 *
 *     √( Σ_c (Σ_{t in c} h_t (v_t − v̄))² ) / Σ h
 *
 * where c are the clusters of the data, or single rows where none are named (Särndal, Swensson & Wretman 1992, Model
 * Assisted Survey Sampling, section 5.7, from memory; rows and clusters drawn independently, with replacement).
 */
export function meanWithError(values: Float64Array, rows: Int32Array, data: PreparedData, level: number): Estimate {
  const { weights, clusters } = data;
  const value = meanOver(values, rows, weights);
  const sums = new Map<number, number>();
  let total = 0;
  for (const t of rows) {
    const weight = weights ? weights[t] : 1;
    const cluster = clusters ? clusters.codes[t] : t;
    sums.set(cluster, (sums.get(cluster) ?? 0) + weight * (values[t] - value));
    total += weight;
  }
  let squares = 0;
  for (const sum of sums.values()) squares += sum * sum;
  const error = Math.sqrt(squares) / total;
  const [low, high] = intervalOf({ value, error }, level);
  return { value, error, low, high };
}

/** What the errors of means over rows are, in words. */
export function meanErrorsPhrase({ clusters }: PreparedData): string {
  if (clusters === undefined) return "of means over rows drawn independently";
  return `of means, clustered by ${clusters.column}, ${clusters.labels.length} clusters`;
}
