import { symmetricEigen, withPositiveLargest } from "../numerics/eigen.ts";
import { LargestEigenvalue } from "../numerics/largest-eigenvalue.ts";
import { type FittedCoefficients, systemOf } from "../systems/index.ts";
import { lawStatus, statesNegativity, TOLERANCE } from "./checks.ts";
import { overGoods, projectSymmetricPart } from "./null-direction.ts";

/** Checks one row after another; every answer is about the row last given to `evaluate`. */
export interface RowChecker {
  /** False without homogeneity: then nothing here about negativity is defined. */
  readonly statesNegativity: boolean;
  /** Predicted shares, overwritten by each row, n. */
  readonly shares: Float64Array;
  /** Evaluates the system at a row's log prices, log total and demographics, in units of estimation. */
  evaluate(logPrices: ArrayLike<number>, logTotal: number, demographics: ArrayLike<number>): void;
  /** In a system in differences: stands at a row's own observed shares. */
  evaluateAtShares?(shares: ArrayLike<number>): void;
  /**
   * Whether the system is defined there: predicts shares and, where it has a cost function that may end before they
   * do (QUAIDS), has utility. Where it is not, the answers below mean nothing.
   */
  isDefined(): boolean;
  lowestShare(): number;
  highestShare(): number;
  /** Predicted shares within [0, 1]. */
  monotonicityHolds(): boolean;
  /** Whether the largest eigenvalue away from the null direction is within tolerance: one Cholesky factorisation. */
  negativityHolds(): boolean;
  /** That eigenvalue. */
  largestEigenvalue(): number;
  /** Its unit eigenvector over the goods, largest entry positive; the only call that allocates. */
  vector(): number[];
}

/**
 * A checker of negativity and monotonicity at each row of a sample, at the row's own prices, total and
 * demographics. Nothing is allocated per row: a million rows of twelve goods take seconds.
 */
export function createRowChecker(fitted: Omit<FittedCoefficients, "covariance">): RowChecker {
  const { system, size } = systemOf(fitted);
  const n = size.goods;
  const { shares, total, prices, at, atShares, hasUtility } = system.evaluator(fitted.theta, size);
  const matrix = new Float64Array(n * n);
  const projected = new Float64Array((n - 1) * (n - 1));
  const scratch = new Float64Array(n);
  const solver = new LargestEigenvalue(n - 1);
  const stated = statesNegativity(fitted);
  const hasCost = (["homogeneity", "symmetry"] as const).every((law) => lawStatus(fitted, law) !== "free");
  const needsUtility = hasCost ? hasUtility : undefined;

  /** k_ij = μ_ij − w_i δ_ij + (w_i + μ_i) w_j, then the null direction set aside. */
  const projectMatrix = () => {
    if (!stated) throw new RangeError("negativity is not stated where homogeneity is not imposed");
    for (let i = 0; i < n; i++) {
      const marginal = shares[i] + total[i];
      for (let j = 0; j < n; j++) matrix[i * n + j] = prices[i * n + j] + marginal * shares[j];
      matrix[i * n + i] -= shares[i];
    }
    projectSymmetricPart(matrix, n, projected, scratch);
  };
  const extreme = (of: (a: number, b: number) => number) => {
    let value = shares[0];
    for (let i = 1; i < n; i++) value = of(value, shares[i]);
    return value;
  };
  const lowestShare = () => extreme(Math.min);
  const highestShare = () => extreme(Math.max);
  return {
    statesNegativity: stated,
    shares,
    evaluate: at,
    ...(atShares && { evaluateAtShares: atShares }),
    isDefined: () => !Number.isNaN(shares[0]) && (needsUtility?.() ?? true),
    lowestShare,
    highestShare,
    monotonicityHolds: () => lowestShare() >= 0 && highestShare() <= 1,
    negativityHolds: () => {
      projectMatrix();
      return solver.allBelow(projected, TOLERANCE);
    },
    largestEigenvalue: () => {
      projectMatrix();
      return solver.of(projected);
    },
    vector: () => {
      projectMatrix();
      const rows = Array.from({ length: n - 1 }, (_, i) =>
        Array.from(projected.subarray(i * (n - 1), (i + 1) * (n - 1))),
      );
      return withPositiveLargest(overGoods(symmetricEigen(rows).vectors[0]));
    },
  };
}
