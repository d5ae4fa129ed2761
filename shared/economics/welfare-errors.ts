import { standardError } from "../numerics/matrix.ts";
import type { CostDerivatives, Point } from "../systems/demand-system.ts";
import type { FittedCoefficients } from "../systems/index.ts";
import { compensatingVariation, costOf, equivalentVariation, utilityAt } from "./welfare.ts";

/** A welfare measure in units of estimation with its exact gradient in θ and standard error √(g'V g). */
export interface Variation {
  readonly value: number;
  readonly gradient: number[];
  readonly standardError: number;
}

/**
 * The compensating variation with its exact derivative in θ. At the total x utility moves with θ so that ln c(u0, p0)
 * stays ln x, hence du0/dθ = −(∂ln c/∂θ)/(∂ln c/∂u) at p0, and
 *
 *     ∂CV/∂θ = c(u0, p1) [∂ln c/∂θ|p1 − (∂ln c/∂u|p1)/(∂ln c/∂u|p0) · ∂ln c/∂θ|p0]
 *
 * Errors as for `compensatingVariation`.
 */
export function compensatingVariationWithError(
  fitted: FittedCoefficients,
  point: Point,
  newPrices: readonly number[],
): Variation {
  const value = compensatingVariation(fitted, point, newPrices);
  const [before, after] = derivativesAt(fitted, point, point.prices, newPrices);
  return withError(fitted, value, compensatedGradient(value + point.total, before, after));
}

/**
 * The equivalent variation x − c(u1, p0) with its exact derivative in θ, utility u1 = v(p1, x):
 *
 *     ∂EV/∂θ = −c(u1, p0) [∂ln c/∂θ|p0 − (∂ln c/∂u|p0)/(∂ln c/∂u|p1) · ∂ln c/∂θ|p1]
 *
 * Errors as for `equivalentVariation`.
 */
export function equivalentVariationWithError(
  fitted: FittedCoefficients,
  point: Point,
  newPrices: readonly number[],
): Variation {
  const value = equivalentVariation(fitted, point, newPrices);
  const [after, before] = derivativesAt(fitted, { ...point, prices: newPrices }, newPrices, point.prices);
  const gradient = compensatedGradient(point.total - value, after, before);
  return withError(
    fitted,
    value,
    gradient.map((entry) => 0 - entry),
  );
}

/** ∂c(u, p')/∂θ with u the utility of a total at p: `home` are the derivatives at p, `away` those at p'. */
function compensatedGradient(cost: number, home: CostDerivatives, away: CostDerivatives): number[] {
  const ratio = away.utility / home.utility;
  return away.theta.map((entry, a) => cost * (entry - ratio * home.theta[a]));
}

/** Derivatives of ln c at two vectors of prices, both at the utility of `reference`. */
function derivativesAt(
  fitted: FittedCoefficients,
  reference: Point,
  ...prices: readonly (readonly number[])[]
): CostDerivatives[] {
  const { cost, size } = costOf(fitted);
  const utility = utilityAt(cost, fitted, size, reference);
  return prices.map((at) => cost.logCostDerivatives(fitted.theta, size, utility, at, reference.demographics));
}

function withError(fitted: FittedCoefficients, value: number, gradient: number[]): Variation {
  return { value, gradient, standardError: standardError(fitted.covariance, gradient) };
}
