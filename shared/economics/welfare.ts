import type { CostFunction, Point, SystemSize } from "../systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../systems/index.ts";
import { lawStatus } from "./checks.ts";
import { slutskyMatrix } from "./slutsky-matrix.ts";

/** Welfare that the system or the point does not define; the message says why and what would. */
export class WelfareUndefined extends RangeError {
  override name = "WelfareUndefined";
}

type Fitted = Omit<FittedCoefficients, "covariance">;

/**
 * Compensating variation of prices moving from `point.prices` to `newPrices` at the same total, in units of
 * estimation: CV = c(p1, u0) − c(p0, u0), u0 = v(p0, x). Positive when prices rise: a loss. Hicks (1942).
 *
 * Errors: `WelfareUndefined` for a system without cost function, for one whose symmetry and homogeneity
 * are not imposed, and where utility is not defined at the point.
 */
export function compensatingVariation(fitted: Fitted, point: Point, newPrices: readonly number[]): number {
  const { cost, size } = costOf(fitted);
  const utility = utilityAt(cost, fitted, size, point);
  return point.total * Math.expm1(logCostRatio(cost, fitted, size, utility, newPrices, point));
}

/**
 * Equivalent variation EV = c(p1, u1) − c(p0, u1), u1 = v(p1, x), in units of estimation. Positive when
 * prices rise: a loss. Errors as for the compensating variation.
 */
export function equivalentVariation(fitted: Fitted, point: Point, newPrices: readonly number[]): number {
  const { cost, size } = costOf(fitted);
  const after = { ...point, prices: newPrices };
  const utility = utilityAt(cost, fitted, size, after);
  return -point.total * Math.expm1(logCostRatio(cost, fitted, size, utility, point.prices, after));
}

/**
 * Second-order approximation of the compensating variation, Σ q0_i Δp_i + ½ Σ_ij S_ij Δp_i Δp_j, which needs
 * no cost function (methods 3.4).
 */
export function secondOrderVariation(fitted: Fitted, point: Point, newPrices: readonly number[]): number {
  const { system, size } = systemOf(fitted);
  const slopes = system.slopes(fitted.theta, size, point);
  const k = slutskyMatrix(slopes);
  const change = newPrices.map((price, i) => price / point.prices[i] - 1);
  let sum = 0;
  for (let i = 0; i < change.length; i++) {
    sum += slopes.shares[i] * change[i];
    for (let j = 0; j < change.length; j++) sum += 0.5 * k[i][j] * change[i] * change[j];
  }
  return point.total * sum;
}

/** The cost function of a fitted system. Errors: `WelfareUndefined` where it has none. */
export function costOf(fitted: Fitted): { cost: CostFunction; size: SystemSize } {
  const { system, size } = systemOf(fitted);
  if ("absent" in system.cost) throw new WelfareUndefined(system.cost.absent);
  for (const law of ["homogeneity", "symmetry"] as const) {
    if (lawStatus(fitted, law) === "free") {
      throw new WelfareUndefined(`${law} is not imposed: without it the ${system.longName} has no cost function`);
    }
  }
  return { cost: system.cost, size };
}

/** v(p, x). Errors: `WelfareUndefined` where it is not defined. */
export function utilityAt(cost: CostFunction, { theta }: Fitted, size: SystemSize, point: Point): number {
  const utility = cost.utility(theta, size, point);
  if (!Number.isFinite(utility)) throw new WelfareUndefined(`utility is not defined at a total of ${point.total}`);
  return utility;
}

/** ln c(u, p) − ln x, where x is the total that gives u at `reference`. */
function logCostRatio(
  cost: CostFunction,
  { theta }: Fitted,
  size: SystemSize,
  utility: number,
  prices: readonly number[],
  reference: Point,
): number {
  const logCost = cost.logCost(theta, size, utility, prices, reference.demographics);
  if (!Number.isFinite(logCost))
    throw new WelfareUndefined("the cost of this utility is not defined at the other prices");
  return logCost - Math.log(reference.total);
}
