import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import { type EasiParts, easiParts } from "../../../../shared/systems/easi-layout.ts";
import { printFixed } from "../../../../shared/tables/numbers.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { demographicColumn } from "../../columns/seasonal-terms.ts";
import { Refusal } from "../../refusal.ts";
import { Cancelled, type RunControl } from "../../run.ts";
import { meanShares } from "./real-expenditure.ts";

/** Implicit utility at θ of every row used, and its instrument. */
export interface RealExpenditure {
  /** y = (ln x − p'w + ½ p'A(z)p)/(1 − ½ p'Bp), w the observed shares of the row. */
  readonly implicit: Float64Array;
  /** The same with the mean shares of the sample in place of the row's. */
  readonly instrument: Float64Array;
  /** 1 − ½ p'Bp. */
  readonly denominator: Float64Array;
}

/** The rows as EASI reads them: one row after another into arrays of their own, demographics by the request's names. */
export class EasiRows {
  readonly count: number;
  readonly weights: Float64Array | undefined;
  readonly logPrices: Float64Array;
  readonly demographics: Float64Array;
  readonly shares: Float64Array;
  readonly #data: PreparedData;
  readonly #shifts: readonly Float64Array[];

  constructor(data: PreparedData, demographics: readonly string[]) {
    this.#data = data;
    this.#shifts = demographics.map((name) => demographicColumn(data, name)!);
    this.count = data.rows;
    this.weights = data.weights;
    this.logPrices = new Float64Array(data.goods.length);
    this.shares = new Float64Array(data.goods.length);
    this.demographics = new Float64Array(demographics.length);
  }

  read(row: number): void {
    const { logPrices, shares } = this.#data;
    for (let i = 0; i < logPrices.length; i++) {
      this.logPrices[i] = logPrices[i][row];
      this.shares[i] = shares[i][row];
    }
    for (let k = 0; k < this.#shifts.length; k++) this.demographics[k] = this.#shifts[k][row];
  }

  weight(row: number): number {
    return this.weights === undefined ? 1 : this.weights[row];
  }

  /**
   * Errors: a row where 1 − ½ p'Bp is not positive, so that utility is not defined; `Cancelled`.
   */
  realExpenditure(theta: readonly number[], size: SystemSize, control: RunControl): RealExpenditure {
    const parts = easiParts(theta, size);
    const means = meanShares(this.#data);
    const implicit = new Float64Array(this.count);
    const instrument = new Float64Array(this.count);
    const denominator = new Float64Array(this.count);
    const p = this.logPrices;
    for (let t = 0; t < this.count; t++) {
      if (t % 16_384 === 0 && control.cancelled()) throw new Cancelled("cancelled while forming real expenditure");
      this.read(t);
      let own = this.#data.logTotal[t] + 0.5 * priceSquare(parts, p, this.demographics);
      let meant = own;
      for (let i = 0; i < p.length; i++) {
        own -= p[i] * this.shares[i];
        meant -= p[i] * means[i];
      }
      const bend = 1 - 0.5 * tiltSquare(parts, p);
      if (!(bend > 0)) this.#refuse(t, bend);
      denominator[t] = bend;
      implicit[t] = own / bend;
      instrument[t] = meant / bend;
    }
    return { implicit, instrument, denominator };
  }

  #refuse(row: number, bend: number): never {
    const number = this.#data.rowNumbers[row];
    const sentence = `Implicit utility is not defined in row ${number}: 1 − ½ p'Bp is ${printFixed(bend, 2)} there where more than 0 is needed. Leave out the interaction of prices with expenditure, or the row.`;
    throw new Refusal([{ sentence, key: ["interactions"], row: number }]);
  }
}

/** p'A(z)p. */
function priceSquare({ price, shift, places }: EasiParts, p: Float64Array, z: Float64Array): number {
  const n = p.length;
  let sum = 0;
  for (let i = 0; i < n; i++) {
    let row = 0;
    for (let j = 0; j < n; j++) row += price[i * n + j] * p[j];
    for (let k = 0; k < places.shifted; k++) {
      for (let j = 0; j < n; j++) row += z[k] * shift[(i * places.shifted + k) * n + j] * p[j];
    }
    sum += p[i] * row;
  }
  return sum;
}

/** p'Bp. */
function tiltSquare({ tilt }: EasiParts, p: Float64Array): number {
  if (tilt.length === 0) return 0;
  const n = p.length;
  let sum = 0;
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) sum += p[i] * tilt[i * n + j] * p[j];
  return sum;
}
