import type { DemandSystem, Point, SlopeDerivatives, Slopes, SystemSize } from "../systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../systems/index.ts";

/** A fitted system at a point: everything the economics is derived from. */
export interface Evaluation {
  readonly system: DemandSystem;
  readonly size: SystemSize;
  readonly slopes: Slopes;
  readonly derivatives: SlopeDerivatives;
}

export function evaluateAt(fitted: FittedCoefficients, point: Point): Evaluation {
  const { system, size } = systemOf(fitted);
  const coefficients = system.layout(size).length;
  if (fitted.covariance.length !== coefficients) {
    throw new RangeError(
      `the covariance has ${fitted.covariance.length} rows, the ${system.longName} has ${coefficients} coefficients`,
    );
  }
  const slopes = system.slopes(fitted.theta, size, point);
  const undefinedAt = slopes.shares.findIndex((share) => !Number.isFinite(share));
  if (undefinedAt >= 0) {
    throw new RangeError(`the predicted share of ${fitted.goods[undefinedAt]} is not a number at this point`);
  }
  return { system, size, slopes, derivatives: system.slopeDerivatives(fitted.theta, size, point) };
}

/** Σ weight · gradient, the gradient of a combination. */
export function combined(...terms: readonly (readonly [weight: number, gradient: readonly number[]])[]): number[] {
  const sum = new Array<number>(terms[0][1].length).fill(0);
  for (const [weight, gradient] of terms) {
    if (weight === 0) continue;
    for (let a = 0; a < sum.length; a++) sum[a] += weight * gradient[a];
  }
  return sum;
}
