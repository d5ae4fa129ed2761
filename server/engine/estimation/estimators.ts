import type { RunControl } from "../run.ts";
import { approach } from "./approach.ts";
import type { Criterion } from "./criterion.ts";
import type { Estimation } from "./estimation.ts";
import { minimise, type Solution, TOLERANCE } from "./minimise.ts";
import { residualFactor } from "./residuals.ts";
import { equalWeights, residualCovariance } from "./weighting.ts";

/** How far least squares is carried where it only starts the likelihood off. */
const STARTING = 1e-4;

/**
 * Least squares under all restrictions: the sum of squares of every equation, Σ = I. In a system that
 * adds up that is all n equations, whichever is dropped; restrictions across equations (symmetry) hold
 * by minimising over them jointly. Without such restrictions it is least squares equation by equation.
 */
export function leastSquares(
  estimation: Estimation,
  addsUp: boolean,
  start: readonly number[],
  control: RunControl,
): Solution {
  const weight = equalWeights(estimation.equations.length, addsUp);
  return minimise(estimation, { kind: "weighted", weight }, start, control);
}

/**
 * Least squares as a first step, of which the next one reads the residuals alone: from contractions of
 * Z'Z where these carry it as far as a fit is carried, and otherwise from the fit in full, which makes every refusal.
 */
export function firstLeastSquares(
  estimation: Estimation,
  addsUp: boolean,
  start: readonly number[],
  control: RunControl,
): Pick<Solution, "residuals"> {
  const weight = equalWeights(estimation.equations.length, addsUp);
  const near = approach(estimation, { kind: "weighted", weight }, start, control, TOLERANCE);
  if (!near.reached) return leastSquares(estimation, addsUp, start, control);
  const { moments, form } = estimation;
  return { residuals: residualFactor(moments, form, near.free) };
}

/**
 * Seemingly unrelated regressions, one step (Zellner 1962, Journal of the American Statistical
 * Association 57): generalised least squares at the Σ̂ of `first`, whose restrictions act within
 * equations only, so that the result does not depend on the dropped good. Σ̂ divides by T.
 */
export function seeminglyUnrelated(
  estimation: Estimation,
  first: Pick<Solution, "residuals">,
  start: readonly number[],
  control: RunControl,
): Solution {
  const { moments, equations } = estimation;
  const { weight } = residualCovariance(first.residuals, moments.rows, equations, moments.responseLabels);
  return minimise(estimation, { kind: "weighted", weight }, start, control);
}

/**
 * Minimises ln|Σ̂(φ)|, starting from least squares. "newton" is Gaussian maximum likelihood; "update"
 * iterates seemingly unrelated regressions, each at the Σ̂ of the last: the same solution (Oberhofer &
 * Kmenta 1974, Econometrica 42), reached more slowly.
 */
export function maximumLikelihood(
  estimation: Estimation,
  addsUp: boolean,
  start: readonly number[],
  step: "newton" | "update",
  control: RunControl,
): Solution {
  const weight = equalWeights(estimation.equations.length, addsUp);
  const squares: Criterion = { kind: "weighted", weight };
  const near = approach(estimation, squares, start, control, STARTING);
  const first = near.reached ? near : minimise(estimation, squares, start, control, STARTING);
  const solution = minimise(estimation, { kind: "likelihood", step }, first.free, control);
  return { ...solution, iterations: solution.iterations + first.iterations };
}
