import type { SlopeDerivatives, Slopes } from "../systems/demand-system.ts";
import { combined } from "./evaluation.ts";
import { slutskyMatrix } from "./slutsky-matrix.ts";

interface AtShares {
  readonly slopes: Slopes;
  readonly derivatives?: SlopeDerivatives;
}

/**
 * The slopes of a system in differences at other observed shares. Its coefficients are the marginal shares
 * θ_i = w_i + μ_i and the Slutsky matrix k_ij, whatever the shares, so that at shares w
 *
 *     μ_i = θ_i − w_i,   μ_ij = k_ij + w_i δ_ij − θ_i w_j
 *
 * Theil (1965, Econometrica 33, 67–87).
 */
export function differencesAtShares({ slopes, derivatives }: AtShares, shares: readonly number[]): AtShares {
  const matrix = slutskyMatrix(slopes);
  const marginal = slopes.total.map((slope, i) => slope + slopes.shares[i]);
  return {
    slopes: {
      shares: [...shares],
      total: marginal.map((entry, i) => entry - shares[i]),
      prices: matrix.map((row, i) => row.map((k, j) => k + (i === j ? shares[i] : 0) - marginal[i] * shares[j])),
    },
    ...(derivatives && {
      derivatives: {
        ...derivatives,
        prices: derivatives.prices.map((row, i) =>
          row.map((slope, j) => combined([1, slope], [slopes.shares[j] - shares[j], derivatives.total[i]])),
        ),
      },
    }),
  };
}
