import { polling, type RunControl } from "../run.ts";
import { accumulateSums, momentMatrix } from "./accumulate-sums.ts";
import { type Columns, identity, multiply, zeros } from "./columns.ts";
import type { MomentSource, TermPair } from "./moment-source.ts";
import { planTiles } from "./monomial-plan.ts";
import { semidefiniteCholesky, solveUpper } from "./triangle.ts";
import type { DependentColumn, Whitening } from "./whitening.ts";

/** Rows looked at for the first guess of the means. */
const GUESS_ROWS = 4096;
/** A relative variance left after the columns before it at which the first Cholesky factor is not trusted. */
const SUSPICIOUS = 1e-8;
const PIVOT_FLOOR = 1e-13;
/** A column whose part orthogonal to those before it is below this, relative to its deviations, is dependent on them. */
const DEPENDENT = 1e-10;
/** Deviations below this, relative to the mean, are rounding: the column is constant. */
const CONSTANT = 1e-13;

/**
 * Centres and whitens the base columns from their weighted covariance (one cheap pass); where they are
 * nearly collinear, a second pass whitens the whitened columns again, so that condition numbers up to
 * 1e9 are resolved (Yamamoto, Nakatsukasa, Yanagisawa & Fukaya 2015, ETNA 44: "CholeskyQR2").
 */
export function whiteningOf(
  source: MomentSource,
  control: RunControl,
): { whitening: Whitening; dependent: DependentColumn[]; passes: number } {
  const base = source.columns.length;
  const guess: Whitening = { shift: guessedMeans(source), triangle: identity(base) };
  const first = covariance(source, guess, control);
  for (let j = 0; j < base; j++) guess.shift[j] += first.means[j];
  let { factor, smallestPivot } = floored(first.matrix);
  let passes = 1;
  if (smallestPivot < SUSPICIOUS) {
    const second = covariance(source, { shift: guess.shift, triangle: factor }, control);
    factor = multiply(semidefiniteCholesky(second.matrix, 0).factor, factor);
    passes = 2;
  }
  const dependent = markDependent(factor, guess.shift, source.columnLabels);
  return { whitening: { shift: guess.shift, triangle: factor }, dependent, passes };
}

function guessedMeans(source: MomentSource): Float64Array {
  const step = Math.max(1, Math.floor(source.rows / GUESS_ROWS));
  return Float64Array.from([...source.columns, ...source.responses], (column) => {
    let sum = 0;
    let count = 0;
    for (let t = 0; t < source.rows; t += step) {
      sum += column[t];
      count++;
    }
    return sum / count;
  });
}

/** Weighted covariance (divisor T) and means of the whitened base columns; none between columns of two groups. */
function covariance(source: MomentSource, whitening: Whitening, control: RunControl) {
  const { groups } = source;
  const base = source.columns.length;
  const terms: TermPair[] = Array.from({ length: base + 1 }, (_, place) => [0, place]);
  const plan = planTiles(terms, polling(control, "whitening columns"));
  const onlyBase: MomentSource = { ...source, responses: [], responseLabels: [] };
  const sums = accumulateSums(onlyBase, whitening, terms, plan, { from: 0, to: source.rows }, control, () => 0);
  const moments = momentMatrix(plan, sums).values;
  const size = base + 1;
  const means = Float64Array.from({ length: base }, (_, j) => moments[j + 1] / moments[0]);
  const matrix = zeros(base, base);
  for (let i = 0; i < base; i++) {
    for (let j = 0; j < base; j++) {
      if (groups !== undefined && groups[i] !== groups[j]) continue;
      matrix.values[j * base + i] = moments[(j + 1) * size + i + 1] / moments[0] - means[i] * means[j];
    }
  }
  return { means, matrix };
}

/** Cholesky factor in which a pivot lost to rounding is replaced by the smallest that could be seen. */
function floored(matrix: Columns): { factor: Columns; smallestPivot: number } {
  const { factor, dependent, smallestPivot } = semidefiniteCholesky(matrix, PIVOT_FLOOR);
  for (const j of dependent) {
    const variance = matrix.values[j * matrix.rows + j];
    factor.values[j * factor.rows + j] = variance > 0 ? Math.sqrt(PIVOT_FLOOR * variance) : 1;
  }
  return { factor, smallestPivot: dependent.length > 0 ? 0 : smallestPivot };
}

/** Sets the diagonal of dependent columns to zero and says what each depends on. */
function markDependent(triangle: Columns, shift: Float64Array, labels: readonly string[]): DependentColumn[] {
  const size = triangle.columns;
  const dependent: DependentColumn[] = [];
  const entry = (i: number, j: number) => triangle.values[j * size + i];
  for (let j = 0; j < size; j++) {
    let squares = 0;
    for (let i = 0; i <= j; i++) squares += entry(i, j) ** 2;
    const length = Math.sqrt(squares);
    const constant = length <= CONSTANT * Math.abs(shift[j]);
    if (!constant && entry(j, j) > DEPENDENT * length) continue;
    triangle.values[j * size + j] = 0;
    const on = constant ? [] : partners(triangle, j, length).map((i) => labels[i]);
    dependent.push({ column: labels[j], on });
  }
  return dependent;
}

function partners(triangle: Columns, j: number, length: number): number[] {
  const size = triangle.columns;
  const independent = Array.from({ length: j }, (_, i) => i).filter((i) => triangle.values[i * size + i] !== 0);
  const inner = zeros(independent.length, independent.length);
  independent.forEach((column, c) => {
    independent.forEach((row, r) => {
      inner.values[c * inner.rows + r] = triangle.values[column * size + row];
    });
  });
  const combination = Float64Array.from(independent, (i) => triangle.values[j * size + i]);
  solveUpper(inner, combination);
  return independent.filter((i, place) => {
    let squares = 0;
    for (let k = 0; k <= i; k++) squares += triangle.values[i * size + k] ** 2;
    return Math.abs(combination[place]) * Math.sqrt(squares) > 1e-6 * length;
  });
}
