import { zeros } from "../numerics/matrix.ts";
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

/** Derivatives in θ of the aggregate responses: the same sums over the rows' derivatives. */
export class AggregateGradients {
  #sums: ResponseGradients | undefined;
  #weight = 0;

  add(gradients: ResponseGradients, weight: number): void {
    const { shares, total, prices, compensated } = gradients;
    const k = shares[0].length;
    const n = shares.length;
    this.#sums ??= {
      shares: zeros(n, k),
      total: zeros(n, k),
      prices: shares.map(() => zeros(n, k)),
      compensated: shares.map(() => zeros(n, k)),
    };
    this.#weight += weight;
    for (let i = 0; i < n; i++) {
      addTo(this.#sums.shares[i], shares[i], weight);
      addTo(this.#sums.total[i], total[i], weight);
      for (let j = 0; j < n; j++) {
        addTo(this.#sums.prices[i][j], prices[i][j], weight);
        addTo(this.#sums.compensated[i][j], compensated[i][j], weight);
      }
    }
  }

  /** Errors: `RangeError` where no row was added. */
  result(): ResponseGradients {
    const sums = this.#sums;
    if (sums === undefined) throw new RangeError("a group without a row has no derivatives");
    const mean = (row: readonly number[]) => row.map((sum) => sum / this.#weight);
    return {
      shares: sums.shares.map(mean),
      total: sums.total.map(mean),
      prices: sums.prices.map((rows) => rows.map(mean)),
      compensated: sums.compensated.map((rows) => rows.map(mean)),
    };
  }
}

function addTo(sums: number[], row: ArrayLike<number>, weight: number): void {
  for (let a = 0; a < sums.length; a++) sums[a] += weight * row[a];
}
