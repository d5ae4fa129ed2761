import type { FreeForm, SystemSize } from "../../../../shared/systems/demand-system.ts";
import { type EasiPlaces, easiParts } from "../../../../shared/systems/easi-layout.ts";
import type { EasiRows, RealExpenditure } from "./exact-rows.ts";

/** ∂y/∂φ_f = Σ weight · (what a coefficient of a price matrix does to y). */
interface PricePart {
  readonly free: number;
  readonly weight: number;
  readonly i: number;
  readonly j: number;
  /** 0 of A_0, 1 + k of A_k, −1 of B. */
  readonly kind: number;
}

/**
 * What moves implicit utility, row by row: v_i = ∂w_i/∂y at fixed θ, and ∂y/∂φ at fixed shares,
 *
 *     ∂y/∂a_ij = ½ ln p_i ln p_j/(1 − ½ p'Bp),  z_k times that for a_kij,  y times that for b_ij
 */
export class RowDerivatives {
  /** v, n. */
  readonly tilts: Float64Array;
  /** m_uu, n. */
  readonly bends: Float64Array;
  /** ∂y/∂φ, F. */
  readonly byFree: Float64Array;
  /** ∂(1 − ½ p'Bp)/∂φ, F. */
  readonly denominatorByFree: Float64Array;
  readonly #parts: readonly PricePart[];
  readonly #theta;
  readonly #rows: EasiRows;
  readonly #real: RealExpenditure;

  constructor(theta: readonly number[], size: SystemSize, free: FreeForm, rows: EasiRows, real: RealExpenditure) {
    this.#theta = easiParts(theta, size);
    this.#parts = priceParts(this.#theta.places, size, free);
    this.#rows = rows;
    this.#real = real;
    this.tilts = new Float64Array(size.goods);
    this.bends = new Float64Array(size.goods);
    this.byFree = new Float64Array(free.places.length);
    this.denominatorByFree = new Float64Array(free.places.length);
  }

  /** At the row last read by `rows`, which is row `t`. */
  at(t: number): void {
    const { logPrices: p, demographics: z } = this.#rows;
    const { places, power, cross, tilt } = this.#theta;
    const y = this.#real.implicit[t];
    const half = 0.5 / this.#real.denominator[t];
    const n = p.length;
    for (let i = 0; i < n; i++) {
      let first = 0;
      let second = 0;
      for (let r = places.degree; r >= 1; r--) {
        second = second * y + first;
        first = first * y + r * power[i * (places.degree + 1) + r];
      }
      for (let k = 0; k < places.crossed; k++) first += cross[i * places.crossed + k] * z[k];
      if (places.tilted > 0) for (let j = 0; j < n; j++) first += tilt[i * n + j] * p[j];
      this.tilts[i] = first;
      this.bends[i] = second;
    }
    this.byFree.fill(0);
    this.denominatorByFree.fill(0);
    for (const { free, weight, i, j, kind } of this.#parts) {
      const factor = kind === 0 ? 1 : kind < 0 ? y : z[kind - 1];
      const product = weight * p[i] * p[j];
      this.byFree[free] += half * factor * product;
      if (kind < 0) this.denominatorByFree[free] -= 0.5 * product;
    }
  }
}

function priceParts(places: EasiPlaces, { goods: n }: SystemSize, { matrix }: FreeForm): PricePart[] {
  const parts: PricePart[] = [];
  const add = (place: number, i: number, j: number, kind: number) => {
    matrix[place].forEach((weight, free) => {
      if (weight !== 0) parts.push({ free, weight, i, j, kind });
    });
  };
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      add(places.price(i, j), i, j, 0);
      for (let k = 0; k < places.shifted; k++) add(places.shift(i, k, j), i, j, 1 + k);
      if (places.tilted > 0) add(places.tilt(i, j), i, j, -1);
    }
  }
  return parts;
}
