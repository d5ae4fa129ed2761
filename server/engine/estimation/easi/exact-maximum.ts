import { Cancelled } from "../../run.ts";
import { expand } from "../coefficient-form.ts";
import { type Columns, columnOf, identity, multiply, zeros } from "../columns.ts";
import { scaledCondition } from "../condition.ts";
import { refuseNotConverged } from "../failures.ts";
import { residualFactor } from "../residuals.ts";
import { weightOf } from "../three-stage.ts";
import { invertUpper, semidefiniteCholesky, solveUpper, solveUpperTransposed } from "../triangle.ts";
import { rootOfInformation } from "./exact-covariance.ts";
import { type ExactProblem, type ExactSolution, equationsAt } from "./exact-iteration.ts";
import { ExactLikelihood } from "./exact-likelihood.ts";

/** A maximum with the curvature there. */
export interface ExactMaximum extends ExactSolution {
  readonly information: Information;
}

/** −∂²/∂φ∂φ' of the concentrated likelihood as K'H K. */
interface Information {
  /** K, F × F upper triangular: that of three stages is K'K. */
  readonly root: Columns;
  /** H, F × F: no more than the difference between the two estimators away from the identity. */
  readonly inRoot: Columns;
}

const TOLERANCE = 1e-10;
/** Of a standard error: a step this small that no longer shrinks is rounding of the gradient, a sum over rows. */
const ROUNDING_STEP = 1e-8;
const MOST_ITERATIONS = 200;
const MOST_HALVINGS = 30;
/** Steps that shrink by less than this ask for the second derivatives where they are. */
const SLOWLY = 0.4;
/** Of a standard error: central differences of the exact gradient leave some 1e-7 of the second derivatives. */
const DIFFERENCE = 1e-3;

/**
 * Full information maximum likelihood from a three-stage estimate: Newton's method on the concentrated likelihood with
 * exact gradients and their central differences for the second derivatives, taken anew where steps shrink slowly. Steps
 * and curvature are in the metric K of three stages, so that nearly collinear prices cost neither of them digits.
 *
 * Errors: no convergence; a likelihood that is not concave at the start; `Cancelled`.
 */
export function maximiseExact(problem: ExactProblem, from: ExactSolution): ExactMaximum {
  const { estimation, control } = problem;
  const likelihood = new ExactLikelihood(problem);
  const root = rootOfInformation(problem, from);
  let free = [...from.solution.free];
  let value = likelihood.value(free);
  // Of three stages first: nearly that of the likelihood, and no pass over the rows for every coefficient.
  let inRoot = identity(free.length);
  let settledAt: number[] | undefined;
  let errors = Number.POSITIVE_INFINITY;
  for (let iteration = 1; ; iteration++) {
    if (control.cancelled()) throw new Cancelled("cancelled while iterating");
    const gradient = likelihood.gradient(free);
    const step = newtonStep({ root, inRoot }, gradient);
    const previous = errors;
    errors = errorsOf(root, step);
    const largestStep = changeOf(estimation.form.expand, free, step);
    const largestGradient = gradient.reduce((most, each) => Math.max(most, Math.abs(each)), 0) / problem.rows.count;
    if (largestStep <= TOLERANCE || (errors < ROUNDING_STEP && errors >= previous)) {
      free = moved(free, step, 1);
      if (settledAt === undefined || distance(root, free, settledAt) > DIFFERENCE) {
        inRoot = informationAt(likelihood, free, root, problem);
      }
      return finished(
        problem,
        from,
        free,
        { root, inRoot },
        {
          iterations: from.solution.iterations + iteration,
          gradient: largestGradient,
          largestStep,
          condition: conditionAt({ root, inRoot }),
        },
      );
    }
    const next = uphill(likelihood, free, step, value);
    if (next === undefined || iteration >= MOST_ITERATIONS) {
      refuseNotConverged(iteration, largestGradient, largestStep, conditionAt({ root, inRoot }));
    }
    free = next.free;
    value = next.value;
    control.progress({ step: "iterating", iteration, gradient: largestGradient, largestStep, logLikelihood: value });
    if (errors > SLOWLY * previous) {
      inRoot = informationAt(likelihood, free, root, problem);
      settledAt = free;
    }
  }
}

/** Of the root of −∂²/∂φ∂φ', columns scaled to unit length. */
function conditionAt({ root, inRoot }: Information): number {
  return scaledCondition(multiply(semidefiniteCholesky(inRoot, 0).factor, root));
}

/**
 * H of −∂²/∂φ∂φ' = K'H K. Differences go along uncorrelated directions of one standard error each, the columns of
 * K⁻¹: along single coefficients that are nearly collinear the likelihood falls too steeply for them to be accurate.
 */
function informationAt(
  likelihood: ExactLikelihood,
  free: readonly number[],
  root: Columns,
  { control }: ExactProblem,
): Columns {
  const size = free.length;
  const directions = invertUpper(root);
  const inRoot = zeros(size, size);
  for (let f = 0; f < size; f++) {
    if (control.cancelled()) throw new Cancelled("cancelled while forming second derivatives");
    control.progress({ step: "forming second derivatives", fraction: f / size });
    const direction = columnOf(directions, f);
    const at = (by: number) => likelihood.gradient(free.map((each, g) => each + by * direction[g]));
    const [up, down] = [at(DIFFERENCE), at(-DIFFERENCE)];
    const change = down.map((each, g) => (each - up[g]) / (2 * DIFFERENCE));
    solveUpperTransposed(root, change);
    for (let g = 0; g < size; g++) {
      inRoot.values[f * size + g] += change[g] / 2;
      inRoot.values[g * size + f] += change[g] / 2;
    }
  }
  return inRoot;
}

/** (K'H K)⁻¹ g; where the likelihood is not concave, along the gradient in units of standard errors. */
function newtonStep({ root, inRoot }: Information, gradient: Float64Array): number[] {
  const step = gradient.slice();
  solveUpperTransposed(root, step);
  const { factor, dependent } = semidefiniteCholesky(inRoot, 1e-12);
  if (dependent.length === 0) {
    solveUpperTransposed(factor, step);
    solveUpper(factor, step);
  } else {
    const length = Math.hypot(...step) || 1;
    for (let f = 0; f < step.length; f++) step[f] /= Math.max(1, length);
  }
  solveUpper(root, step);
  return [...step];
}

function uphill(likelihood: ExactLikelihood, free: readonly number[], step: readonly number[], value: number) {
  const rounding = 1e-13 * Math.max(1, Math.abs(value));
  for (let halving = 0; halving <= MOST_HALVINGS; halving++) {
    const next = moved(free, step, 2 ** -halving);
    const reached = likelihood.value(next);
    if (reached >= value - rounding) return { free: next, value: reached };
  }
  return undefined;
}

const moved = (free: readonly number[], step: readonly number[], by: number) =>
  free.map((each, f) => each + by * step[f]);

/** Largest part of a step in uncorrelated directions of one standard error each. */
function errorsOf(root: Columns, step: readonly number[]): number {
  const along = multiply(root, { rows: step.length, columns: 1, values: Float64Array.from(step) }).values;
  return along.reduce((most, each) => Math.max(most, Math.abs(each)), 0);
}

const distance = (root: Columns, one: readonly number[], other: readonly number[]) =>
  errorsOf(
    root,
    one.map((each, f) => each - other[f]),
  );

function changeOf(form: Parameters<typeof expand>[0], free: readonly number[], step: readonly number[]): number {
  const from = expand(form, free);
  const to = expand(form, moved(free, step, 1));
  return from.reduce((most, each, a) => Math.max(most, Math.abs(to[a] - each) / (1 + Math.abs(each))), 0);
}

function finished(
  problem: ExactProblem,
  from: ExactSolution,
  free: number[],
  information: Information,
  convergence: { iterations: number; gradient: number; largestStep: number; condition: number },
): ExactMaximum {
  const theta = expand(problem.estimation.form.expand, free);
  const { turned } = from.equations;
  const equations = equationsAt(problem, turned, theta);
  const { moments } = equations.estimation;
  const residuals = residualFactor(moments, turned.form, turned.turn(free));
  const weight = weightOf(equations.estimation, { residuals });
  return {
    solution: { ...from.solution, ...convergence, moments, free, theta, residuals, weight },
    equations,
    information,
  };
}
