/** 97.5 % point of the normal distribution, for 95 % intervals. */
const NORMAL_975 = 1.959963984540054;

export type Interval = readonly [low: number, high: number];

/** Estimate ∓ 1.96 standard errors. */
export function normalInterval(value: number, standardError: number): Interval {
  return [value - NORMAL_975 * standardError, value + NORMAL_975 * standardError];
}

/** An eigenvalue's interval: the percentiles of the bootstrap where there was one, else by the normal distribution. */
export function intervalOfEigenvalue({
  value,
  standardError,
  interval,
}: {
  readonly value: number;
  readonly standardError: number;
  readonly interval?: Interval | undefined;
}): Interval {
  return interval ?? normalInterval(value, standardError);
}
