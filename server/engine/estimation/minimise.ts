import { Cancelled, type RunControl } from "../run.ts";
import { type CoefficientForm, expand } from "./coefficient-form.ts";
import { type Columns, dot, pickColumns, zeros } from "./columns.ts";
import { conditionOf } from "./condition.ts";
import type { Estimation } from "./estimation.ts";
import { refuseNotConverged, refuseNotIdentified } from "./failures.ts";
import type { Moments } from "./moments.ts";
import { type NormalFactor, normalFactor } from "./normal-factor.ts";
import { asOneColumn, residualFactor, residualJacobian, weightBlocks } from "./residuals.ts";
import { dampedStep, gaussNewtonStep, likelihoodStep } from "./steps.ts";
import { residualCovariance } from "./weighting.ts";

/**
 * "weighted": ½ Σ e'(V V')e at fixed V. "likelihood": (T/2) ln|Σ̂(φ)|, by Newton steps or, with
 * `update`, by generalised least squares at the Σ̂ of the last iterate (iterated SUR).
 */
export type Criterion =
  | { readonly kind: "weighted"; readonly weight: Columns }
  | { readonly kind: "likelihood"; readonly step: "newton" | "update" };

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

const TOLERANCE = 1e-10;
const MOST_ITERATIONS = 500;
const MOST_HALVINGS = 12;
const MOST_DAMPING = 1e8;
const POLL_MS = 50;
/** With so many rows for every coefficient Gauss–Newton converges as fast as Newton, which costs more. */
const ROWS_WITHOUT_NEWTON = 1000;

interface State {
  readonly free: number[];
  readonly residuals: Columns;
  readonly weight: Columns;
  /** Ê = E V, r × g. */
  readonly weighted: Columns;
  readonly value: number;
}

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
  let state = evaluate(estimation, criterion, [...start], control);
  let largestStep = Number.POSITIVE_INFINITY;
  let lastSpoken = Number.NEGATIVE_INFINITY;
  let spoken: Parameters<RunControl["progress"]>[0] = { step: "iterating" };
  // Passes over the rows within an iteration can be cancelled, and say where the iteration stands.
  const inside: RunControl = {
    ...(control.threads && { threads: control.threads }),
    cancelled: () => control.cancelled(),
    progress: ({ fraction }) => control.progress({ ...spoken, ...(fraction !== undefined && { fraction }) }),
  };
  for (let iteration = 1; ; iteration++) {
    if (control.cancelled()) throw new Cancelled("cancelled while iterating");
    const { moments, jacobian, factor, gradient, weighted } = linearise(estimation, state, inside);
    // Collinear columns that leave the start undetermined could be told apart by curvature alone.
    if (iteration === 1 && factor.dependent.length > 0 && estimation.moments.dependent.length > 0) {
      refuseNotIdentified(estimation, factor);
    }
    const step = chooseStep(criterion, factor, jacobian, weighted, estimation.moments.rows);
    const slope = dot(gradient, step);
    const previous = largestStep;
    largestStep = relativeStep(estimation.form, state.free, step);
    const largestGradient =
      gradient.reduce((most, value) => Math.max(most, Math.abs(value)), 0) / estimation.moments.rows;
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
        gradient: largestGradient,
        largestStep,
        condition: conditionOf(factor.triangle),
        residuals: residualsAfter(estimation, moments, state.free, step),
        weight: state.weight,
        jacobian,
        factor,
      };
    }
    const next = search(estimation, criterion, state, step, slope, factor, inside);
    if (next === undefined || iteration >= MOST_ITERATIONS) {
      if (factor.dependent.length > 0) refuseNotIdentified(estimation, factor);
      refuseNotConverged(iteration, largestGradient, largestStep, conditionOf(factor.triangle));
    }
    state = next;
    if (performance.now() - lastSpoken > POLL_MS) {
      lastSpoken = performance.now();
      spoken = {
        step: "iterating",
        iteration,
        gradient: largestGradient,
        largestStep,
        ...(criterion.kind === "likelihood" && {
          logLikelihood: -state.value - (estimation.moments.rows / 2) * estimation.equations.length * LOG_TWO_PI_E,
        }),
      };
      control.progress(spoken);
    }
  }
}

/** ê'ê: what the squares to be saved by a step are compared with; that of rounding where there are no residuals. */
function sizeOf(weighted: Columns): number {
  return Math.max(dot(weighted.values, weighted.values), 1e-14 * weighted.rows);
}

/** 1 + ln 2π: what a normal equation adds to −2 lnL/T beside ln|Σ̂|. */
export const LOG_TWO_PI_E = 1 + Math.log(2 * Math.PI);

function evaluate(estimation: Estimation, criterion: Criterion, free: number[], control: RunControl): State {
  const { moments, form, equations } = estimation;
  const residuals = moments.local?.residuals(expand(form.expand, free), control) ?? residualFactor(moments, form, free);
  if (moments.local !== undefined && !residuals.values.every(Number.isFinite)) {
    // A trial so far off that an exponential of its terms overflows: no criterion is higher.
    const nothing = zeros(equations.length, equations.length);
    return { free, residuals, weight: nothing, weighted: nothing, value: Number.POSITIVE_INFINITY };
  }
  const { weight, logDeterminant } =
    criterion.kind === "weighted"
      ? { weight: criterion.weight, logDeterminant: 0 }
      : residualCovariance(residuals, moments.rows, equations, moments.responseLabels);
  const weighted = weightedResiduals(residuals, equations, weight);
  const value =
    criterion.kind === "weighted" ? 0.5 * dot(weighted.values, weighted.values) : (moments.rows / 2) * logDeterminant;
  return { free, residuals, weight, weighted, value };
}

/** Ê of the equations estimated. */
function weightedResiduals(residuals: Columns, equations: readonly number[], weight: Columns): Columns {
  const chosen = asOneColumn(pickColumns(residuals, equations));
  const { values } = weightBlocks(chosen, residuals.rows, weight);
  return { rows: residuals.rows, columns: equations.length, values };
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
  const unweighted = residualJacobian(moments, form, state.free, equations);
  const jacobian = weightBlocks(unweighted, moments.terms.rows, state.weight);
  const residuals = asOneColumn(weighted);
  const factor = normalFactor(jacobian, residuals);
  const gradient = Float64Array.from({ length: form.free }, (_, f) =>
    dot(jacobian.values.subarray(f * jacobian.rows, (f + 1) * jacobian.rows), residuals.values),
  );
  return { moments, jacobian, factor, gradient, weighted };
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
  factor: NormalFactor,
  jacobian: Columns,
  weighted: Columns,
  rows: number,
): Float64Array {
  if (factor.dependent.length > 0) return dampedStep(factor, 1e-8);
  const newton =
    criterion.kind === "likelihood" && criterion.step === "newton" && rows < ROWS_WITHOUT_NEWTON * jacobian.columns
      ? likelihoodStep(factor, jacobian, weighted, rows)
      : undefined;
  return newton ?? gaussNewtonStep(factor);
}

/** The first of step, ½ step, ¼ step … that lowers the criterion; then ever more damped steps. */
function search(
  estimation: Estimation,
  criterion: Criterion,
  state: State,
  step: Float64Array,
  slope: number,
  factor: NormalFactor,
  control: RunControl,
): State | undefined {
  const rounding = 1e-13 * Math.max(1, Math.abs(state.value));
  const attempt = (by: Float64Array, size: number): State | undefined => {
    const free = state.free.map((value, f) => value + size * by[f]);
    const next = evaluate(estimation, criterion, free, control);
    return next.value <= state.value + rounding ? next : undefined;
  };
  if (slope < 0) {
    for (let halving = 0; halving <= MOST_HALVINGS; halving++) {
      const next = attempt(step, 2 ** -halving);
      if (next !== undefined) return next;
    }
  }
  for (let damping = 1e-4; damping <= MOST_DAMPING; damping *= 10) {
    const next = attempt(dampedStep(factor, damping), 1);
    if (next !== undefined) return next;
  }
  return undefined;
}

function relativeStep(form: CoefficientForm, free: readonly number[], step: Float64Array): number {
  const theta = expand(form.expand, free);
  const moved = expand(
    form.expand,
    free.map((value, f) => value + step[f]),
  );
  return theta.reduce((most, value, a) => Math.max(most, Math.abs(moved[a] - value) / (1 + Math.abs(value))), 0);
}
