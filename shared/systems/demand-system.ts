import type { RestrictionName, SystemName } from "./names.ts";

/**
 * What every demand system declares of itself, and the functions everything else is computed from.
 *
 * Shapes: n goods, s demographics, k coefficients. Matrices are rows of numbers (`Matrix`), first
 * index the good. Coefficients are those of all n goods; nothing here knows which good an estimator
 * dropped. Prices and total are positive levels in the units of estimation (normalised or not).
 */

/** Rows of numbers; `matrix[i][j]` is row i, column j. */
export type Matrix = number[][];

/** Where a system is evaluated: prices p (n), total expenditure x, demographics z (s). */
export interface Point {
  readonly prices: readonly number[];
  readonly total: number;
  readonly demographics: readonly number[];
}

/** What fixes the length and meaning of the coefficient vector. */
export interface SystemSize {
  readonly goods: number;
  readonly demographics: number;
  /** α₀ of the translog index, fixed and not estimated; ignored by systems without one. */
  readonly alpha0: number;
}

/** One coefficient of θ: which block, which good (equation), and which price or demographic it belongs to. */
export interface CoefficientPlace {
  /** "alpha" | "demographic" | "gamma" | "beta" | "committed" | "marginal" … the system's own block name. */
  readonly block: string;
  readonly good: number;
  /** Price index j of γ_ij, demographic index k of α_ik; absent for blocks with one coefficient a good. */
  readonly column?: number;
}

/** A block as tables print it: symbol and how many columns it has for each good. */
export interface CoefficientBlock {
  readonly name: string;
  readonly symbol: string;
  readonly columns: "one" | "goods" | "demographics";
}

/** Shares and their slopes at a point. */
export interface Slopes {
  /** w_i, n. */
  readonly shares: number[];
  /** μ_i = ∂w_i/∂ln x, n. */
  readonly total: number[];
  /** μ_ij = ∂w_i/∂ln p_j, n × n. */
  readonly prices: Matrix;
}

/** Derivatives with respect to θ (k) of everything in `Slopes`, for the exact delta method. */
export interface SlopeDerivatives {
  /** ∂w_i/∂θ, n × k. */
  readonly shares: Matrix;
  /** ∂μ_i/∂θ, n × k. */
  readonly total: Matrix;
  /** ∂μ_ij/∂θ, n × n × k. */
  readonly prices: number[][][];
}

/**
 * One term of the row vector Z in which the share equations are linear: e = w − C(θ)·Z.
 * Base columns are named; a term is the constant, one base column, or a product of two.
 */
export type BaseColumn =
  | { readonly kind: "log price"; readonly good: number }
  | { readonly kind: "log total" }
  | { readonly kind: "demographic"; readonly index: number }
  | { readonly kind: "price over total"; readonly good: number }
  /** ln(x/P) with P an index without parameters (LA-AIDS); the estimator asks the data for it. */
  | { readonly kind: "deflated log total" };

export type MomentTerm =
  | { readonly kind: "constant" }
  | { readonly kind: "column"; readonly column: BaseColumn }
  | { readonly kind: "product"; readonly left: BaseColumn; readonly right: BaseColumn };

/** The representation that lets a likelihood be computed from second moments alone (methods section 6). */
export interface MomentForm {
  /** The terms of Z, in order; the first is the constant. */
  terms(size: SystemSize): MomentTerm[];
  /** C(θ), n × |Z|: predicted shares are C(θ)·Z. */
  coefficients(theta: readonly number[], size: SystemSize): Matrix;
  /** ∂C/∂θ_a for each coefficient a, as sparse entries [good, term, value]. */
  derivatives(theta: readonly number[], size: SystemSize): [good: number, term: number, value: number][][];
}

/** Linear restrictions θ = S φ + s with φ free: how theory and adding-up are imposed. */
export interface FreeForm {
  /** S, k × f. */
  readonly matrix: Matrix;
  /** s, k. */
  readonly offset: number[];
}

/** Cost and utility, for systems that have them; meaningful under symmetry and homogeneity. */
export interface CostFunction {
  /** ln c(u, p; z). */
  logCost(
    theta: readonly number[],
    size: SystemSize,
    utility: number,
    prices: readonly number[],
    demographics: readonly number[],
  ): number;
  /** u = v(p, x; z): `logCost` solved for utility. */
  utility(theta: readonly number[], size: SystemSize, point: Point): number;
}

export interface DemandSystem {
  readonly name: SystemName;
  /** As a table or sentence calls it, e.g. "almost ideal demand system". */
  readonly longName: string;
  /** Authors, year, journal. */
  readonly source: string;
  readonly blocks: readonly CoefficientBlock[];
  /** Laws that hold by the functional form itself, whatever θ (LES: homogeneity and symmetry). */
  readonly heldByForm: readonly RestrictionName[];
  /** False where the system takes no demographics (yet): a specification naming some is refused. */
  readonly takesDemographics: boolean;
  layout(size: SystemSize): CoefficientPlace[];
  /** Adding-up always; homogeneity and symmetry when named. */
  free(size: SystemSize, impose: readonly RestrictionName[]): FreeForm;
  slopes(theta: readonly number[], size: SystemSize, point: Point): Slopes;
  slopeDerivatives(theta: readonly number[], size: SystemSize, point: Point): SlopeDerivatives;
  readonly moments: MomentForm;
  /** Where iteration starts, free form coefficients, from mean shares (n) and the means of Z's base columns. */
  start(size: SystemSize, meanShares: readonly number[]): number[];
  /** Absent with a reason where there is none (LA-AIDS): welfare refuses it and names the exact system. */
  readonly cost: CostFunction | { readonly absent: string };
}
