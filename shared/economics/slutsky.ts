import { type Matrix, standardError } from "../numerics/matrix.ts";
import type { Point } from "../systems/demand-system.ts";
import type { FittedCoefficients } from "../systems/index.ts";
import { type LawsAtPoint, lawsOf, statesNegativity } from "./checks.ts";
import { type SlutskyEigenvalue, slutskyEigenvalues } from "./eigenvalues.ts";
import { compensatedGradient, nonZeroShares } from "./elasticities.ts";
import { evaluateAt } from "./evaluation.ts";
import { quantityFactors, slutskyDerivatives, slutskyMatrix } from "./slutsky-matrix.ts";

/** Divisors that lead from units of estimation back to those uploaded, and what the point is called. */
export interface MatrixOptions {
  /** Uploaded price = price of estimation × priceScale, n. */
  readonly priceScale: readonly number[];
  /** Uploaded total = total of estimation × totalScale. */
  readonly totalScale: number;
  readonly pointName: string;
  /** Called between rows of many goods, which take seconds; may throw. */
  readonly poll?: () => void;
}

/** The Slutsky matrix at a point, its errors, eigenvalues and laws. */
export interface SlutskyAtPoint {
  /** w_i, the model's own predictions, n. */
  shares: number[];
  /** μ_i, n, and μ_ij, n × n. */
  totalSlopes: number[];
  priceSlopes: Matrix;
  /** k_ij. */
  share: Matrix;
  shareErrors: Matrix;
  /** S_ij = x/(p_i p_j) k_ij in units uploaded. */
  quantity: Matrix;
  quantityErrors: Matrix;
  /** ε*_ij = k_ij/w_i. */
  compensated: Matrix;
  compensatedErrors: Matrix;
  /** n − 1 of them, largest first; none without homogeneity. */
  eigenvalues: SlutskyEigenvalue[];
  checks: LawsAtPoint;
}

/**
 * The checked Slutsky matrix of a fitted system at a point (p, x, z) in units of estimation.
 *
 * Shares are predicted ones. Standard errors are √(g'V g) with g the exact derivative in θ; those of the
 * compensated elasticities let the share in the denominator move too.
 *
 * Errors: a point of other lengths than the system's; a predicted share of exactly zero, by which no
 * elasticity can be divided.
 */
export function matrixAt(fitted: FittedCoefficients, point: Point, options: MatrixOptions): SlutskyAtPoint {
  const { slopes, derivatives } = evaluateAt(fitted, point);
  const { priceScale, totalScale, pointName, poll = () => {} } = options;
  if (priceScale.length !== fitted.goods.length) {
    throw new RangeError(`priceScale has ${priceScale.length} entries, the system has ${fitted.goods.length} goods`);
  }
  const shares = nonZeroShares(slopes.shares, fitted.goods);
  const share = slutskyMatrix(slopes);
  const gradients = slutskyDerivatives(slopes, derivatives);
  const shareErrors = gradients.map((row) => {
    poll();
    return row.map((gradient) => standardError(fitted.covariance, gradient));
  });
  const factors = quantityFactors(
    point.prices.map((price, i) => price * priceScale[i]),
    point.total * totalScale,
  );
  const eigenvalues = statesNegativity(fitted)
    ? slutskyEigenvalues(share, gradients, fitted.covariance, fitted.goods)
    : [];
  return {
    shares,
    totalSlopes: slopes.total,
    priceSlopes: slopes.prices,
    share,
    shareErrors,
    quantity: share.map((row, i) => row.map((entry, j) => entry * factors[i][j])),
    quantityErrors: shareErrors.map((row, i) => row.map((error, j) => error * factors[i][j])),
    compensated: share.map((row, i) => row.map((entry) => entry / shares[i])),
    compensatedErrors: share.map((row, i) => {
      poll();
      return row.map((entry, j) =>
        standardError(fitted.covariance, compensatedGradient(entry, gradients[i][j], shares[i], derivatives.shares[i])),
      );
    }),
    eigenvalues,
    checks: lawsOf(fitted, pointName, share, shares, eigenvalues),
  };
}
