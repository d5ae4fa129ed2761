import { normalQuantile } from "../../numerics/normal.ts";
import { percentileInterval } from "../percentile.ts";

export type Interval = [low: number, high: number];

/** The percentiles of bootstrap draws where there are some, else the estimate and its error times a normal quantile. */
export function intervalOf(
  { value, error }: { readonly value: number; readonly error: number },
  level: number,
  draws?: readonly number[],
): Interval {
  if (draws && draws.length > 0) return percentileInterval(draws, level);
  const reach = normalQuantile((1 + level) / 2) * Math.abs(error);
  return [value - reach, value + reach];
}
