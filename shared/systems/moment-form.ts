import type { Matrix } from "../numerics/matrix.ts";
import type { CoefficientPlace, FreeForm, SystemSize } from "./coefficient-layout.ts";
import type { RestrictionName } from "./names.ts";

/**
 * One term of the row vector Z in which the share equations are linear: e = w − C(θ)·Z.
 * Base columns are named; a term is the constant, one base column, or a product of two.
 */
export type BaseColumn =
  | { readonly kind: "log price"; readonly good: number }
  | { readonly kind: "log total" }
  | { readonly kind: "demographic"; readonly index: number }
  | { readonly kind: "price over total"; readonly good: number }
  | { readonly kind: "price"; readonly good: number }
  | { readonly kind: "total" }
  /** Divisia's volume of all goods, whose change is Δln Q = Σ_i w̄_i Δln q_i (Rotterdam). */
  | { readonly kind: "log volume" }
  /** ln(x/P) with P an index without parameters (LA-AIDS); the estimator asks the data for it. */
  | { readonly kind: "deflated log total" }
  /** A power of y, real expenditure of EASI: by mean shares where it is linear, else implicit utility. */
  | { readonly kind: "real expenditure"; readonly power: number }
  /** A column that moves with θ, by its place among those of the form's `local`. */
  | { readonly kind: "local"; readonly index: number };

export type MomentTerm =
  | { readonly kind: "constant" }
  | { readonly kind: "column"; readonly column: BaseColumn }
  | { readonly kind: "product"; readonly left: BaseColumn; readonly right: BaseColumn }
  /** A product of more columns than two. */
  | { readonly kind: "monomial"; readonly factors: readonly BaseColumn[] };

/** A non-zero derivative: what multiplies a term in the equation of a good. */
export type MomentEntry = [good: number, term: number, value: number];

/**
 * The representation that lets a likelihood be computed from second moments alone (methods section 6).
 *
 * Where a form declares `local`, some base columns are functions of θ too: then Z is Z(θ), and the moments
 * are accumulated again at every θ the iteration stops at.
 */
export interface MomentForm {
  /** The terms of Z, in order; the first is the constant. */
  terms(size: SystemSize): MomentTerm[];
  /** C(θ), n × |Z|: predicted shares are C(θ)·Z, the latter at the same θ where it moves with it. */
  coefficients(theta: readonly number[], size: SystemSize): Matrix;
  /**
   * ∂ŵ/∂θ_a = D_a·Z for each coefficient a, D_a (n × |Z|) as sparse entries. Without `local` D_a is ∂C/∂θ_a;
   * with it D_a holds besides what the columns do as θ_a moves them, in terms of Z at that θ.
   */
  derivatives(theta: readonly number[], size: SystemSize): MomentEntry[][];
  readonly local?: LocalColumns;
}

/** Base columns that are functions of (θ, ln p, ln x, z, w) of their row. */
export interface LocalColumns {
  /** What a refusal calls each of them: "real expenditure squared over b(p)". */
  readonly labels: readonly string[];
  filler(theta: readonly number[], size: SystemSize): LocalFiller;
  /**
   * Terms that at θ are known combinations of others, none of them such a combination itself: their moments follow
   * from those of the others, which are then far from collinear.
   */
  combinations?(theta: readonly number[], size: SystemSize): TermCombination[];
  readonly from: NearbyForm;
}

/** Z_term = Σ weight · Z_other. */
export interface TermCombination {
  readonly term: number;
  readonly of: readonly (readonly [other: number, weight: number])[];
}

/** The local columns of a row at fixed θ: `at` overwrites `values` and allocates nothing. */
export interface LocalFiller {
  readonly values: Float64Array;
  /** w are the observed shares (EASI's implicit utility holds them). */
  at(logPrices: ArrayLike<number>, logTotal: number, demographics: ArrayLike<number>, shares: ArrayLike<number>): void;
}

/**
 * The form without local columns that is estimated first, from moments read once: where the iteration of
 * one with them starts.
 */
export interface NearbyForm {
  readonly moments: MomentForm;
  layout(size: SystemSize): CoefficientPlace[];
  free(size: SystemSize, impose: readonly RestrictionName[]): FreeForm;
  start(size: SystemSize, meanShares: readonly number[]): number[];
  /** θ of the larger system at which it predicts what the nearby one does at `theta`. */
  embed(theta: readonly number[], size: SystemSize): number[];
}
