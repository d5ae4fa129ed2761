import type { Poll, RunControl } from "../run.ts";
import { type Columns, columnOf, zeros } from "./columns.ts";
import type { Estimation } from "./estimation.ts";
import { refuseNotConverged } from "./failures.ts";
import { reduceToTriangle } from "./householder.ts";
import { minimise, type Solution } from "./minimise.ts";
import { residualFactor } from "./residuals.ts";
import { residualCovariance } from "./weighting.ts";

/**
 * Equations whose terms are correlated with their errors, and instruments H that are not: normal equations come from
 * terms and responses projected on H, residuals from the terms themselves.
 */
export interface Instrumented {
  readonly estimation: Estimation;
  /** The same equations over P_H Z and P_H W. */
  readonly projected: Estimation;
  /** Π = (H'H)⁻¹H'Z, |H| × |Z|: Ẑ = H Π. */
  readonly firstStage: Columns;
}

/** Equations beside their instruments, columns of the factor that their terms are columns of; the first the constant. */
export function instrument(estimation: Estimation, instruments: readonly Float64Array[], poll?: Poll): Instrumented {
  const { terms, responses } = estimation.moments;
  const count = instruments.length;
  const height = terms.rows;
  const stacked = zeros(Math.max(height, count), count + terms.columns + responses.columns);
  const columns = [...instruments, ...everyColumn(terms), ...everyColumn(responses)];
  columns.forEach((column, place) => {
    stacked.values.set(column, place * stacked.rows);
  });
  reduceToTriangle(stacked, count, poll);
  const top = (from: number, width: number): Columns => {
    const part = zeros(count, width);
    for (let j = 0; j < width; j++) part.values.set(columnOf(stacked, from + j).subarray(0, count), j * count);
    return part;
  };
  const projectedTerms = top(count, terms.columns);
  return {
    estimation,
    projected: {
      ...estimation,
      moments: {
        ...estimation.moments,
        terms: projectedTerms,
        responses: top(count + terms.columns, responses.columns),
      },
    },
    firstStage: solveLeading(top(0, count), projectedTerms),
  };
}

const everyColumn = (matrix: Columns) => Array.from({ length: matrix.columns }, (_, at) => columnOf(matrix, at));

/** R⁻¹B; a pivot of nothing (an instrument that follows from those before it) has no part in the solution. */
function solveLeading(upper: Columns, right: Columns): Columns {
  const solved: Columns = { ...right, values: right.values.slice() };
  for (let j = 0; j < right.columns; j++) {
    const column = columnOf(solved, j);
    for (let i = upper.columns - 1; i >= 0; i--) {
      const diagonal = columnOf(upper, i);
      const pivot = diagonal[i];
      const value = Math.abs(pivot) <= 1e-12 * Math.hypot(...diagonal.subarray(0, i + 1)) ? 0 : column[i] / pivot;
      column[i] = value;
      for (let k = 0; k < i; k++) column[k] -= value * diagonal[k];
    }
  }
  return solved;
}

/**
 * Generalised least squares of the projected equations at fixed V V' (two-stage least squares where that is the
 * identity; Theil 1953, Basmann 1957), with the residuals of the equations themselves.
 *
 * Errors: coefficients that the instruments do not identify; `Cancelled`.
 */
export function atWeight(
  { estimation, projected }: Instrumented,
  weight: Columns,
  start: readonly number[],
  control: RunControl,
): Solution {
  const solution = minimise(projected, { kind: "weighted", weight }, start, control);
  return { ...solution, residuals: residualFactor(estimation.moments, estimation.form, solution.free) };
}

/**
 * V with V V' = Σ̂⁻¹ from the residuals of a solution, Σ̂ divided by T: at it `atWeight` is three-stage least squares
 * (Zellner & Theil 1962, Econometrica 30).
 */
export function weightOf({ moments, equations }: Estimation, { residuals }: Pick<Solution, "residuals">): Columns {
  return residualCovariance(residuals, moments.rows, equations, moments.responseLabels).weight;
}

const TOLERANCE = 1e-10;
const MOST_ROUNDS = 500;
/** A step of what rounds solve for this small that no longer shrinks is rounding. */
const ROUNDING_STEP = 1e-12;

/** What the next round estimates, at the solution of the last: equations that move with θ, a Σ̂ that follows residuals. */
export interface Round {
  readonly equations: Instrumented;
  readonly weight: Columns;
}

/**
 * Repeats rounds until |Δθ| ≤ 1e-10 (1 + |θ|), or until rounding allows no smaller step of what the rounds solve for.
 * Where that is θ in other coordinates, `thetaOf` says what θ is.
 *
 * Errors: no convergence after 500 rounds; those of a round; `Cancelled`.
 */
export function untilSettled(
  first: Solution,
  next: (last: Solution) => Round,
  control: RunControl,
  thetaOf: (solution: Solution) => readonly number[] = ({ theta }) => theta,
): { solution: Solution; last: Round } {
  let solution = first;
  let solved = Number.POSITIVE_INFINITY;
  for (let rounds = 1; ; rounds++) {
    const last = next(solution);
    const moved = atWeight(last.equations, last.weight, solution.free, control);
    const previous = solved;
    solved = largestChange(solution.theta, moved.theta);
    const largestStep = largestChange(thetaOf(solution), thetaOf(moved));
    solution = { ...moved, iterations: first.iterations + rounds, largestStep };
    if (largestStep <= TOLERANCE || (solved < ROUNDING_STEP && solved >= previous)) return { solution, last };
    if (rounds >= MOST_ROUNDS) refuseNotConverged(rounds, solution.gradient, largestStep, solution.condition);
    control.progress({ step: "iterating", iteration: solution.iterations, largestStep });
  }
}

function largestChange(from: readonly number[], to: readonly number[]): number {
  return from.reduce((most, value, a) => Math.max(most, Math.abs(to[a] - value) / (1 + Math.abs(value))), 0);
}
