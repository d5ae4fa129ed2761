import type { Matrix } from "../numerics/matrix.ts";
import type { InteractionName, PriceIndexName } from "./names.ts";

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
