import { type Matrix, standardError } from "../../numerics/matrix.ts";
import type { FittedCoefficients } from "../../systems/index.ts";
import { FEWEST_DRAWS } from "../drawn-intervals.ts";
import type { Dual } from "../price-change/dual.ts";
import { intervalOf } from "../price-change/interval.ts";

/** Estimates point by point along an axis, with standard errors and the ends of their intervals. */
export interface Curve {
  readonly values: number[];
  readonly errors: number[];
  readonly low: number[];
  readonly high: number[];
}

export interface CurveOptions {
  /** Of confidence. */
  readonly level: number;
  /** Bootstrap draws of θ (replicates × k): intervals are their percentiles where enough of them are defined. */
  readonly draws?: readonly (readonly number[])[];
  /** Called between points; may throw. */
  readonly poll?: () => void;
}

/** So many numbers from `low` to `high`, in equal steps, or in equal steps of their logarithm. */
export function spaced(low: number, high: number, count: number, scale: "equal" | "logarithmic" = "equal"): number[] {
  const [from, to] = scale === "equal" ? [low, high] : [Math.log(low), Math.log(high)];
  const steps = Array.from({ length: count }, (_, i) => from + ((to - from) * i) / (count - 1));
  return scale === "equal" ? steps : steps.map(Math.exp);
}

/** An estimate with its standard error. */
export interface CurvePoint {
  readonly value: number;
  readonly error: number;
}

/** √(g'V g) beside a number. */
export function withError({ value, gradient }: Dual, covariance: Matrix): CurvePoint {
  return { value, error: standardError(covariance, [...gradient]) };
}

/** The points as a curve with intervals; `drawn` is draws × points. */
export function curveOf(points: readonly CurvePoint[], level: number, drawn?: readonly (readonly number[])[]): Curve {
  const ends = points.map((point, at) =>
    intervalOf(
      point,
      level,
      drawn?.map((one) => one[at]),
    ),
  );
  return {
    values: points.map(({ value }) => value),
    errors: points.map(({ error }) => error),
    low: ends.map(([low]) => low),
    high: ends.map(([, high]) => high),
  };
}

/**
 * What a curve would be at each bootstrap draw that is defined all along it; undefined where those are too few for
 * percentiles, so that one curve has intervals of one kind.
 */
export function drawnCurves<T>(
  fitted: FittedCoefficients,
  { draws, poll = () => {} }: CurveOptions,
  derive: (fitted: FittedCoefficients) => T | undefined,
): T[] | undefined {
  if (draws === undefined) return undefined;
  const defined = draws.flatMap((theta) => {
    poll();
    const one = orUndefined(() => derive({ ...fitted, theta: [...theta] }));
    return one === undefined ? [] : [one];
  });
  return defined.length < FEWEST_DRAWS ? undefined : defined;
}

/** A value, or none where the system is not defined. */
export function orUndefined<T>(compute: () => T): T | undefined {
  try {
    return compute();
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}
