import type { Point } from "../../systems/demand-system.ts";
import { costOf, utilityAt, WelfareUndefined } from "../welfare.ts";
import { type Bundle, bundleAt, lengthOf, type Subject } from "./bundle.ts";
import { constant, type Dual, difference } from "./dual.ts";

/**
 * c(p', v(p, x)), the cost at other prices of the utility that x buys at p, with its derivative in θ at a given x:
 *
 *     ∂c/∂θ = c [∂ln c/∂θ|p' − (∂ln c/∂u|p')/(∂ln c/∂u|p) ∂ln c/∂θ|p]
 *
 * Errors: `WelfareUndefined` for a system without cost function, and where utility or its cost is not defined.
 */
export function costElsewhere(subject: Subject, home: Point, prices: readonly number[]): Dual {
  const { fitted, derivatives } = subject;
  const { cost, size } = costOf(fitted);
  const utility = utilityAt(cost, fitted, size, home);
  const { theta } = fitted;
  const away = cost.logCost(theta, size, utility, prices, home.demographics);
  if (!Number.isFinite(away)) throw new WelfareUndefined("the cost of this utility is not defined at the other prices");
  // Not e^(ln c): at unchanged prices the cost is the total to the last digit.
  const value = home.total * Math.exp(away - Math.log(home.total));
  if (!derivatives) return constant(value, lengthOf(subject));
  const here = cost.logCostDerivatives(theta, size, utility, home.prices, home.demographics);
  const there = cost.logCostDerivatives(theta, size, utility, prices, home.demographics);
  const ratio = there.utility / here.utility;
  return { value, gradient: there.theta.map((entry, a) => value * (entry - ratio * here.theta[a])) };
}

/** What a cost function adds, or why there is none. */
export type Exact =
  | { readonly hicks: Bundle; readonly compensating: Dual; readonly equivalent: Dual }
  | { readonly absent: string };

/**
 * The bundle at the utility before, CV = c(p1, u0) − x1 and EV = x0 − c(p0, u1); with total expenditure unchanged those
 * of methods 3.4. Positive: a loss.
 */
export function exactMeasures(subject: Subject, before: Point, after: Point): Exact {
  const k = lengthOf(subject);
  try {
    const kept = costElsewhere(subject, before, after.prices);
    const reached = costElsewhere(subject, after, before.prices);
    return {
      hicks: bundleAt(subject, after.prices, kept, before.demographics),
      compensating: difference(kept, constant(after.total, k)),
      equivalent: difference(constant(before.total, k), reached),
    };
  } catch (error) {
    if (!(error instanceof WelfareUndefined)) throw error;
    return { absent: error.message };
  }
}
