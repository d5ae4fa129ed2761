import type { Point } from "../../systems/demand-system.ts";
import type { FittedCoefficients } from "../../systems/index.ts";
import { bundleAt, lengthOf, type Subject } from "../price-change/bundle.ts";
import { constant, type Dual } from "../price-change/dual.ts";
import { compensatingVariation, WelfareUndefined } from "../welfare.ts";
import { compensatingVariationWithError } from "../welfare-errors.ts";
import { type Curve, type CurveOptions, curveOf, drawnCurves, orUndefined, withError } from "./curve.ts";

/** Demand for one good along its own price, in units of estimation. */
export interface DemandCurves {
  /** Of the prices asked for, those at which both curves are defined. */
  readonly prices: number[];
  /** q_i(p, x) = w_i x/p_i. */
  readonly uncompensated: Curve;
  /** h_i(p, u) at the utility of the point. */
  readonly compensated?: Curve;
  /** Why there is none, as a clause. */
  readonly noCompensated?: string;
  /** Draws behind the percentiles. */
  readonly draws?: number;
}

/**
 * Uncompensated (Marshall) and compensated (Hicks) demand for the `good`-th good at each of `prices` for it, everything else
 * as at `point`:
 *
 *     q_i(p, x) = w_i(p, x) x / p_i        h_i(p, u) = q_i(p, c(u, p)),  u = v(p⁰, x⁰)
 *
 * Standard errors by the delta method; those of h let utility, cost and shares move with θ. A system without cost function
 * has the first curve only, and says why. At p⁰ the two meet, and their slopes differ by q_i ∂q_i/∂x (Slutsky 1915).
 */
export function demandCurves(
  fitted: FittedCoefficients,
  point: Point,
  good: number,
  prices: readonly number[],
  options: CurveOptions,
): DemandCurves {
  const subject = { fitted, derivatives: true };
  const noCompensated = whyNoUtility(subject, point);
  const both = noCompensated === undefined;
  const points = prices.flatMap((price) => {
    options.poll?.();
    const at = orUndefined(() => quantitiesAt(subject, point, good, price, both));
    return at === undefined ? [] : [{ price, ...at }];
  });
  const drawn = drawnCurves(fitted, options, (draw) => {
    const drawnSubject = { fitted: draw, derivatives: false };
    return points.map(({ price }) => quantitiesAt(drawnSubject, point, good, price, both));
  });
  const curve = (which: "uncompensated" | "compensated") =>
    curveOf(
      points.map((one) => withError(one[which] as Dual, fitted.covariance)),
      options.level,
      drawn?.map((along) => along.map((one) => (one[which] as Dual).value)),
    );
  return {
    prices: points.map(({ price }) => price),
    uncompensated: curve("uncompensated"),
    ...(both ? { compensated: curve("compensated") } : { noCompensated }),
    ...(drawn && { draws: drawn.length }),
  };
}

interface Quantities {
  readonly uncompensated: Dual;
  readonly compensated?: Dual;
}

/** Errors: `RangeError` where the system predicts no shares, or utility or its cost is not defined. */
function quantitiesAt(subject: Subject, point: Point, good: number, price: number, both: boolean): Quantities {
  const prices = point.prices.map((one, j) => (j === good ? price : one));
  const bought = (total: Dual) => finite(bundleAt(subject, prices, total, point.demographics).quantities[good]);
  const uncompensated = bought(constant(point.total, lengthOf(subject)));
  if (!both) return { uncompensated };
  const more = costMore(subject, point, prices);
  return { uncompensated, compensated: bought({ value: point.total + more.value, gradient: more.gradient }) };
}

/** What keeping the utility of the point costs more at other prices. */
function costMore({ fitted, derivatives }: Subject, point: Point, prices: readonly number[]): Dual {
  if (derivatives) return compensatingVariationWithError(fitted, point, prices);
  return { value: compensatingVariation(fitted, point, prices), gradient: [] };
}

function finite(quantity: Dual): Dual {
  if (!Number.isFinite(quantity.value)) throw new RangeError("the quantity is not a number at this price");
  return quantity;
}

/** Why the point has no utility to keep, as a clause; undefined where it has. */
function whyNoUtility({ fitted }: Subject, point: Point): string | undefined {
  try {
    compensatingVariation(fitted, point, point.prices);
    return undefined;
  } catch (error) {
    if (!(error instanceof WelfareUndefined)) throw error;
    return error.message;
  }
}
