import { Cancelled, type Poll, polling, type RunControl } from "../run.ts";
import { approach } from "./approach.ts";
import { expand } from "./coefficient-form.ts";
import { type Columns, dot } from "./columns.ts";
import { conditionOf } from "./condition.ts";
import { covarianceDerivatives, residualProducts, sparseDerivatives, weightedJacobian } from "./contractions.ts";
import { type Criterion, evaluate, type State, wantsNewton, weightedResiduals } from "./criterion.ts";
import type { Estimation } from "./estimation.ts";
import { refuseNotConverged, refuseNotIdentified } from "./failures.ts";
import { iterationProgress, largestGradient } from "./iteration-progress.ts";
import { relativeStep, search } from "./line-search.ts";
import type { Moments } from "./moments.ts";
import { type NormalFactor, normalFactor } from "./normal-factor.ts";
import { asOneColumn, residualFactor, residualJacobian } from "./residuals.ts";
import { dampedStep, gaussNewtonStep, likelihoodStep } from "./steps.ts";

export interface Solution {
  /** What residuals and derivatives were formed from; at the solution where the form's terms move with θ. */
  readonly moments: Moments;
  readonly free: number[];
  /** θ, k. */
  readonly theta: number[];
  readonly iterations: number;
  /** Largest |∂/∂φ| of the criterion per observation. */
  readonly gradient: number;
  /** Largest |Δθ|/(1 + |θ|) of the last step. */
  readonly largestStep: number;
  /** Of the derivatives of the weighted residuals, columns scaled to unit length. */
  readonly condition: number;
  /** E at the solution, all equations. */
  readonly residuals: Columns;
  /** V of the criterion, and the weighted derivatives and their factor: what covariances are made of. */
  readonly weight: Columns;
  readonly jacobian: Columns;
  readonly factor: NormalFactor;
}

/** Of |Δθ|/(1 + |θ|) in the last step. */
export const TOLERANCE = 1e-10;
/** So near, derivatives are formed in full: what is left is rounding. */
const CLOSE = 1e-8;
const MOST_ITERATIONS = 500;
/**
 * Where terms move with θ every iteration reads the rows. Fits of the quadratic system end after 10 steps where prices
 * are normalised and after some 30 at a condition number of 300; those not done by now creep along a valley in which
 * α, γ and λ stand in for one another, and are no nearer after 500.
 */
const MOST_LOCAL_ITERATIONS = 150;

/**
 * Minimises the criterion by Gauss–Newton with step halving and analytic derivatives, damped after
 * Levenberg and Marquardt where halving fails. Converged when |Δθ| ≤ 1e-10 (1 + |θ|), or where rounding
 * allows no smaller step.
 *
 * Errors: not converged; coefficients not identified; a singular residual covariance; `Cancelled`.
 */
export function minimise(
  estimation: Estimation,
  criterion: Criterion,
  start: readonly number[],
  control: RunControl,
  tolerance: number = TOLERANCE,
): Solution {
  const near = approach(estimation, criterion, start, control, Math.max(tolerance, CLOSE));
  let state = evaluate(estimation, criterion, near.free, control);
  let largestStep = Number.POSITIVE_INFINITY;
  const mostIterations = estimation.moments.local === undefined ? MOST_ITERATIONS : MOST_LOCAL_ITERATIONS;
  // Passes over the rows within an iteration can be cancelled, and say where the iteration stands.
  const { inside, say } = iterationProgress(estimation, criterion, control);
  for (let iteration = near.iterations + 1; ; iteration++) {
    if (control.cancelled()) throw new Cancelled("cancelled while iterating");
    const linear = linearise(estimation, state, inside);
    const { moments, jacobian, factor, gradient, weighted } = linear;
    // Collinear columns that leave the start undetermined could be told apart by curvature alone.
    if (iteration === 1 && factor.dependent.length > 0 && estimation.moments.dependent.length > 0) {
      refuseNotIdentified(estimation, factor);
    }
    const step = chooseStep(criterion, estimation, state, linear, polling(control, "iterating"));
    const slope = dot(gradient, step);
    const previous = largestStep;
    largestStep = relativeStep(estimation.form, state.free, step);
    const gradientPerRow = largestGradient(gradient, estimation.moments.rows);
    // A step that shrinks by a third each time is slow, not stalled.
    const stalled = previous < 1e-6 && largestStep > 0.9 * previous && Math.abs(slope) < 1e-18 * sizeOf(weighted);
    if (largestStep <= tolerance || stalled) {
      if (factor.dependent.length > 0) refuseNotIdentified(estimation, factor);
      const free = state.free.map((value, f) => value + step[f]);
      return {
        moments,
        free,
        theta: expand(estimation.form.expand, free),
        iterations: iteration,
        gradient: gradientPerRow,
        largestStep,
        condition: conditionOf(factor.triangle),
        residuals: residualsAfter(estimation, moments, state.free, step),
        weight: state.weight,
        jacobian,
        factor,
      };
    }
    const next = search(estimation, criterion, state, step, slope, factor, inside);
    if (next === undefined || iteration >= mostIterations) {
      if (factor.dependent.length > 0) refuseNotIdentified(estimation, factor);
      refuseNotConverged(iteration, gradientPerRow, largestStep, conditionOf(factor.triangle), next !== undefined);
    }
    state = next;
    say(iteration, gradientPerRow, largestStep, state);
  }
}

/** ê'ê: what the squares to be saved by a step are compared with; that of rounding where there are no residuals. */
function sizeOf(weighted: Columns): number {
  return Math.max(dot(weighted.values, weighted.values), 1e-14 * weighted.rows);
}

/** Derivatives and residuals over the same rows; where terms move with θ their moments are accumulated there first. */
function linearise(estimation: Estimation, state: State, control: RunControl) {
  const { form, equations } = estimation;
  const { local } = estimation.moments;
  const moments = local?.at(expand(form.expand, state.free), control) ?? estimation.moments;
  const weighted =
    local === undefined
      ? state.weighted
      : weightedResiduals(residualFactor(moments, form, state.free), equations, state.weight);
  const poll = polling(control, "iterating");
  const derivatives = sparseDerivatives(form.derivatives(state.free), equations, moments.terms.columns);
  const jacobian = weightedJacobian(derivatives, moments.terms, state.weight, poll);
  const residuals = asOneColumn(weighted);
  const factor = normalFactor(jacobian, residuals, poll);
  const gradient = Float64Array.from({ length: form.free }, (_, f) =>
    dot(jacobian.values.subarray(f * jacobian.rows, (f + 1) * jacobian.rows), residuals.values),
  );
  return { moments, derivatives, jacobian, factor, gradient, weighted };
}

/** E after the last step. Where terms move with θ, to the first order of a step that is as small as rounding. */
function residualsAfter(
  { moments: { local }, form }: Estimation,
  moments: Moments,
  free: number[],
  step: Float64Array,
): Columns {
  if (local === undefined) {
    return residualFactor(
      moments,
      form,
      free.map((value, f) => value + step[f]),
    );
  }
  const residuals = residualFactor(moments, form, free);
  const every = Array.from({ length: residuals.columns }, (_, equation) => equation);
  const slopes = residualJacobian(moments, form, free, every);
  step.forEach((size, f) => {
    for (let r = 0; r < slopes.rows; r++) residuals.values[r] += size * slopes.values[f * slopes.rows + r];
  });
  return residuals;
}

function chooseStep(
  criterion: Criterion,
  estimation: Estimation,
  { weight }: State,
  { moments, derivatives, factor, weighted }: ReturnType<typeof linearise>,
  poll: Poll,
): Float64Array {
  if (factor.dependent.length > 0) return dampedStep(factor, 1e-8, poll);
  if (!wantsNewton(criterion, estimation)) return gaussNewtonStep(factor);
  const cross = covarianceDerivatives(derivatives, residualProducts(weighted, moments.terms), weight, poll);
  return likelihoodStep(factor, cross, moments.rows, poll) ?? gaussNewtonStep(factor);
}
