import type { Poll } from "../run.ts";
import { type Columns, columnOf, dot, zeros } from "./columns.ts";
import { gram } from "./gram.ts";
import { reduceToTriangle } from "./householder.ts";
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

/**
 * Factors J (rows × F) beside b for least squares. Where J is well conditioned the products are summed
 * and factored by Cholesky, a few times faster; where it is not, by Householder reflections of J itself.
 * Iterations recompute b, so that either ends at the same solution.
 */
export function normalFactor(jacobian: Columns, right: Columns, poll?: Poll): NormalFactor {
  const projections = Float64Array.from({ length: jacobian.columns }, (_, f) =>
    dot(columnOf(jacobian, f), right.values),
  );
  return factorOfProducts(gram(jacobian, poll), projections, poll) ?? byReflections(jacobian, right, poll);
}

/** The factor from J'J (its upper triangle) and J'b; undefined where squares have lost too many digits. */
export function factorOfProducts(products: Columns, projections: Float64Array, poll?: Poll): NormalFactor | undefined {
  const free = products.columns;
  const lengths = Float64Array.from({ length: free }, (_, f) => Math.sqrt(products.values[f * free + f]) || 1);
  const scaled = zeros(free, free);
  for (let f = 0; f < free; f++) {
    for (let h = 0; h <= f; h++) {
      scaled.values[f * free + h] = products.values[f * free + h] / (lengths[f] * lengths[h]);
    }
  }
  const { factor, dependent, smallestPivot } = semidefiniteCholesky(scaled, SQUARED_PIVOT, poll);
  if (dependent.length > 0 || smallestPivot < SQUARED_PIVOT) return undefined;
  return projectedOn({ lengths, triangle: factor, dependent: [] }, projections);
}

/** The same R with the Q'b of another J'b. */
export function projectedOn(
  { lengths, triangle, dependent }: Omit<NormalFactor, "projected">,
  projections: Float64Array,
): NormalFactor {
  const projected = projections.map((value, f) => value / lengths[f]);
  solveUpperTransposed(triangle, projected);
  return { lengths, triangle, projected, dependent };
}

function byReflections(jacobian: Columns, right: Columns, poll: Poll | undefined): NormalFactor {
  const free = jacobian.columns;
  const lengths = new Float64Array(free);
  const scaled = zeros(jacobian.rows, free + 1);
  for (let f = 0; f < free; f++) {
    const from = columnOf(jacobian, f);
    lengths[f] = Math.sqrt(dot(from, from)) || 1;
    const target = columnOf(scaled, f);
    for (let r = 0; r < target.length; r++) target[r] = from[r] / lengths[f];
  }
  scaled.values.set(right.values, free * jacobian.rows);
  reduceToTriangle(scaled, free, poll);
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
