import type { Evaluator, Point, Slopes, SystemSize } from "./demand-system.ts";

/** Refuses a point whose lengths or signs are not the system's. */
export function requirePoint(size: SystemSize, point: Point): void {
  const { goods, demographics } = size;
  if (point.prices.length !== goods) {
    throw new RangeError(`prices has ${point.prices.length} entries, the system has ${goods} goods`);
  }
  if (point.demographics.length !== demographics) {
    throw new RangeError(`demographics has ${point.demographics.length} entries, the system has ${demographics}`);
  }
  const bad = point.prices.findIndex((price) => !(price > 0 && Number.isFinite(price)));
  if (bad >= 0) throw new RangeError(`the price of good ${bad + 1} is ${point.prices[bad]}; prices are positive`);
  if (!(point.total > 0 && Number.isFinite(point.total))) {
    throw new RangeError(`total expenditure is ${point.total}; it is positive`);
  }
}

/** Refuses a coefficient vector of another length than the layout's. */
export function requireTheta(theta: readonly number[], coefficients: number): void {
  if (theta.length !== coefficients) {
    throw new RangeError(`theta has ${theta.length} coefficients, the system has ${coefficients}`);
  }
}

/**
 * `slopes` of a system that has an evaluator: one call of it, copied into rows of numbers. `refuse` speaks where the
 * system predicts no shares.
 */
export function slopesByEvaluator(
  evaluator: Evaluator,
  size: SystemSize,
  point: Point,
  refuse?: (point: Point) => never,
): Slopes {
  requirePoint(size, point);
  evaluator.at(point.prices.map(Math.log), Math.log(point.total), point.demographics);
  if (refuse !== undefined && Number.isNaN(evaluator.shares[0])) refuse(point);
  const n = size.goods;
  return {
    shares: Array.from(evaluator.shares),
    total: Array.from(evaluator.total),
    prices: Array.from({ length: n }, (_, i) => Array.from(evaluator.prices.subarray(i * n, (i + 1) * n))),
  };
}
