import { inverseMillsRatio, logNormalProbability } from "../../../../shared/numerics/normal-tail.ts";
import { type Columns, columnOf, zeros } from "../columns.ts";
import { invertUpper, semidefiniteCholesky, solveUpper, solveUpperTransposed } from "../triangle.ts";

/** Rows as the probit sees them: the constant is a column like any other. */
export interface ProbitRows {
  readonly columns: readonly Float64Array[];
  /** R of √h·X = QR: the regressors are whitened by it, so that squared columns lose no digits. */
  readonly triangle: Columns;
  /** Whether y = 1. */
  readonly chosen: Uint8Array;
  readonly weights?: Float64Array;
}

export interface Probit {
  readonly coefficients: Float64Array;
  /** (−H)⁻¹, the inverse of the observed information, K × K by columns. */
  readonly covariance: Columns;
  readonly logLikelihood: number;
  readonly iterations: number;
  /** x'b by row. */
  readonly index: Float64Array;
}

/** What came instead of an estimate: some combination of the regressors tells all rows apart, so none is finite. */
export type ProbitFailure = "separated" | "not converged";

const TOLERANCE = 1e-11;
const MOST_ITERATIONS = 100;
const MOST_HALVINGS = 30;
/** With every row's probability of what it did within this of one, the likelihood is at its bound. */
const CERTAIN = 1e-6;
/** Curvature per row below which, in whitened columns, there is none: with a single row in a million at stake 1e-6. */
const FLAT = 1e-9;

/**
 * Maximum likelihood of P(y = 1) = Φ(x'b), rows weighted by h, by Newton's method with the exact Hessian: with
 * q = 2y − 1, s = q x'b and λ the inverse Mills ratio,
 *
 *     ln L = Σ h ln Φ(s),   gradient Σ h q λ(s) x,   −H = Σ h λ(s)(λ(s) + s) x x'
 *
 * ln L is concave, so that step halving reaches the one maximum, if there is one (Pratt 1981, Journal of the American
 * Statistical Association 76). Where a combination of the regressors separates the rows there is none: the answer is
 * "separated" (Albert & Anderson 1984, Biometrika 71).
 */
export function probit(rows: ProbitRows): Probit | ProbitFailure {
  const size = rows.triangle.columns;
  const whitened = whitenedColumns(rows);
  let at: Float64Array = new Float64Array(size);
  let state = evaluate(rows, whitened, at);
  for (let iteration = 1; iteration <= MOST_ITERATIONS; iteration++) {
    const { factor, dependent } = semidefiniteCholesky(state.information, 1e-14);
    if (dependent.length > 0 || isFlat(state, factor)) return "separated";
    const step = state.gradient.slice();
    solveUpperTransposed(factor, step);
    solveUpper(factor, step);
    const decrement = step.reduce((sum, value, k) => sum + value * state.gradient[k], 0);
    const next = search(rows, whitened, at, step, state.logLikelihood);
    at = next.at;
    state = next.state;
    if (state.least > -CERTAIN) return "separated";
    if (decrement <= TOLERANCE * TOLERANCE * state.weight) return solution(rows, whitened, at, state, iteration);
  }
  return "not converged";
}

interface State {
  readonly logLikelihood: number;
  readonly gradient: Float64Array;
  readonly information: Columns;
  /** The smallest ln Φ(s) of a row. */
  readonly least: number;
  readonly weight: number;
}

/** Rows told apart but for some: along what tells them apart ln L is flat, but for what those some leave. */
function isFlat({ weight }: State, factor: Columns): boolean {
  for (let k = 0; k < factor.columns; k++) if (factor.values[k * factor.rows + k] ** 2 < FLAT * weight) return true;
  return false;
}

/** Columns u with √h·u orthonormal times √T: u = x R⁻¹ √T. */
function whitenedColumns({ columns, triangle }: ProbitRows): Float64Array[] {
  const whitened: Float64Array[] = [];
  const scale = Math.sqrt(columns[0].length);
  columns.forEach((column, j) => {
    const target = column.slice();
    for (let i = 0; i < j; i++) {
      const factor = triangle.values[j * triangle.rows + i] / scale;
      for (let t = 0; t < target.length; t++) target[t] -= factor * whitened[i][t];
    }
    const pivot = triangle.values[j * triangle.rows + j] / scale;
    for (let t = 0; t < target.length; t++) target[t] /= pivot;
    whitened.push(target);
  });
  return whitened;
}

function indexOf(whitened: readonly Float64Array[], at: Float64Array): Float64Array {
  const index = new Float64Array(whitened[0].length);
  whitened.forEach((column, k) => {
    for (let t = 0; t < index.length; t++) index[t] += at[k] * column[t];
  });
  return index;
}

function evaluate({ chosen, weights }: ProbitRows, whitened: readonly Float64Array[], at: Float64Array): State {
  const size = whitened.length;
  const index = indexOf(whitened, at);
  const gradient = new Float64Array(size);
  const information = zeros(size, size);
  let logLikelihood = 0;
  let least = 0;
  let weight = 0;
  for (let t = 0; t < index.length; t++) {
    const sign = chosen[t] === 1 ? 1 : -1;
    const signed = sign * index[t];
    const h = weights === undefined ? 1 : weights[t];
    const log = logNormalProbability(signed);
    const mills = inverseMillsRatio(signed);
    logLikelihood += h * log;
    weight += h;
    if (log < least) least = log;
    const slope = h * sign * mills;
    const curve = h * mills * (mills + signed);
    for (let k = 0; k < size; k++) {
      const value = whitened[k][t];
      gradient[k] += slope * value;
      const part = curve * value;
      for (let l = 0; l <= k; l++) information.values[k * size + l] += part * whitened[l][t];
    }
  }
  for (let k = 0; k < size; k++) {
    for (let l = 0; l < k; l++) information.values[l * size + k] = information.values[k * size + l];
  }
  return { logLikelihood, gradient, information, least, weight };
}

function search(
  rows: ProbitRows,
  whitened: readonly Float64Array[],
  at: Float64Array,
  step: Float64Array,
  before: number,
): { at: Float64Array; state: State } {
  let size = 1;
  for (let halving = 0; ; halving++) {
    const next = at.map((value, k) => value + size * step[k]);
    const state = evaluate(rows, whitened, next);
    const rounding = 1e-13 * Math.abs(before);
    if (state.logLikelihood >= before - rounding || halving >= MOST_HALVINGS) return { at: next, state };
    size /= 2;
  }
}

function solution(
  { triangle }: ProbitRows,
  whitened: readonly Float64Array[],
  at: Float64Array,
  state: State,
  iterations: number,
): Probit {
  const size = at.length;
  const scale = Math.sqrt(whitened[0].length);
  const coefficients = at.map((value) => value * scale);
  solveUpper(triangle, coefficients);
  // b = √T R⁻¹a: the covariance of a from the information in whitened columns, mapped back.
  const inverse = invertUpper(semidefiniteCholesky(state.information, 0).factor);
  const covariance = zeros(size, size);
  const mapped = Array.from({ length: size }, (_, j) => {
    const column = columnOf(inverse, j).map((value) => value * scale);
    solveUpper(triangle, column);
    return column;
  });
  for (const column of mapped) {
    for (let a = 0; a < size; a++) {
      for (let b = 0; b < size; b++) covariance.values[b * size + a] += column[a] * column[b];
    }
  }
  return { coefficients, covariance, logLikelihood: state.logLikelihood, iterations, index: indexOf(whitened, at) };
}
