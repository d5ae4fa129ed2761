import { Cancelled } from "../../run.ts";
import { expand } from "../coefficient-form.ts";
import { type Columns, multiply, transposed, zeros } from "../columns.ts";
import { conditionOf } from "../condition.ts";
import { refuseNotConverged } from "../failures.ts";
import { residualFactor } from "../residuals.ts";
import { weightOf } from "../three-stage.ts";
import { invertUpper, semidefiniteCholesky, solveUpper, solveUpperTransposed } from "../triangle.ts";
import { exactCovariance } from "./exact-covariance.ts";
import { type ExactProblem, type ExactSolution, equationsAt } from "./exact-iteration.ts";
import { ExactLikelihood } from "./exact-likelihood.ts";

/** A maximum with the curvature there: the observed information −∂²/∂φ∂φ' of the concentrated likelihood, F × F. */
export interface ExactMaximum extends ExactSolution {
  readonly information: Columns;
}

const TOLERANCE = 1e-10;
const ROUNDING_STEP = 1e-8;
const MOST_ITERATIONS = 200;
const MOST_HALVINGS = 30;
/** Steps that shrink by less than this ask for the second derivatives where they are. */
const SLOWLY = 0.4;
/** Of a standard error: central differences of the exact gradient leave some 1e-7 of the second derivatives. */
const DIFFERENCE = 1e-3;

/**
 * Full information maximum likelihood from a three-stage estimate: Newton's method on the concentrated likelihood with
 * exact gradients and their central differences for the second derivatives, taken anew where steps shrink slowly.
 *
 * Errors: no convergence; a likelihood that is not concave at the start; `Cancelled`.
 */
export function maximiseExact(problem: ExactProblem, from: ExactSolution): ExactMaximum {
  const { estimation, control } = problem;
  const likelihood = new ExactLikelihood(problem);
  const metric = byStages(problem, from);
  const { scale } = metric;
  let free = [...from.solution.free];
  let value = likelihood.value(free);
  // Of three stages first: nearly that of the likelihood, and no pass over the rows for every coefficient.
  let curvature = multiply(metric.inverse, transposed(metric.inverse));
  let settledAt: number[] | undefined;
  let largestStep = Number.POSITIVE_INFINITY;
  for (let iteration = 1; ; iteration++) {
    if (control.cancelled()) throw new Cancelled("cancelled while iterating");
    const gradient = likelihood.gradient(free);
    const step = newtonStep(curvature, gradient, scale);
    const previous = largestStep;
    largestStep = changeOf(estimation.form.expand, free, step);
    const largestGradient = gradient.reduce((most, each) => Math.max(most, Math.abs(each)), 0) / problem.rows.count;
    const condition = conditionOf(semidefiniteCholesky(curvature, 0).factor);
    if (largestStep <= TOLERANCE || (largestStep < ROUNDING_STEP && largestStep >= previous)) {
      free = moved(free, step, 1);
      if (settledAt === undefined || distance(free, settledAt, scale) > DIFFERENCE)
        curvature = informationAt(likelihood, free, metric, problem);
      return finished(problem, from, free, curvature, scale, {
        iterations: from.solution.iterations + iteration,
        gradient: largestGradient,
        largestStep,
        condition,
      });
    }
    const next = uphill(likelihood, free, step, value);
    if (next === undefined || iteration >= MOST_ITERATIONS) {
      refuseNotConverged(iteration, largestGradient, largestStep, condition);
    }
    free = next.free;
    value = next.value;
    control.progress({ step: "iterating", iteration, gradient: largestGradient, largestStep, logLikelihood: value });
    if (largestStep > SLOWLY * previous) {
      curvature = informationAt(likelihood, free, metric, problem);
      settledAt = free;
    }
  }
}

/** What three stages say of φ: standard errors, the units of steps; R with R'R the correlations, and R⁻¹. */
interface Metric {
  readonly scale: readonly number[];
  readonly root: Columns;
  readonly inverse: Columns;
}

function byStages(problem: ExactProblem, from: ExactSolution): Metric {
  const covariance = exactCovariance(problem, from);
  const { places } = problem.estimation.form.expand;
  const scale = places.map((place) => Math.sqrt(covariance[place][place]));
  const correlations = zeros(places.length, places.length);
  places.forEach((a, f) => {
    places.forEach((b, g) => {
      correlations.values[f * places.length + g] = covariance[a][b] / (scale[f] * scale[g]);
    });
  });
  const root = semidefiniteCholesky(correlations, 0).factor;
  return { scale, root, inverse: invertUpper(root) };
}

/**
 * −∂²/∂φ∂φ' in units of `scale`. Differences go along uncorrelated directions of one standard error each, the rows of
 * R: along single coefficients that are nearly collinear the likelihood falls too steeply for them to be accurate.
 */
function informationAt(
  likelihood: ExactLikelihood,
  free: readonly number[],
  { scale, root, inverse }: Metric,
  { control }: ExactProblem,
): Columns {
  const size = free.length;
  const along = (f: number, g: number) => root.values[g * size + f];
  const information = zeros(size, size);
  for (let f = 0; f < size; f++) {
    if (control.cancelled()) throw new Cancelled("cancelled while forming second derivatives");
    control.progress({ step: "forming second derivatives", fraction: f / size });
    const at = (by: number) => likelihood.gradient(free.map((each, g) => each + by * along(f, g) * scale[g]));
    const [up, down] = [at(DIFFERENCE), at(-DIFFERENCE)];
    const change = down.map((each, g) => ((each - up[g]) * scale[g]) / (2 * DIFFERENCE));
    for (let g = 0; g < size; g++) {
      let entry = 0;
      for (let h = g; h < size; h++) entry += along(g, h) * change[h];
      information.values[f * size + g] += entry / 2;
      information.values[g * size + f] += entry / 2;
    }
  }
  return multiply(inverse, multiply(information, transposed(inverse)));
}

/** H⁻¹ g; where the likelihood is not concave, along the gradient in units of standard errors. */
function newtonStep(information: Columns, gradient: Float64Array, scale: readonly number[]): number[] {
  const step = gradient.map((each, f) => each * scale[f]);
  const { factor, dependent } = semidefiniteCholesky(information, 1e-12);
  if (dependent.length === 0) {
    solveUpperTransposed(factor, step);
    solveUpper(factor, step);
  } else {
    const length = Math.hypot(...step) || 1;
    for (let f = 0; f < step.length; f++) step[f] /= Math.max(1, length);
  }
  return Array.from(step, (each, f) => each * scale[f]);
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

const distance = (one: readonly number[], other: readonly number[], scale: readonly number[]) =>
  one.reduce((most, each, f) => Math.max(most, Math.abs(each - other[f]) / scale[f]), 0);

function changeOf(form: Parameters<typeof expand>[0], free: readonly number[], step: readonly number[]): number {
  const from = expand(form, free);
  const to = expand(form, moved(free, step, 1));
  return from.reduce((most, each, a) => Math.max(most, Math.abs(to[a] - each) / (1 + Math.abs(each))), 0);
}

function finished(
  problem: ExactProblem,
  from: ExactSolution,
  free: number[],
  curvature: Columns,
  scale: readonly number[],
  convergence: { iterations: number; gradient: number; largestStep: number; condition: number },
): ExactMaximum {
  const { form } = problem.estimation;
  const theta = expand(form.expand, free);
  const equations = equationsAt(problem, form, theta);
  const residuals = residualFactor(equations.estimation.moments, form, free);
  const weight = weightOf(equations.estimation, { residuals });
  const information = zeros(free.length, free.length);
  for (let f = 0; f < free.length; f++) {
    for (let g = 0; g < free.length; g++) {
      information.values[f * free.length + g] = curvature.values[f * free.length + g] / (scale[f] * scale[g]);
    }
  }
  const { moments } = equations.estimation;
  return {
    solution: { ...from.solution, ...convergence, moments, free, theta, residuals, weight },
    equations,
    information,
  };
}
