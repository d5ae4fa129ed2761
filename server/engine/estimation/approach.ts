import { type Poll, polling, type RunControl } from "../run.ts";
import { type Columns, dot } from "./columns.ts";
import {
  covarianceDerivatives,
  gradientOf,
  normalProducts,
  residualProducts,
  type SparseDerivatives,
  sparseDerivatives,
} from "./contractions.ts";
import { type Criterion, evaluate, type State, wantsNewton } from "./criterion.ts";
import type { Estimation } from "./estimation.ts";
import { gram } from "./gram.ts";
import { iterationProgress, largestGradient } from "./iteration-progress.ts";
import { relativeStep, search } from "./line-search.ts";
import { factorOfProducts, type NormalFactor, projectedOn } from "./normal-factor.ts";
import { gaussNewtonStep, likelihoodStep } from "./steps.ts";

const MOST_ITERATIONS = 400;
/** After a step this small that was so much shorter than the last, squares of derivatives hardly move any more. */
const SMALL_STEP = 1e-2;
const SHORTER = 0.1;

export interface Approach {
  readonly free: number[];
  readonly iterations: number;
  /** Whether the last step was within the tolerance. */
  readonly reached: boolean;
}

/**
 * Iterates as `minimise` does, from contractions of Z'Z instead of derivatives over the rows: many times cheaper,
 * and good to few digits where terms nearly cancel. So it goes as far as it easily gets and leaves the rest, the
 * test of convergence and every refusal to `minimise`. Where terms move with θ it stays at the start.
 *
 * Errors: a singular residual covariance at the start; `Cancelled`.
 */
export function approach(
  estimation: Estimation,
  criterion: Criterion,
  start: readonly number[],
  control: RunControl,
  tolerance: number,
): Approach {
  const { moments, form, equations } = estimation;
  if (moments.local !== undefined) return { free: [...start], iterations: 0, reached: false };
  const poll = polling(control, "iterating");
  const products = gram(moments.terms, poll);
  let state = evaluate(estimation, criterion, [...start], control);
  const { say } = iterationProgress(estimation, criterion, control);
  let previous = Number.POSITIVE_INFINITY;
  let kept: NormalFactor | undefined;
  for (let iteration = 1; ; iteration++) {
    poll();
    const derivatives = sparseDerivatives(form.derivatives(state.free), equations, moments.terms.columns);
    poll();
    const residuals = residualProducts(state.weighted, moments.terms);
    const gradient = gradientOf(derivatives, residuals, state.weight);
    const factor: NormalFactor | undefined =
      kept !== undefined
        ? projectedOn(kept, gradient)
        : factorOfProducts(normalProducts(derivatives, products, state.weight, poll), gradient, poll);
    const leave = { free: state.free, iterations: iteration - 1, reached: false };
    if (factor === undefined) return leave;
    const step = chooseStep(estimation, criterion, state, factor, derivatives, residuals, poll);
    const size = relativeStep(form, state.free, step);
    if (size <= tolerance) {
      return { free: state.free.map((value, f) => value + step[f]), iterations: iteration, reached: true };
    }
    // Steps that shrink no more although they are small are rounding.
    if (iteration >= MOST_ITERATIONS || (size < 1e-4 && size > 0.9 * previous)) return leave;
    const settles = size <= SMALL_STEP && size <= SHORTER * previous;
    kept = settles && !wantsNewton(criterion, estimation) ? factor : undefined;
    previous = size;
    const next = search(estimation, criterion, state, step, dot(gradient, step), factor, control);
    if (next === undefined) return leave;
    state = next;
    say(iteration, largestGradient(gradient, moments.rows), size, state);
  }
}

function chooseStep(
  estimation: Estimation,
  criterion: Criterion,
  { weight }: State,
  factor: NormalFactor,
  derivatives: SparseDerivatives,
  residuals: Columns,
  poll: Poll,
): Float64Array {
  const newton = wantsNewton(criterion, estimation)
    ? likelihoodStep(factor, covarianceDerivatives(derivatives, residuals, weight, poll), estimation.moments.rows, poll)
    : undefined;
  return newton ?? gaussNewtonStep(factor);
}
