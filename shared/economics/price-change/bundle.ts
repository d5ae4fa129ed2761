import type { Point, Slopes } from "../../systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../../systems/index.ts";
import { responsesFrom, slopesAt } from "../responses.ts";
import { type Dual, weighted } from "./dual.ts";

/** A fitted system of which derivatives in θ are wanted (k of them), or not (0). */
export interface Subject {
  readonly fitted: FittedCoefficients;
  readonly derivatives: boolean;
}

export const lengthOf = ({ fitted, derivatives }: Subject): number => (derivatives ? fitted.theta.length : 0);

/** What is bought at prices and a total that may itself move with θ. */
export interface Bundle {
  readonly prices: readonly number[];
  readonly total: Dual;
  /** w_i. */
  readonly shares: readonly Dual[];
  /** q_i = w_i x / p_i. */
  readonly quantities: readonly Dual[];
  /** μ_i + w_i, what a further unit of money adds to expenditure on the good. */
  readonly marginal: readonly Dual[];
  /** Σ_j μ_ij r_j for changes r of the log prices, by good. */
  along(changes: readonly number[]): Dual[];
}

/**
 * The bundle at a point whose total is `total`:  ∂w_i/∂θ = ∂w_i/∂θ|x + μ_i ∂ln x/∂θ. The derivatives of μ_i and μ_ij are
 * those at a given total; they are asked for only where it is given.
 */
export function bundleAt(
  subject: Subject,
  prices: readonly number[],
  total: Dual,
  demographics: readonly number[],
): Bundle {
  const { fitted } = subject;
  const point: Point = { prices, total: total.value, demographics };
  const { slopes, byTheta } = slopesOf(subject, point);
  const moves = total.gradient.some((entry) => entry !== 0);
  const byTotal = moves ? byLogTotal(fitted, point, slopes) : slopes.total;
  const logTotal = total.gradient.map((entry) => entry / total.value);
  const shares = slopes.shares.map(
    (value, i): Dual => ({
      value,
      gradient: logTotal.map((entry, a) => (byTheta ? byTheta.shares[i][a] : 0) + byTotal[i] * entry),
    }),
  );
  const dual = (value: number, gradient: readonly number[] | undefined): Dual => ({
    value,
    gradient: gradient ?? [],
  });
  return {
    prices,
    total,
    shares,
    quantities: shares.map(({ value, gradient }, i) => ({
      value: (value * total.value) / prices[i],
      gradient: gradient.map((entry, a) => (total.value * (entry + value * logTotal[a])) / prices[i]),
    })),
    marginal: slopes.total.map((slope, i) =>
      dual(
        slope + slopes.shares[i],
        byTheta?.total[i].map((entry, a) => entry + byTheta.shares[i][a]),
      ),
    ),
    along: (changes) =>
      fitted.goods.map((_, i) =>
        weighted(
          changes,
          slopes.prices[i].map((slope, j) => dual(slope, byTheta?.prices[i][j])),
        ),
      ),
  };
}

/**
 * ∂w_i/∂ln x of the shares themselves. Slopes that hold the weights of an index are not that where the weights are the shares
 * predicted; such shares are linear in ln x, so that a step of any length has the slope.
 */
function byLogTotal(fitted: FittedCoefficients, point: Point, held: Slopes): readonly number[] {
  const { system, size } = systemOf(fitted);
  if (system.sharesNear === undefined) return held.total;
  const further = system.slopes(fitted.theta, size, { ...point, total: point.total * Math.E });
  return further.shares.map((share, i) => share - held.shares[i]);
}

function slopesOf({ fitted, derivatives }: Subject, point: Point) {
  if (derivatives) {
    const { slopes, derivatives: byTheta } = slopesAt(fitted, point);
    return { slopes, byTheta };
  }
  const { system, size } = systemOf(fitted);
  const held = system.slopes(fitted.theta, size, point);
  const slopes: Slopes = responsesFrom(fitted.form, held, point.prices.map(Math.log));
  return { slopes, byTheta: undefined };
}
