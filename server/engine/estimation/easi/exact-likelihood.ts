import { expand } from "../coefficient-form.ts";
import { type Columns, multiply, transposed, zeros } from "../columns.ts";
import { LOG_TWO_PI_E } from "../criterion.ts";
import { residualCovariance } from "../weighting.ts";
import type { ExactProblem } from "./exact-iteration.ts";
import type { RealExpenditure } from "./exact-rows.ts";
import { type ExactSource, exactSource } from "./exact-source.ts";
import { RowDerivatives } from "./row-derivatives.ts";
import { loadEntries, type PackedEntries, packedEntries, termValue, timesSymmetric } from "./row-terms.ts";

/** What the rows are at some φ. */
interface At {
  readonly free: readonly number[];
  readonly theta: number[];
  readonly real: RealExpenditure;
  readonly source: ExactSource;
  /** e of all n equations, T × n by columns, and their weighted copy. */
  readonly residuals: Columns;
}

/** Scores of a row: F numbers, overwritten by each row, with the residuals of the equations estimated. */
export interface RowScore {
  readonly score: Float64Array;
  readonly residual: Float64Array;
  /** Σ̂⁻¹ e. */
  readonly scaled: Float64Array;
  /** v of the equations estimated and ∂y/∂φ, for Σ_t e_t (∂e_t/∂φ_f)'. */
  readonly tilt: Float64Array;
  readonly byFree: Float64Array;
  /** Z. */
  readonly terms: Float64Array;
}

/**
 * Log-likelihood of the exact form with normal errors, concentrated in Σ:
 *
 *     −(T/2)[(n − 1)(1 + ln 2π) + ln|Σ̂|] + Σ_t ln q_t,   q = 1 + p'v/(1 − ½ p'Bp)
 *
 * The second sum is the Jacobian ln|∂e/∂w| of the implicit system: y moves with the shares by −p/(1 − ½ p'Bp) and
 * the equations with y by v, a change of rank one. −∞ where q is not positive at some row, since no density has it.
 */
export class ExactLikelihood {
  readonly #problem: ExactProblem;
  readonly #entries: PackedEntries;
  readonly #kept: PackedEntries;

  constructor(problem: ExactProblem) {
    const { form, equations } = problem.estimation;
    this.#problem = problem;
    const entries = form.derivatives(form.expand.places.map(() => 0));
    this.#entries = packedEntries(entries);
    this.#kept = packedEntries(entries, equations);
  }

  value(free: readonly number[]): number {
    const { rows, size, estimation } = this.#problem;
    const at = this.#at(free);
    const { logDeterminant } = this.#covariance(at);
    const derivatives = new RowDerivatives(at.theta, size, estimation.form.expand, rows, at.real);
    let jacobian = 0;
    for (let t = 0; t < rows.count; t++) {
      rows.read(t);
      derivatives.at(t);
      const q = 1 + inner(rows.logPrices, derivatives.tilts) / at.real.denominator[t];
      if (!(q > 0)) return Number.NEGATIVE_INFINITY;
      jacobian += rows.weight(t) * Math.log(q);
    }
    const constant = estimation.equations.length * LOG_TWO_PI_E;
    return jacobian - (rows.count / 2) * (constant + logDeterminant);
  }

  /** ∂/∂φ of the value: Σ_t h_t [J_t'Σ̂⁻¹e_t + ∂ln q_t/∂φ], J = −∂e/∂φ. */
  gradient(free: readonly number[]): Float64Array {
    const sum = new Float64Array(free.length);
    this.forEachScore(free, (weight, { score }) => {
      for (let f = 0; f < sum.length; f++) sum[f] += weight * score[f];
    });
    return sum;
  }

  /** Hands over J_t'Σ̂⁻¹e_t + ∂ln q_t/∂φ of one row after another, with its weight. */
  forEachScore(free: readonly number[], visit: (weight: number, score: RowScore, row: number) => void): void {
    const { rows, size, estimation } = this.#problem;
    const { equations, form } = estimation;
    const at = this.#at(free);
    const { weight } = this.#covariance(at);
    const inverse = multiply(weight, transposed(weight)).values;
    const derivatives = new RowDerivatives(at.theta, size, form.expand, rows, at.real);
    const { byFree, denominatorByFree, tilts, bends } = derivatives;
    const slopes = slopePairs(at.source);
    const count = free.length;
    const row: RowScore = {
      score: new Float64Array(count),
      residual: new Float64Array(equations.length),
      scaled: new Float64Array(equations.length),
      tilt: new Float64Array(equations.length),
      byFree,
      terms: new Float64Array(at.source.equationTerms),
    };
    const slopeTerms = new Float64Array(at.source.equationTerms);
    const direct = new Float64Array(count);
    for (let t = 0; t < rows.count; t++) {
      rows.read(t);
      derivatives.at(t);
      for (let term = 0; term < row.terms.length; term++) {
        row.terms[term] = termValue(at.source, at.source.terms[term], t);
        slopeTerms[term] = slopes[term](t);
      }
      equations.forEach((equation, place) => {
        row.residual[place] = at.residuals.values[equation * rows.count + t];
        row.tilt[place] = tilts[equation];
      });
      timesSymmetric(inverse, row.residual, row.scaled);
      loadEntries(this.#kept, row.terms, row.scaled, row.score);
      loadEntries(this.#entries, slopeTerms, rows.logPrices, direct);
      const through = inner(row.tilt, row.scaled);
      const denominator = at.real.denominator[t];
      const tilt = inner(rows.logPrices, tilts) / denominator;
      const bend = inner(rows.logPrices, bends);
      for (let f = 0; f < count; f++) {
        const moved = (direct[f] + bend * byFree[f] - tilt * denominatorByFree[f]) / denominator;
        row.score[f] += through * byFree[f] + moved / (1 + tilt);
      }
      visit(rows.weight(t), row, t);
    }
  }

  /** −∂e/∂φ_f of the row's equations. */
  derivativeOf(f: number, { terms, tilt, byFree }: RowScore, into: Float64Array): void {
    for (let i = 0; i < into.length; i++) into[i] = tilt[i] * byFree[f];
    const kept = this.#kept;
    for (let at = kept.starts[f]; at < kept.starts[f + 1]; at++) {
      into[kept.equations[at]] += kept.values[at] * terms[kept.terms[at]];
    }
  }

  #at(free: readonly number[]): At {
    const { data, specification, size, estimation, rows, control } = this.#problem;
    const theta = expand(estimation.form.expand, free);
    const real = rows.realExpenditure(theta, size, control);
    const source = exactSource(data, specification.demographics, size, real);
    const coefficients = estimation.form.coefficients(free);
    const residuals = zeros(rows.count, size.goods);
    for (let t = 0; t < rows.count; t++) {
      for (let i = 0; i < size.goods; i++) residuals.values[i * rows.count + t] = data.shares[i][t];
      for (let term = 0; term < source.equationTerms; term++) {
        const value = termValue(source, source.terms[term], t);
        for (let i = 0; i < size.goods; i++) residuals.values[i * rows.count + t] -= coefficients[i][term] * value;
      }
    }
    return { free, theta, real, source, residuals };
  }

  #covariance({ residuals }: At) {
    const { rows, estimation, data } = this.#problem;
    const weighted: Columns = { ...residuals, values: residuals.values.slice() };
    if (data.weights) {
      for (let k = 0; k < weighted.values.length; k++) weighted.values[k] *= Math.sqrt(data.weights[k % rows.count]);
    }
    return residualCovariance(weighted, rows.count, estimation.equations, estimation.moments.responseLabels);
  }
}

/** ∂Z/∂y of each term in row t: r y^(r − 1) of a power, z_k of z_k y, ln p_j of y ln p_j. */
function slopePairs(source: ExactSource): ((t: number) => number)[] {
  const { columns, powers } = source;
  const power = (place: number) => powers.indexOf(place) + 1;
  return source.terms.slice(0, source.equationTerms).map(([left, right]) => {
    const r = power(right);
    const other = power(left) > 0 ? right : left;
    if (power(left) === 0 && r === 0) return () => 0;
    if (left === 0) return r === 1 ? () => 1 : (t) => r * columns[powers[r - 2] - 1][t];
    return (t) => columns[other - 1][t];
  });
}

export function inner(left: Float64Array, right: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < left.length; i++) sum += left[i] * right[i];
  return sum;
}
