import { symmetricEigen } from "../../../../shared/numerics/eigen.ts";
import type { DemandSystem, SystemSize } from "../../../../shared/systems/demand-system.ts";
import { constrainedForm } from "../coefficient-form.ts";
import { columnOf, dot, pickColumns } from "../columns.ts";
import type { Solution } from "../minimise.ts";
import { asOneColumn, residualFactor, residualJacobian, weightBlocks } from "../residuals.ts";
import type { CurvatureMap } from "./curvature-map.ts";

/** Against the size of the criterion per row: a smaller gain from one more column is rounding. */
const NO_GAIN = 1e-9;
const SMALL = 1e-4;

/**
 * The direction in which one more column of L lowers the criterion most, or undefined where none does: there the
 * estimate lies at the bound of its rank. A zero column moves θ only to second order, so the criterion's curvature
 * in it is g'∂²θ with g the criterion's own gradient in θ.
 *
 * `wider` is the map with the column, `free` the solution with zeros in it; columns stand last in φ.
 */
export function steepestColumn(
  system: DemandSystem,
  size: SystemSize,
  solution: Solution,
  equations: readonly number[],
  wider: CurvatureMap,
  free: readonly number[],
  entries: number,
): number[] | undefined {
  const gradient = gradientOfTheta(system, size, solution, equations);
  const first = free.length - entries;
  const bends = Array.from({ length: entries }, (_, e) => {
    const moved = [...free];
    moved[first + e] = SMALL;
    const jacobian = wider.jacobian(moved);
    return Array.from({ length: entries }, (_, other) =>
      jacobian.reduce((sum, row, a) => sum + row[first + other] * gradient[a], 0),
    ).map((value) => value / SMALL);
  });
  const symmetric = bends.map((row, i) => row.map((value, j) => 0.5 * (value + bends[j][i])));
  const { values, vectors } = symmetricEigen(symmetric);
  const lowest = values.indexOf(Math.min(...values));
  return values[lowest] < -NO_GAIN * solution.moments.rows ? [...vectors[lowest]] : undefined;
}

/** ∂/∂θ of the criterion, k: no restriction but those of the functional form. */
function gradientOfTheta(
  system: DemandSystem,
  size: SystemSize,
  { theta, moments, weight }: Solution,
  equations: readonly number[],
): number[] {
  const identity = {
    matrix: theta.map((_, a) => theta.map((_, b) => (a === b ? 1 : 0))),
    offset: theta.map(() => 0),
    places: theta.map((_, a) => a),
  };
  const form = constrainedForm(system, size, identity);
  const height = moments.terms.rows;
  const chosen = asOneColumn(pickColumns(residualFactor(moments, form, theta), equations));
  const residuals = weightBlocks(chosen, height, weight).values;
  const jacobian = weightBlocks(residualJacobian(moments, form, theta, equations), height, weight);
  return theta.map((_, a) => dot(columnOf(jacobian, a), residuals));
}
