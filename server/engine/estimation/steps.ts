import type { Poll } from "../run.ts";
import { type Columns, columnOf, zeros } from "./columns.ts";
import { gram } from "./gram.ts";
import { reduceToTriangle } from "./householder.ts";
import type { NormalFactor } from "./normal-factor.ts";
import { semidefiniteCholesky, solveUpper, solveUpperTransposed } from "./triangle.ts";

/** Gauss–Newton: δ = −D⁻¹R⁻¹Q'b. */
export function gaussNewtonStep({ triangle, projected, lengths }: NormalFactor): Float64Array {
  const step = projected.map((value) => -value);
  solveUpper(triangle, step);
  return step.map((value, f) => value / lengths[f]);
}

/** Levenberg (1944), Marquardt (1963): minimises ‖R D δ + Q'b‖² + λ‖D δ‖². */
export function dampedStep({ triangle, projected, lengths }: NormalFactor, damping: number, poll?: Poll): Float64Array {
  const free = lengths.length;
  const stacked = zeros(2 * free, free + 1);
  for (let f = 0; f < free; f++) {
    stacked.values.set(columnOf(triangle, f), f * 2 * free);
    stacked.values[f * 2 * free + free + f] = Math.sqrt(damping);
  }
  stacked.values.set(projected, free * 2 * free);
  reduceToTriangle(stacked, free, poll);
  const upper = zeros(free, free);
  for (let f = 0; f < free; f++) upper.values.set(columnOf(stacked, f).subarray(0, free), f * free);
  const step = columnOf(stacked, free)
    .slice(0, free)
    .map((value) => -value);
  solveUpper(upper, step);
  return step.map((value, f) => value / lengths[f]);
}

/**
 * The step with the second derivative of the concentrated likelihood. With ê and Ĵ in the metric of
 * Σ̂ (ê'ê = T I), the Hessian of (T/2) ln|Σ̂(φ)| is, but for the curvature of the residuals themselves,
 *
 *     Ĵ'Ĵ − (1/2T) Σ_{ab} B_ab B_ab',   B_ab,f = ê_a'Ĵ_f,b + ê_b'Ĵ_f,a
 *
 * which makes convergence quadratic where residuals are linear, also when T is small. `derivatives` are B,
 * F × ½g(g+1). Undefined where that matrix is not positive definite: then Gauss–Newton.
 */
export function likelihoodStep(
  factor: NormalFactor,
  derivatives: Columns,
  rows: number,
  poll: Poll,
): Float64Array | undefined {
  const { triangle, projected, lengths } = factor;
  const free = lengths.length;
  const turned = zeros(derivatives.columns, free);
  const scaled = new Float64Array(free);
  for (let pair = 0; pair < derivatives.columns; pair++) {
    poll();
    const column = columnOf(derivatives, pair);
    for (let f = 0; f < free; f++) scaled[f] = column[f] / lengths[f];
    solveUpperTransposed(triangle, scaled);
    for (let f = 0; f < free; f++) turned.values[f * turned.rows + pair] = scaled[f];
  }
  const hessian = gram(turned, poll);
  for (let k = 0; k < hessian.values.length; k++) hessian.values[k] /= -2 * rows;
  for (let f = 0; f < free; f++) hessian.values[f * free + f] += 1;
  const { factor: root, dependent } = semidefiniteCholesky(hessian, 1e-6, poll);
  if (dependent.length > 0) return undefined;
  const step = projected.map((value) => -value);
  solveUpperTransposed(root, step);
  solveUpper(root, step);
  solveUpper(triangle, step);
  return step.map((value, f) => value / lengths[f]);
}
