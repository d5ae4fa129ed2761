import { symmetricEigen } from "../numerics/eigen.ts";
import type { Matrix } from "../numerics/matrix.ts";
import type { Point } from "../systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../systems/index.ts";
import { type LawsAtPoint, statesNegativity } from "./checks.ts";
import { withoutNullDirection } from "./null-direction.ts";
import { percentileInterval } from "./percentile.ts";
import { slutskyMatrix } from "./slutsky-matrix.ts";

export interface MatrixInterval {
  readonly low: Matrix;
  readonly high: Matrix;
}

/** 95 % percentile intervals of a Slutsky matrix at a point, from bootstrap draws of the coefficients. */
export interface DrawnIntervals {
  /** Draws at which the system is defined there. */
  readonly draws: number;
  /** Of k_ij. */
  readonly share: MatrixInterval;
  /** Of ε*_ij = k_ij/w_i, the share drawn too. */
  readonly compensated: MatrixInterval;
  /** Of the r-th largest eigenvalue of each draw, n − 1; none without homogeneity. */
  readonly eigenvalues: [low: number, high: number][];
}

/** Fewer draws than these have no 2.5 % tails to speak of. */
export const FEWEST_DRAWS = 40;

/**
 * Percentile intervals (`percentileInterval`) of the matrix and its eigenvalues over `draws` of θ (replicates × k), at
 * one point in units of estimation. Eigenvalues are taken by rank within each draw, as the finding lists its own.
 * Absent where fewer than `FEWEST_DRAWS` draws define the system there.
 */
export function drawnIntervals(
  fitted: FittedCoefficients,
  draws: readonly (readonly number[])[],
  { prices, total, demographics }: Point,
): DrawnIntervals | undefined {
  const { system, size } = systemOf(fitted);
  const logPrices = prices.map(Math.log);
  const goods = fitted.goods.map((_, i) => i);
  const drawn = draws.flatMap((theta) => {
    const evaluator = system.evaluator(theta, size);
    evaluator.at(logPrices, Math.log(total), demographics);
    const shares = Array.from(evaluator.shares);
    if (!shares.every(Number.isFinite)) return [];
    const rows = goods.map((i) => Array.from(evaluator.prices.subarray(i * goods.length, (i + 1) * goods.length)));
    return [{ shares, share: slutskyMatrix({ shares, total: Array.from(evaluator.total), prices: rows }) }];
  });
  if (drawn.length < FEWEST_DRAWS) return undefined;
  const spectra = statesNegativity(fitted)
    ? drawn.map(({ share }) => symmetricEigen(withoutNullDirection(share)).values)
    : [];
  return {
    draws: drawn.length,
    share: matrixInterval(drawn.map(({ share }) => share)),
    compensated: matrixInterval(drawn.map(({ share, shares }) => share.map((row, i) => row.map((k) => k / shares[i])))),
    eigenvalues: (spectra[0] ?? []).map((_, r) => percentileInterval(spectra.map((values) => values[r]))),
  };
}

/** The laws at the point with the interval of the largest eigenvalue, where there are draws and negativity is stated. */
export function withDrawnLargest(laws: LawsAtPoint, drawn: DrawnIntervals | undefined): LawsAtPoint {
  const interval = drawn?.eigenvalues[0];
  return interval === undefined ? laws : { ...laws, negativity: { ...laws.negativity, interval } };
}

function matrixInterval(drawn: readonly Matrix[]): MatrixInterval {
  const ends = drawn[0].map((row, i) => row.map((_, j) => percentileInterval(drawn.map((matrix) => matrix[i][j]))));
  return { low: ends.map((row) => row.map(([low]) => low)), high: ends.map((row) => row.map(([, high]) => high)) };
}
