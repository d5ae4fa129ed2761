import { integrateSlope } from "../../numerics/runge-kutta.ts";

/** Quantities at prices and a total. */
export type Demand = (prices: readonly number[], total: number) => readonly number[];

/**
 * c(p1, v(p0, x)) of any demand function, without a formula for its cost: Shephard's lemma along the straight path,
 *
 *     dc/ds = Σ_i q_i(p(s), c) Δp_i,   c(0) = x,   p(s) = p0 + s Δp,
 *
 * which depends on the ends alone where the demands come from preferences (symmetric Slutsky matrix). Hausman (1981, American
 * Economic Review 71); Vartia (1983, Econometrica 51). Only prices that change are asked of `demand`.
 * Errors: `RangeError` where demand is no number on the way.
 */
export function integratedCost(
  demand: Demand,
  before: readonly number[],
  after: readonly number[],
  total: number,
  tolerance = 1e-12,
): number {
  const change = after.map((price, i) => price - before[i]);
  return integrateSlope(
    (s, cost) => {
      const prices = before.map((price, i) => price + s * change[i]);
      const quantities = demand(prices, cost);
      return change.reduce((sum, dearer, i) => (dearer === 0 ? sum : sum + dearer * quantities[i]), 0);
    },
    total,
    tolerance,
  );
}
