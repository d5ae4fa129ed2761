import type { Matrix } from "../numerics/matrix.ts";
import type { CoefficientBlock, CoefficientPlace, FreeForm, SystemSize } from "./coefficient-layout.ts";
import type { MomentForm } from "./moment-form.ts";
import type { RestrictionName, SystemName } from "./names.ts";
import type { StraightCoordinates } from "./straight-coordinates.ts";

export type {
  BlockColumns,
  CoefficientBlock,
  CoefficientPlace,
  EasiSize,
  FreeForm,
  PriceIndex,
  SystemSize,
} from "./coefficient-layout.ts";
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
 * Cost and utility, for systems that have them; meaningful under symmetry and homogeneity. Both are
 * NaN where the system defines none (LES with committed expenditure above the total).
 */
export interface CostFunction {
  /** The same two, for many households: nothing is allocated from one to the next. */
  evaluator(theta: readonly number[], size: SystemSize): CostEvaluator;
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

/** Utility and cost at fixed θ in logs of prices and total, without allocating; NaN where the system defines none. */
export interface CostEvaluator {
  /** v(p, x; z). */
  utility(logPrices: ArrayLike<number>, logTotal: number, demographics: ArrayLike<number>): number;
  /** ln c(u, p; z). */
  logCost(logPrices: ArrayLike<number>, utility: number, demographics: ArrayLike<number>): number;
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
  /** Coordinates for an estimator whose iteration in the coefficients does not end. */
  readonly straight?: (size: SystemSize) => StraightCoordinates;
  /** Where iteration starts: θ (k) that satisfies every restriction, from the mean shares (n). */
  start(size: SystemSize, meanShares: readonly number[]): number[];
  /** Absent with a reason where there is none (LA-AIDS): welfare refuses it and names the exact system. */
  readonly cost: CostFunction | { readonly absent: string };
}
