import { largestEntry, type Matrix } from "../numerics/matrix.ts";
import type { Point } from "../systems/demand-system.ts";
import type { FittedCoefficients } from "../systems/index.ts";
import { SYSTEMS } from "../systems/index.ts";
import type { RestrictionName } from "../systems/names.ts";
import { type SlutskyEigenvalue, slutskyEigenvalues } from "./eigenvalues.ts";
import { evaluateAt } from "./evaluation.ts";
import { slutskyDerivatives, slutskyMatrix } from "./slutsky-matrix.ts";

/** Laws that hold by construction hold to rounding; this leaves room for it and for nothing else. */
export const TOLERANCE = 1e-8;

/** Entries of the share form far above one, as far from the sample, carry rounding in proportion. */
export function toleranceOf(largest: number): number {
  return TOLERANCE * Math.max(1, largest);
}

export type LawStatus = "imposed" | "by form" | "free";

/** The five laws at a point. */
export interface LawsAtPoint {
  pointName: string;
  tolerance: number;
  /** max|ι'K|. */
  addingUp: { size: number; holds: boolean };
  /** max|Kι|. */
  homogeneity: { size: number; holds: boolean; status: LawStatus };
  /** max|k_ij − k_ji|. */
  symmetry: { size: number; holds: boolean; status: LawStatus };
  /** Stated only under homogeneity: without it ½(K + K') is indefinite by construction. */
  negativity: {
    stated: boolean;
    largest?: number;
    standardError?: number;
    interval?: [number, number];
    holds?: boolean;
  };
  monotonicity: { holds: boolean; lowest: number; highest: number };
}

/** Whether a law is imposed on the estimates, holds by the functional form, or is free. */
export function lawStatus(
  { form, imposed, goods }: Pick<FittedCoefficients, "form" | "imposed" | "goods">,
  law: RestrictionName,
): LawStatus {
  if (SYSTEMS[form].heldByForm.includes(law)) return "by form";
  // Of two goods that add up, homogeneity leaves one entry free: K is symmetric.
  if (law === "symmetry" && goods.length === 2 && imposed.includes("homogeneity")) return "imposed";
  // In share equations that add up, symmetry implies homogeneity.
  return imposed.includes(law) || (law === "homogeneity" && imposed.includes("symmetry")) ? "imposed" : "free";
}

/** Whether the fitted system states negativity anywhere: where homogeneity is imposed or holds by form. */
export function statesNegativity(fitted: Pick<FittedCoefficients, "form" | "imposed" | "goods">): boolean {
  return lawStatus(fitted, "homogeneity") !== "free";
}

/** max|ι'K|, max|Kι| and max|k_ij − k_ji|. */
export function lawSizes(k: Matrix): { addingUp: number; homogeneity: number; symmetry: number } {
  let addingUp = 0;
  let homogeneity = 0;
  let symmetry = 0;
  for (let i = 0; i < k.length; i++) {
    let column = 0;
    let row = 0;
    for (let j = 0; j < k.length; j++) {
      column += k[j][i];
      row += k[i][j];
      symmetry = Math.max(symmetry, Math.abs(k[i][j] - k[j][i]));
    }
    addingUp = Math.max(addingUp, Math.abs(column));
    homogeneity = Math.max(homogeneity, Math.abs(row));
  }
  return { addingUp, homogeneity, symmetry };
}

/** The laws from a matrix, its shares and its eigenvalues (none without homogeneity). */
export function lawsOf(
  fitted: Pick<FittedCoefficients, "form" | "imposed" | "goods">,
  pointName: string,
  matrix: Matrix,
  shares: readonly number[],
  eigenvalues: readonly SlutskyEigenvalue[],
): LawsAtPoint {
  const sizes = lawSizes(matrix);
  const tolerance = toleranceOf(largestEntry(matrix));
  const [largest] = eigenvalues;
  const lowest = Math.min(...shares);
  const highest = Math.max(...shares);
  return {
    pointName,
    tolerance,
    addingUp: { size: sizes.addingUp, holds: sizes.addingUp <= tolerance },
    homogeneity: {
      size: sizes.homogeneity,
      holds: sizes.homogeneity <= tolerance,
      status: lawStatus(fitted, "homogeneity"),
    },
    symmetry: { size: sizes.symmetry, holds: sizes.symmetry <= tolerance, status: lawStatus(fitted, "symmetry") },
    negativity:
      largest === undefined
        ? { stated: false }
        : {
            stated: true,
            largest: largest.value,
            standardError: largest.standardError,
            holds: largest.value <= TOLERANCE,
          },
    monotonicity: { holds: lowest >= 0 && highest <= 1, lowest, highest },
  };
}

/** The laws at a point without the rest of the matrix: adding-up, homogeneity, symmetry, negativity, monotonicity. */
export function theoryChecksAt(fitted: FittedCoefficients, point: Point, pointName: string): LawsAtPoint {
  const { slopes, derivatives } = evaluateAt(fitted, point);
  const matrix = slutskyMatrix(slopes);
  const eigenvalues = statesNegativity(fitted)
    ? slutskyEigenvalues(matrix, slutskyDerivatives(slopes, derivatives), fitted.covariance, fitted.goods)
    : [];
  return lawsOf(fitted, pointName, matrix, slopes.shares, eigenvalues);
}
