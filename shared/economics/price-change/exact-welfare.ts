import type { Point } from "../../systems/demand-system.ts";
import type { FittedCoefficients } from "../../systems/index.ts";
import { compensatingVariation, costOf, WelfareUndefined } from "../welfare.ts";
import { compensatingVariationWithError } from "../welfare-errors.ts";
import { type Bundle, bundleAt, lengthOf, type Subject } from "./bundle.ts";
import { constant, type Dual, difference } from "./dual.ts";

/**
 * c(p', v(p, x)) − x, what keeping the utility that x buys at p costs more at other prices. With its derivative in θ at a
 * given x.
 * Errors: `WelfareUndefined` for a system without cost function, and where utility or its cost is not defined.
 */
function costMore({ fitted, derivatives }: Subject, home: Point, prices: readonly number[]): Dual {
  if (derivatives) return compensatingVariationWithError(fitted, home, prices);
  return { value: compensatingVariation(fitted, home, prices), gradient: [] };
}

/** Why a fitted system has no cost function, by its form or by what is not imposed, as a clause; undefined where it has one. */
export function whyNoCost(fitted: Omit<FittedCoefficients, "covariance">): string | undefined {
  try {
    costOf(fitted);
    return undefined;
  } catch (error) {
    if (!(error instanceof WelfareUndefined)) throw error;
    return error.message;
  }
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
  const moreMoney = constant(after.total - before.total, k);
  try {
    const more = costMore(subject, before, after.prices);
    const less = costMore(subject, after, before.prices);
    const kept = { value: before.total + more.value, gradient: more.gradient };
    return {
      hicks: bundleAt(subject, after.prices, kept, before.demographics),
      compensating: difference(more, moreMoney),
      equivalent: difference(constant(0, k), { value: less.value + moreMoney.value, gradient: less.gradient }),
    };
  } catch (error) {
    if (!(error instanceof WelfareUndefined)) throw error;
    return { absent: error.message };
  }
}
