import type { Point, PriceSlopeTerm } from "../systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../systems/index.ts";

/** One entry of the share form as its formula and numbers: k_ij = μ_ij − w_i δ_ij + (w_i + μ_i) w_j. */
export interface FormulaParts {
  /** i = j: the term −w_i belongs to the sum. */
  readonly own: boolean;
  readonly priceSlope: number;
  readonly share: number;
  readonly totalSlope: number;
  /** w_j. */
  readonly otherShare: number;
  /** (w_i + μ_i) w_j. */
  readonly incomeTerm: number;
  /** k_ij. */
  readonly value: number;
  /** μ_ij by the system's own formula: sum of signed products. */
  readonly priceSlopeTerms: readonly PriceSlopeTerm[];
}

/** The parts of k_ij at a point, for good i (row) and price j (column). */
export function formulaParts(
  fitted: Omit<FittedCoefficients, "covariance">,
  point: Point,
  i: number,
  j: number,
): FormulaParts {
  const { system, size } = systemOf(fitted);
  const { shares, total, prices } = system.slopes(fitted.theta, size, point);
  const incomeTerm = (shares[i] + total[i]) * shares[j];
  return {
    own: i === j,
    priceSlope: prices[i][j],
    share: shares[i],
    totalSlope: total[i],
    otherShare: shares[j],
    incomeTerm,
    value: prices[i][j] - (i === j ? shares[i] : 0) + incomeTerm,
    priceSlopeTerms: system.explainPriceSlope(fitted.theta, size, point, i, j),
  };
}
