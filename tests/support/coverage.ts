import { tQuantile } from "../../shared/numerics/distributions.ts";
import { normalQuantile } from "../../shared/numerics/normal.ts";

/** An interval of 95 % and the number that it should cover. */
export interface Interval {
  readonly truth: number;
  readonly low: number;
  readonly high: number;
}

export interface Coverage {
  readonly samples: number;
  readonly intervals: number;
  /** Of all intervals, those that cover the truth. */
  readonly covered: number;
  /** Monte Carlo standard error of `covered`. */
  readonly monteCarloError: number;
  /** How far from 0.95 chance alone takes `covered`, all but 3 times in 1,000. */
  readonly bound: number;
}

export const NOMINAL = 0.95;

/** estimate ± 1.96 standard errors. */
export function normalInterval(truth: number, estimate: number, standardError: number): Interval {
  const half = normalQuantile(0.975) * standardError;
  return { truth, low: estimate - half, high: estimate + half };
}

/**
 * How often 95 % intervals cover over samples drawn anew, with what chance allows. Intervals of one sample are
 * dependent, so the Monte Carlo variance is that of the samples' shares, though at least the binomial's of m independent
 * intervals, 0.95 · 0.05/m a sample: shares may all be alike where samples are few. The bound is the standard error
 * times Student's 99.85 % quantile with as many degrees of freedom as that variance has. Intervals without width, of
 * coefficients that restrictions fix, are left out.
 */
export function coverageOf(samples: readonly (readonly Interval[])[]): Coverage {
  const counted = samples.map((sample) => sample.filter(({ low, high }) => high - low > 1e-7));
  const intervals = counted.reduce((sum, sample) => sum + sample.length, 0);
  if (counted.some((sample) => sample.length === 0)) throw new RangeError("a sample without an interval of some width");
  const shares = counted.map(
    (sample) => sample.filter(({ truth, low, high }) => low <= truth && truth <= high).length / sample.length,
  );
  const covered = shares.reduce((sum, share) => sum + share, 0) / shares.length;
  const variance = shares.reduce((sum, share) => sum + (share - covered) ** 2, 0) / (shares.length - 1);
  const least = (NOMINAL * (1 - NOMINAL) * shares.length) / intervals;
  const monteCarloError = Math.sqrt(Math.max(variance, least) / shares.length);
  const bound = tQuantile(0.9985, shares.length - 1) * monteCarloError;
  return { samples: shares.length, intervals, covered, monteCarloError, bound };
}

/** Coverage of several kinds of interval over the same samples; of those that there are. */
export function coverages<Kind extends string>(
  samples: number,
  draw: (sample: number) => Readonly<Record<Kind, readonly Interval[]>>,
): Record<Kind, Coverage> {
  const drawn = Array.from({ length: samples }, (_, sample) => draw(sample));
  const kinds = (Object.keys(drawn[0]) as Kind[]).filter((kind) => drawn[0][kind].length > 0);
  return Object.fromEntries(kinds.map((kind) => [kind, coverageOf(drawn.map((sample) => sample[kind]))])) as Record<
    Kind,
    Coverage
  >;
}

/** Whether coverage is 95 % but for chance. */
export const coversAsItSays = ({ covered, bound }: Coverage): boolean => Math.abs(covered - NOMINAL) <= bound;
