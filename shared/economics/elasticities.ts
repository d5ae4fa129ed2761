import { type Matrix, standardError } from "../numerics/matrix.ts";
import type { Point } from "../systems/demand-system.ts";
import type { FittedCoefficients } from "../systems/index.ts";
import { combined, evaluateAt } from "./evaluation.ts";
import { slutskyDerivatives, slutskyMatrix } from "./slutsky-matrix.ts";

/** Elasticities at a point with standard errors by the exact-derivative delta method; shares are predicted ones. */
export interface Elasticities {
  readonly shares: number[];
  /** η_i = 1 + μ_i/w_i, n. */
  readonly expenditure: number[];
  readonly expenditureErrors: number[];
  /** ε_ij = μ_ij/w_i − δ_ij (Marshall), n × n. */
  readonly uncompensated: Matrix;
  readonly uncompensatedErrors: Matrix;
  /** ε*_ij = ε_ij + η_i w_j = k_ij/w_i (Hicks), n × n. */
  readonly compensated: Matrix;
  readonly compensatedErrors: Matrix;
}

/**
 * Expenditure, uncompensated and compensated elasticities at (p, x, z).
 *
 * Error: a predicted share of exactly zero, by which nothing can be divided.
 */
export function elasticitiesAt(fitted: FittedCoefficients, point: Point): Elasticities {
  const { slopes, derivatives } = evaluateAt(fitted, point);
  const { total, prices } = slopes;
  const shares = nonZeroShares(slopes.shares, fitted.goods);
  const errorOf = (gradient: readonly number[]) => standardError(fitted.covariance, gradient);
  const matrix = slutskyMatrix(slopes);
  const matrixGradients = slutskyDerivatives(slopes, derivatives);
  return {
    shares,
    expenditure: shares.map((share, i) => 1 + total[i] / share),
    expenditureErrors: shares.map((share, i) =>
      errorOf(ratioGradient(total[i], derivatives.total[i], share, derivatives.shares[i])),
    ),
    uncompensated: prices.map((row, i) => row.map((slope, j) => slope / shares[i] - (i === j ? 1 : 0))),
    uncompensatedErrors: prices.map((row, i) =>
      row.map((slope, j) => errorOf(ratioGradient(slope, derivatives.prices[i][j], shares[i], derivatives.shares[i]))),
    ),
    compensated: matrix.map((row, i) => row.map((entry) => entry / shares[i])),
    compensatedErrors: matrix.map((row, i) =>
      row.map((entry, j) =>
        errorOf(compensatedGradient(entry, matrixGradients[i][j], shares[i], derivatives.shares[i])),
      ),
    ),
  };
}

/** ∂(a/w)/∂θ = ∂a/w − a ∂w/w². */
function ratioGradient(
  value: number,
  gradient: readonly number[],
  share: number,
  shareGradient: readonly number[],
): number[] {
  return combined([1 / share, gradient], [-value / share ** 2, shareGradient]);
}

/** ∂ε*_ij/∂θ from k_ij, ∂k_ij/∂θ, w_i and ∂w_i/∂θ. */
export function compensatedGradient(
  entry: number,
  gradient: readonly number[],
  share: number,
  shareGradient: readonly number[],
): number[] {
  return ratioGradient(entry, gradient, share, shareGradient);
}

/** The shares, refused where one is exactly zero. */
export function nonZeroShares(shares: number[], goods: readonly string[]): number[] {
  const zero = shares.indexOf(0);
  if (zero >= 0)
    throw new RangeError(`the predicted share of ${goods[zero]} is 0: it has no elasticities at this point`);
  return shares;
}
