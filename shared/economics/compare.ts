import { largestEntry, type Matrix } from "../numerics/matrix.ts";
import type { LawsAtPoint } from "./checks.ts";
import type { SlutskyAtPoint } from "./slutsky.ts";

/** How far a recomputed matrix is from the sealed one: the largest differences, part by part. */
export interface MatrixComparison {
  /** Shares, slopes, share form and compensated elasticities; no units. */
  readonly matrix: number;
  /** Quantity form and its errors relative to its largest entry, since its units are the upload's. */
  readonly quantity: number;
  /** Standard errors of share form and elasticities. */
  readonly standardErrors: number;
  /** Eigenvalues and their standard errors. */
  readonly eigenvalues: number;
  /** Sizes the laws are judged by. */
  readonly checks: number;
  /** Every law is judged alike. */
  readonly verdictsAgree: boolean;
  /** The largest of all. */
  readonly largest: number;
}

/** Compares two matrices at one point; refuses when they are of different sizes. */
export function compareMatrices(sealed: SlutskyAtPoint, recomputed: SlutskyAtPoint): MatrixComparison {
  const quantityScale = Math.max(largestEntry(sealed.quantity), Number.MIN_VALUE);
  const errorScale = Math.max(largestEntry(sealed.quantityErrors), quantityScale);
  const parts = {
    matrix: Math.max(
      between([sealed.shares], [recomputed.shares], "shares"),
      between([sealed.totalSlopes], [recomputed.totalSlopes], "total slopes"),
      between(sealed.priceSlopes, recomputed.priceSlopes, "price slopes"),
      between(sealed.share, recomputed.share, "share form"),
      between(sealed.compensated, recomputed.compensated, "compensated elasticities"),
    ),
    quantity: Math.max(
      between(sealed.quantity, recomputed.quantity, "quantity form") / quantityScale,
      between(sealed.quantityErrors, recomputed.quantityErrors, "errors of the quantity form") / errorScale,
    ),
    standardErrors: Math.max(
      between(sealed.shareErrors, recomputed.shareErrors, "standard errors"),
      between(sealed.compensatedErrors, recomputed.compensatedErrors, "errors of the elasticities"),
    ),
    eigenvalues: between(spectrum(sealed), spectrum(recomputed), "eigenvalues"),
    checks: between([sizesOf(sealed.checks)], [sizesOf(recomputed.checks)], "checks"),
  };
  return {
    ...parts,
    verdictsAgree: verdictsOf(sealed.checks) === verdictsOf(recomputed.checks),
    largest: Math.max(...Object.values(parts)),
  };
}

function between(sealed: Matrix, recomputed: Matrix, name: string): number {
  if (sealed.length !== recomputed.length) {
    throw new RangeError(`${name}: ${sealed.length} rows are sealed, ${recomputed.length} were recomputed`);
  }
  let largest = 0;
  sealed.forEach((row, i) => {
    if (row.length !== recomputed[i].length) {
      throw new RangeError(`${name}: ${row.length} columns are sealed, ${recomputed[i].length} were recomputed`);
    }
    row.forEach((entry, j) => {
      largest = Math.max(largest, Math.abs(entry - recomputed[i][j]));
    });
  });
  return largest;
}

function spectrum({ eigenvalues }: SlutskyAtPoint): Matrix {
  return eigenvalues.map(({ value, standardError }) => [value, standardError]);
}

function sizesOf({ addingUp, homogeneity, symmetry, negativity, monotonicity }: LawsAtPoint): number[] {
  return [
    addingUp.size,
    homogeneity.size,
    symmetry.size,
    negativity.largest ?? 0,
    monotonicity.lowest,
    monotonicity.highest,
  ];
}

function verdictsOf({ addingUp, homogeneity, symmetry, negativity, monotonicity }: LawsAtPoint): string {
  return [
    addingUp.holds,
    homogeneity.holds,
    homogeneity.status,
    symmetry.holds,
    symmetry.status,
    negativity.stated,
    negativity.holds,
    monotonicity.holds,
  ].join();
}
