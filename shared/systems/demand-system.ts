import type { Matrix } from "../numerics/matrix.ts";
import type { InteractionName, PriceIndexName, RestrictionName, SystemName } from "./names.ts";

export type { Matrix };

/**
 * What every demand system declares of itself, and the functions everything else is computed from.
 *
 * Shapes: n goods, s demographics, k coefficients. Matrices are rows of numbers (`Matrix`), first
 * index the good. Coefficients are those of all n goods; nothing here knows which good an estimator
 * dropped. Prices and total are positive levels in the units of estimation (normalised or not).
 */

/** Where a system is evaluated: prices p (n), total expenditure x, demographics z (s). */
export interface Point {
  readonly prices: readonly number[];
  readonly total: number;
  readonly demographics: readonly number[];
}

/** A price index without parameters, with the sample means its weights and base prices are (LA-AIDS). */
export interface PriceIndex {
  readonly name: PriceIndexName;
  /** w̄, weighted sample means of the shares, n. */
  readonly meanShares: readonly number[];
  /** p̄, weighted sample means of the prices in units of estimation, n; 1 where the data are normalised. */
  readonly meanPrices: readonly number[];
}

/** What EASI is made of: the degree of its Engel curves and the products beside main effects. */
export interface EasiSize {
  readonly degree: number;
  readonly interactions: readonly InteractionName[];
}

/** What fixes the length and meaning of the coefficient vector. */
export interface SystemSize {
  readonly goods: number;
  readonly demographics: number;
  /** α₀ of the translog index, fixed and not estimated; ignored by systems without one. */
  readonly alpha0: number;
  /** Needed to evaluate LA-AIDS at a point; not for its layout, moments or free form. */
  readonly index?: PriceIndex;
  /** Needed by EASI, whose layout it fixes. */
  readonly easi?: EasiSize;
  /** Weighted means of the observed shares, n: what a system in differences is evaluated at. */
  readonly meanShares?: readonly number[];
}

/** One coefficient of θ: which block, which good (equation), and which price or demographic it belongs to. */
export interface CoefficientPlace {
  /** "alpha" | "demographic" | "gamma" | "beta" | "committed" | "marginal" … the system's own block name. */
  readonly block: string;
  readonly good: number;
  /** Price index j of γ_ij, demographic index k of α_ik; absent for blocks with one coefficient a good. */
  readonly column?: number;
}

/**
 * What the columns of a block are: powers of real expenditure from the first, or products; "goods by demographics"
 * runs over the goods of the first demographic, then of the next.
 */
export type BlockColumns =
  | "one"
  | "goods"
  | "demographics"
  | "powers"
  | "demographics by expenditure"
  | "goods by expenditure"
  | "goods by demographics";

/** A block as tables print it: symbol and how many columns it has for each good. */
export interface CoefficientBlock {
  readonly name: string;
  readonly symbol: string;
  readonly columns: BlockColumns;
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

/**
 * A system at fixed θ, evaluated again and again without allocating: `at` overwrites the arrays it
 * carries. What a million rows are checked with; `slopes` is one call of it.
 *
 * Where the system predicts no shares at a point, `at` throws nothing and leaves NaN in every share: not defined
 * here (`notDefined` of the system says why, in words). Its slopes are then of no meaning.
 */
export interface Evaluator {
  /** w_i, n. */
  readonly shares: Float64Array;
  /** μ_i, n. */
  readonly total: Float64Array;
  /** μ_ij, n × n row by row. */
  readonly prices: Float64Array;
  at(logPrices: ArrayLike<number>, logTotal: number, demographics: ArrayLike<number>): void;
  /**
   * Systems whose shares go on where utility has ended (QUAIDS): whether there is utility where `at` stands. Of
   * meaning only where the system has a cost function, that is under homogeneity and symmetry.
   */
  hasUtility?(): boolean;
  /** Systems in differences: stands at these observed shares, since none are predicted. */
  atShares?(shares: ArrayLike<number>): void;
}

/** One price slope as its formula and numbers: μ_ij = Σ of the terms, each a sign and a product. */
export interface PriceSlopeTerm {
  readonly sign: 1 | -1;
  readonly factors: readonly { readonly symbol: string; readonly value: number }[];
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

/**
 * Linear restrictions θ = S φ + s with φ free: how theory and adding-up are imposed. The free
 * coefficients are some of those of θ: φ_f = θ[places[f]].
 */
export interface FreeForm {
  /** S, k × f. */
  readonly matrix: Matrix;
  /** s, k. */
  readonly offset: number[];
  /** Where in θ each free coefficient stands, f. */
  readonly places: number[];
}

/**
 * Cost and utility, for systems that have them; meaningful under symmetry and homogeneity. Both are
 * NaN where the system defines none (LES with committed expenditure above the total).
 */
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
  /** Derivatives of `logCost`, where it is defined. */
  logCostDerivatives(
    theta: readonly number[],
    size: SystemSize,
    utility: number,
    prices: readonly number[],
    demographics: readonly number[],
  ): CostDerivatives;
}

/** Of ln c(u, p; z): ∂/∂u with prices and coefficients held, and ∂/∂θ (k) with utility and prices held. */
export interface CostDerivatives {
  readonly utility: number;
  readonly theta: number[];
}

export interface DemandSystem {
  readonly name: SystemName;
  /**
   * "levels": shares are a function of prices, total and demographics. "differences": only their changes from
   * one period to the next are explained (Rotterdam), and the slopes stand at observed shares.
   */
  readonly kind: "levels" | "differences";
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
  /**
   * Adding-up always; homogeneity and symmetry when named. In share equations that add up, symmetry
   * implies homogeneity, so naming symmetry alone imposes both.
   */
  free(size: SystemSize, impose: readonly RestrictionName[]): FreeForm;
  evaluator(theta: readonly number[], size: SystemSize): Evaluator;
  /**
   * Why there are points at which the system is not defined, as a clause: what its evaluator answers with NaN or
   * without utility, and `slopes` (where there are no shares) with a `RangeError`. Absent where there are none.
   */
  readonly notDefined?: string;
  slopes(theta: readonly number[], size: SystemSize, point: Point): Slopes;
  slopeDerivatives(theta: readonly number[], size: SystemSize, point: Point): SlopeDerivatives;
  /**
   * The function of (p, x) whose derivatives at `point` the slopes are, where that is not `slopes().shares`
   * itself: LA-AIDS holds the index's weights fixed at their values at `point`.
   */
  sharesNear?(theta: readonly number[], size: SystemSize, point: Point): (nearby: Point) => number[];
  /** μ_ij in the terms of the system's own formula. */
  explainPriceSlope(theta: readonly number[], size: SystemSize, point: Point, i: number, j: number): PriceSlopeTerm[];
  readonly moments: MomentForm;
  /** The same coefficients where the responses are expenditures p_i q_i in units of estimation. */
  readonly expenditureMoments?: MomentForm;
  /** Why there is no share function, in a system in differences. */
  readonly shareFunction?: { readonly absent: string };
  /** Where iteration starts: θ (k) that satisfies every restriction, from the mean shares (n). */
  start(size: SystemSize, meanShares: readonly number[]): number[];
  /** Absent with a reason where there is none (LA-AIDS): welfare refuses it and names the exact system. */
  readonly cost: CostFunction | { readonly absent: string };
}
