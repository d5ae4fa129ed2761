import type { Bundle } from "./bundle.ts";
import { combination, type Dual, difference, product, weighted } from "./dual.ts";

/** The two parts of a change of quantities, by good. */
export interface DualEffects {
  readonly substitution: readonly Dual[];
  readonly income: readonly Dual[];
}

/**
 * Exact finite effects by way of a bundle at the new prices that compensates: substitution q^c − q0, income q1 − q^c.
 * Hicks (1939, Value and Capital) where the utility before is kept, Slutsky (1915, Giornale degli Economisti 51) where
 * the bundle before stays affordable.
 */
export function finiteEffects(before: Bundle, compensated: Bundle, after: Bundle): DualEffects {
  return {
    substitution: compensated.quantities.map((own, i) => difference(own, before.quantities[i])),
    income: after.quantities.map((own, i) => difference(own, compensated.quantities[i])),
  };
}

/**
 * The differentials at the point before, for Δp and Δx in place of dp and dx, with r_j = Δp_j/p_j and R = Σ w_j r_j:
 *
 *     substitution  Σ_j S_ij Δp_j = (x/p_i) K_i,   K_i = Σ_j k_ij r_j = Σ_j μ_ij r_j + (μ_i + w_i) R − w_i r_i
 *     income        ∂q_i/∂x (Δx − Σ_j q_j Δp_j) = ((μ_i + w_i)/p_i) (Δx − x R)
 */
export function infinitesimalEffects(before: Bundle, changes: readonly number[], moreMoney: number): DualEffects {
  const { prices, total, marginal } = before;
  const x = total.value;
  const dearer = weighted(changes, before.shares);
  const left = { value: moreMoney - x * dearer.value, gradient: dearer.gradient.map((entry) => -x * entry) };
  return {
    substitution: compensatedShares(before, changes).map((own, i) => combination([x / prices[i], own])),
    income: marginal.map((own, i) => combination([1 / prices[i], product(own, left)])),
  };
}

/** K_i = Σ_j k_ij r_j. */
export function compensatedShares(before: Bundle, changes: readonly number[]): Dual[] {
  const dearer = weighted(changes, before.shares);
  return before
    .along(changes)
    .map((own, i) => combination([1, own], [1, product(before.marginal[i], dearer)], [-changes[i], before.shares[i]]));
}

/**
 * CV to second order, Σ q0 Δp + ½ Σ S Δp Δp − Δx = x (Σ w_i r_i + ½ Σ r_i K_i) − Δx, which needs no cost function
 * (methods 3.4).
 */
export function secondOrder(before: Bundle, changes: readonly number[], moreMoney: number): Dual {
  const x = before.total.value;
  const curved = weighted(changes, compensatedShares(before, changes));
  const sum = combination([x, weighted(changes, before.shares)], [0.5 * x, curved]);
  return { value: sum.value - moreMoney, gradient: sum.gradient };
}
