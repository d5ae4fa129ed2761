import type { SlopeDerivatives, Slopes } from "../systems/demand-system.ts";
import { combined } from "./evaluation.ts";

/** How the linear approximate system's price index answers a price: its weights held, or moving with the shares. */
export type IndexResponse = "held" | "exact";

/** Slopes with their derivatives in θ, where those are asked for. */
export interface SlopesInTheta {
  readonly slopes: Slopes;
  readonly derivatives?: SlopeDerivatives;
}

/**
 * The slopes of the linear approximate system with the index's weights at other shares than those predicted
 * (`shares`, n: observed ones), held or moving.
 *
 * Held (Chalfant 1987, Journal of Business and Economic Statistics 5, 233–242):
 *
 *     μ_i = β_i,   μ_ij = γ_ij − β_i w_j
 *
 * Exact, for Stone's index ln P = Σ_k w_k ln p_k, whose weights answer prices and total as the shares do:
 *
 *     μ_i = β_i/D,   μ_ij = γ_ij − (β_i/D)(w_j + Σ_k γ_kj ln p_k),   D = 1 + Σ_k β_k ln p_k
 *
 * which is E = (I + BC)⁻¹(A + I) − I and N = ι + (I + BC)⁻¹B of Green & Alston (1990, American Journal of
 * Agricultural Economics 72, 442–445) with the inverse of I plus a matrix of rank one written out.
 *
 * `held` are the system's own slopes at its predicted shares, from which β_i = μ_i and γ_ij = μ_ij + β_i ŵ_j.
 */
export function withIndexWeights(
  held: SlopesInTheta,
  response: IndexResponse,
  logPrices: readonly number[],
  shares: readonly number[] | undefined,
): SlopesInTheta {
  if (response === "held" && shares === undefined) return held;
  const { slopes, derivatives } = held;
  const beta = slopes.total;
  const gamma = slopes.prices.map((row, i) => row.map((slope, j) => slope + beta[i] * slopes.shares[j]));
  const weights = shares ?? slopes.shares;
  const moving = response === "exact";
  const denominator = moving ? 1 + logPrices.reduce((sum, logPrice, k) => sum + beta[k] * logPrice, 0) : 1;
  const index = weights.map((weight, j) =>
    moving ? logPrices.reduce((sum, logPrice, k) => sum + gamma[k][j] * logPrice, weight) : weight,
  );
  const total = beta.map((b) => b / denominator);
  const prices = gamma.map((row, i) => row.map((entry, j) => entry - total[i] * index[j]));
  const adjusted = { shares: slopes.shares, total, prices };
  if (derivatives === undefined) return { slopes: adjusted };

  const ofGamma = derivatives.prices.map((row, i) =>
    row.map((slope, j) =>
      combined([1, slope], [slopes.shares[j], derivatives.total[i]], [beta[i], derivatives.shares[j]]),
    ),
  );
  const ofDenominator = combined(...logPrices.map((logPrice, k) => [logPrice, derivatives.total[k]] as const));
  const ofTotal = derivatives.total.map((gradient, i) =>
    moving ? combined([1 / denominator, gradient], [-total[i] / denominator, ofDenominator]) : gradient,
  );
  const ofIndex = weights.map((_, j) =>
    combined(
      [shares === undefined ? 1 : 0, derivatives.shares[j]],
      ...(moving ? logPrices.map((logPrice, k) => [logPrice, ofGamma[k][j]] as const) : []),
    ),
  );
  return {
    slopes: adjusted,
    derivatives: {
      shares: derivatives.shares,
      total: ofTotal,
      prices: ofGamma.map((row, i) =>
        row.map((gradient, j) => combined([1, gradient], [-index[j], ofTotal[i]], [-total[i], ofIndex[j]])),
      ),
    },
  };
}
