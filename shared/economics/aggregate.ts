import { zeros } from "../numerics/matrix.ts";
import type { SlopeDerivatives, Slopes } from "../systems/demand-system.ts";
import type { ResponseGradients, Responses } from "./responses.ts";

/**
 * Responses of a group of rows, each row weighted by what it spends (h_t x_t, weight and total expenditure):
 *
 *     W_i = Σ_t h_t x_t w_it,   M_i = Σ_t h_t x_t μ_it,   M_ij = Σ_t h_t x_t μ_ijt,   K_ij = Σ_t h_t x_t k_ijt
 *
 * all divided by Σ_t h_t x_t. Elasticities formed from them as at a point, 1 + M_i/W_i and M_ij/W_i − δ_ij, are
 * those of the group's demand valued at the rows' own prices: what every row spending, or paying, one per cent more
 * does to the sum. They are the averages of the rows' elasticities weighted by each row's expenditure on good i,
 *
 *     η_i = Σ_t h_t x_t w_it η_it / Σ_t h_t x_t w_it
 *
 * as Banks, Blundell & Lewbel (1997, Review of Economics and Statistics 79, 527–539) average theirs, but never divide
 * by the share of a row, which may be next to nothing. Compensated ones compensate every row for itself, so
 * Engel's, Cournot's, homogeneity and symmetry hold between them, while ε* is not ε plus η times the group's share.
 */
export class AggregateResponses {
  readonly #n: number;
  readonly #sums: Responses;
  #weight = 0;

  constructor(goods: number) {
    this.#n = goods;
    this.#sums = {
      shares: new Array<number>(goods).fill(0),
      total: new Array<number>(goods).fill(0),
      prices: zeros(goods, goods),
      compensated: zeros(goods, goods),
    };
  }

  /** Adds a row; `weight` is its sampling weight times its total expenditure. */
  add({ shares, total, prices, compensated }: Responses, weight: number): void {
    this.#weight += weight;
    addTo(this.#sums.shares, shares, weight);
    addTo(this.#sums.total, total, weight);
    for (let i = 0; i < this.#n; i++) {
      addTo(this.#sums.prices[i], prices[i], weight);
      addTo(this.#sums.compensated[i], compensated[i], weight);
    }
  }

  result(): Responses {
    const { shares, total, prices, compensated } = this.#sums;
    const mean = (row: readonly number[]) => row.map((sum) => sum / this.#weight);
    return {
      shares: mean(shares),
      total: mean(total),
      prices: prices.map(mean),
      compensated: compensated.map(mean),
    };
  }
}

/**
 * Derivatives in θ of the aggregate responses: the same sums over the rows' derivatives. Rows are added by their
 * slopes, and ∂k_ij = ∂μ_ij + (w_j − δ_ij) ∂w_i + w_j ∂μ_i + (w_i + μ_i) ∂w_j is formed while summing.
 */
export class AggregateGradients {
  readonly #n: number;
  readonly #k: number;
  readonly #shares: Float64Array[];
  readonly #total: Float64Array[];
  /** Row by row, n². */
  readonly #prices: Float64Array[];
  readonly #compensated: Float64Array[];
  #weight = 0;

  constructor(goods: number, coefficients: number) {
    this.#n = goods;
    this.#k = coefficients;
    const rows = (count: number) => Array.from({ length: count }, () => new Float64Array(coefficients));
    this.#shares = rows(goods);
    this.#total = rows(goods);
    this.#prices = rows(goods * goods);
    this.#compensated = rows(goods * goods);
  }

  /** Adds a row by its slopes and their derivatives; `weight` as in `AggregateResponses`. */
  add({ shares, total }: Slopes, derivatives: SlopeDerivatives, weight: number): void {
    const n = this.#n;
    const k = this.#k;
    this.#weight += weight;
    for (let i = 0; i < n; i++) {
      const ofShare = derivatives.shares[i];
      const ofTotal = derivatives.total[i];
      addTo(this.#shares[i], ofShare, weight);
      addTo(this.#total[i], ofTotal, weight);
      const marginal = weight * (shares[i] + total[i]);
      for (let j = 0; j < n; j++) {
        const ofPrice = derivatives.prices[i][j];
        const ofOther = derivatives.shares[j];
        const byShare = weight * (shares[j] - (i === j ? 1 : 0));
        const byTotal = weight * shares[j];
        const prices = this.#prices[i * n + j];
        const compensated = this.#compensated[i * n + j];
        for (let a = 0; a < k; a++) {
          const slope = weight * ofPrice[a];
          prices[a] += slope;
          compensated[a] += slope + byShare * ofShare[a] + byTotal * ofTotal[a] + marginal * ofOther[a];
        }
      }
    }
  }

  /** Errors: `RangeError` where no row was added. */
  result(): ResponseGradients {
    if (this.#weight === 0) throw new RangeError("a group without a row has no derivatives");
    const n = this.#n;
    const mean = (row: Float64Array) => Array.from(row, (sum) => sum / this.#weight);
    const square = (rows: Float64Array[]) =>
      Array.from({ length: n }, (_, i) => rows.slice(i * n, (i + 1) * n).map(mean));
    return {
      shares: this.#shares.map(mean),
      total: this.#total.map(mean),
      prices: square(this.#prices),
      compensated: square(this.#compensated),
    };
  }
}

function addTo(sums: number[] | Float64Array, row: ArrayLike<number>, weight: number): void {
  for (let a = 0; a < sums.length; a++) sums[a] += weight * row[a];
}
