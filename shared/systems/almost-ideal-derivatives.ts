import { type Matrix, zeros } from "../numerics/matrix.ts";
import { placesOf } from "./almost-ideal.ts";
import type { SlopeDerivatives, SystemSize } from "./demand-system.ts";

/** Everything at a point from which the θ-derivatives of shares and slopes follow. */
export interface PointDerivatives {
  readonly logPrices: readonly number[];
  readonly demographics: readonly number[];
  readonly beta: ArrayLike<number>;
  /** m = ln(x/P) and ∂m/∂θ (k). */
  readonly real: number;
  readonly realByTheta: readonly number[];
}

/** ∂w_i/∂θ = ∂(α_i(z) + Σ_j γ_ij ln p_j)/∂θ + β_i ∂m/∂θ + m ∂β_i/∂θ, n × k. */
export function shareDerivatives(size: SystemSize, at: PointDerivatives): Matrix {
  const places = placesOf(size);
  const byTheta = zeros(size.goods, places.count);
  for (let i = 0; i < size.goods; i++) {
    const row = byTheta[i];
    for (let a = 0; a < places.count; a++) row[a] = at.beta[i] * at.realByTheta[a];
    row[places.alpha(i)] += 1;
    for (let k = 0; k < size.demographics; k++) row[places.demographic(i, k)] += at.demographics[k];
    for (let j = 0; j < size.goods; j++) row[places.gamma(i, j)] += at.logPrices[j];
    row[places.beta(i)] += at.real;
  }
  return byTheta;
}

/**
 * Derivatives of w, of μ_i = β_i and of μ_ij = γ_ij − β_i π_j, where π_j = ∂ln P/∂ln p_j has
 * derivatives `indexSlopesByTheta` (n × k).
 */
export function almostIdealDerivatives(
  size: SystemSize,
  beta: ArrayLike<number>,
  sharesByTheta: Matrix,
  indexSlopes: readonly number[],
  indexSlopesByTheta: Matrix,
): SlopeDerivatives {
  const places = placesOf(size);
  const goods = Array.from({ length: size.goods }, (_, i) => i);
  return {
    shares: sharesByTheta,
    total: goods.map((i) => {
      const row = new Array<number>(places.count).fill(0);
      row[places.beta(i)] = 1;
      return row;
    }),
    prices: goods.map((i) =>
      goods.map((j) => {
        const row = indexSlopesByTheta[j].map((entry) => (entry === 0 ? 0 : -beta[i] * entry));
        row[places.gamma(i, j)] += 1;
        row[places.beta(i)] -= indexSlopes[j];
        return row;
      }),
    ),
  };
}
