import { polling, type RunControl } from "../run.ts";
import { type CoefficientForm, expand } from "./coefficient-form.ts";
import { type Criterion, evaluate, type State } from "./criterion.ts";
import type { Estimation } from "./estimation.ts";
import type { NormalFactor } from "./normal-factor.ts";
import { dampedStep } from "./steps.ts";

const MOST_HALVINGS = 12;
const MOST_DAMPING = 1e8;

/** The first of step, ½ step, ¼ step … that lowers the criterion; then ever more damped steps. */
export function search(
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
    const next = attempt(dampedStep(factor, damping, polling(control, "iterating")), 1);
    if (next !== undefined) return next;
  }
  return undefined;
}

/** Largest |Δθ|/(1 + |θ|) of a step. */
export function relativeStep(form: CoefficientForm, free: readonly number[], step: Float64Array): number {
  const theta = expand(form.expand, free);
  const moved = expand(
    form.expand,
    free.map((value, f) => value + step[f]),
  );
  return theta.reduce((most, value, a) => Math.max(most, Math.abs(moved[a] - value) / (1 + Math.abs(value))), 0);
}
