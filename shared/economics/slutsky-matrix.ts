import type { Matrix } from "../numerics/matrix.ts";
import type { SlopeDerivatives, Slopes } from "../systems/demand-system.ts";
import { combined } from "./evaluation.ts";

/**
 * Slutsky matrix in share form, n × n, without units:
 *
 *     k_ij = μ_ij − w_i δ_ij + (w_i + μ_i) w_j = w_i ε*_ij
 */
export function slutskyMatrix({ shares, total, prices }: Slopes): Matrix {
  return prices.map((row, i) =>
    row.map((slope, j) => slope - (i === j ? shares[i] : 0) + (shares[i] + total[i]) * shares[j]),
  );
}

/** ∂k_ij/∂θ = ∂μ_ij − δ_ij ∂w_i + (∂w_i + ∂μ_i) w_j + (w_i + μ_i) ∂w_j, n × n × k. */
export function slutskyDerivatives({ shares, total }: Slopes, derivatives: SlopeDerivatives): number[][][] {
  return derivatives.prices.map((row, i) =>
    row.map((slope, j) =>
      combined(
        [1, slope],
        [shares[j] - (i === j ? 1 : 0), derivatives.shares[i]],
        [shares[j], derivatives.total[i]],
        [shares[i] + total[i], derivatives.shares[j]],
      ),
    ),
  );
}

/** Quantity form S_ij = ∂h_i/∂p_j = x/(p_i p_j) · k_ij: the factors, in the units of the prices and total given. */
export function quantityFactors(prices: readonly number[], total: number): Matrix {
  return prices.map((own) => prices.map((other) => total / (own * other)));
}
