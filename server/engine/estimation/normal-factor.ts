import { momentMatrix } from "./accumulate-sums.ts";
import { type Columns, columnOf, dot, zeros } from "./columns.ts";
import { reduceToTriangle } from "./householder.ts";
import { multiplyAccumulate } from "./multiply-accumulate.ts";
import { densePlan, type TilePlan } from "./tile-plan.ts";
import { semidefiniteCholesky, solveUpperTransposed } from "./triangle.ts";

/** R of J D⁻¹ = QR with D the lengths of J's columns, and Q'b. */
export interface NormalFactor {
  /** D, F. */
  readonly lengths: Float64Array;
  /** R, F × F upper triangular; columns of unit length. */
  readonly triangle: Columns;
  /** Q'b, F. */
  readonly projected: Float64Array;
  /** Columns that are combinations of those before them. */
  readonly dependent: readonly number[];
}

/** Below this pivot (a condition number above some 1e4) squared columns have lost too many digits. */
const SQUARED_PIVOT = 1e-8;
/** A column whose part orthogonal to those before it is below this, relative to itself, is not identified. */
const DEPENDENT = 1e-10;

const plans = new Map<number, TilePlan>();

/**
 * Factors J (rows × F) beside b for least squares. Where J is well conditioned the products are summed
 * and factored by Cholesky, a few times faster; where it is not, by Householder reflections of J itself.
 * Iterations recompute b, so that either ends at the same solution.
 */
export function normalFactor(jacobian: Columns, right: Columns): NormalFactor {
  const free = jacobian.columns;
  const lengths = Float64Array.from(
    { length: free },
    (_, f) => Math.sqrt(dot(columnOf(jacobian, f), columnOf(jacobian, f))) || 1,
  );
  const scaled = zeros(jacobian.rows, free + 1);
  for (let f = 0; f < free; f++) {
    const from = columnOf(jacobian, f);
    const target = columnOf(scaled, f);
    for (let r = 0; r < target.length; r++) target[r] = from[r] / lengths[f];
  }
  scaled.values.set(right.values, free * jacobian.rows);
  return bySums(scaled, lengths) ?? byReflections(scaled, lengths);
}

function bySums(scaled: Columns, lengths: Float64Array): NormalFactor | undefined {
  const free = lengths.length;
  if (!plans.has(free)) plans.set(free, densePlan(free + 1));
  const plan = plans.get(free)!;
  const sums = new Float64Array(plan.tiles * 16);
  multiplyAccumulate(scaled.values, scaled.rows, scaled.rows, plan, sums);
  const products = momentMatrix(plan, sums);
  const inner = zeros(free, free);
  for (let f = 0; f < free; f++) inner.values.set(columnOf(products, f).subarray(0, free), f * free);
  const { factor, dependent, smallestPivot } = semidefiniteCholesky(inner, SQUARED_PIVOT);
  if (dependent.length > 0 || smallestPivot < SQUARED_PIVOT) return undefined;
  const projected = columnOf(products, free).slice(0, free);
  solveUpperTransposed(factor, projected);
  return { lengths, triangle: factor, projected, dependent: [] };
}

function byReflections(scaled: Columns, lengths: Float64Array): NormalFactor {
  const free = lengths.length;
  reduceToTriangle(scaled, free);
  const triangle = zeros(free, free);
  const projected = new Float64Array(free);
  const height = Math.min(free, scaled.rows);
  for (let f = 0; f < free; f++) {
    triangle.values.set(columnOf(scaled, f).subarray(0, Math.min(f + 1, height)), f * free);
  }
  projected.set(columnOf(scaled, free).subarray(0, height));
  const dependent = Array.from({ length: free }, (_, f) => f).filter(
    (f) => !(triangle.values[f * free + f] > DEPENDENT),
  );
  return { lengths, triangle, projected, dependent };
}
