import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import { easi } from "../../../../shared/systems/easi.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import type { RunControl } from "../../run.ts";
import { systemForm } from "../coefficient-form.ts";
import { type Columns, columnOf } from "../columns.ts";
import type { Estimation } from "../estimation.ts";
import type { Solution } from "../minimise.ts";
import { type Moments, type Reduction, reduceRows } from "../moments.ts";
import { withinEquations } from "../solve.ts";
import { type Instrumented, instrument, type Round, untilSettled, weightOf } from "../three-stage.ts";
import { equalWeights } from "../weighting.ts";
import { EasiRows, type RealExpenditure } from "./exact-rows.ts";
import { type ExactSource, exactSource } from "./exact-source.ts";

/** The share equations with y and its instrument at some θ. */
export interface ExactEquations extends Instrumented {
  readonly source: ExactSource;
  readonly real: RealExpenditure;
}

/** A settled estimate and the equations it was settled in. */
export interface ExactSolution {
  readonly solution: Solution;
  readonly equations: ExactEquations;
}

/** Everything that stays as it is while θ moves. */
export interface ExactProblem {
  readonly data: PreparedData;
  readonly specification: SystemSpecification;
  readonly size: SystemSize;
  /** Form, equations and labels; its moments are those of the approximate form. */
  readonly estimation: Estimation;
  readonly rows: EasiRows;
  readonly control: RunControl;
  readonly reduction?: Reduction;
}

export function exactProblem(
  specification: SystemSpecification,
  data: PreparedData,
  size: SystemSize,
  estimation: Estimation,
  control: RunControl,
  reduction?: Reduction,
): ExactProblem {
  const rows = new EasiRows(data, specification.demographics);
  return { data, specification, size, estimation, rows, control, ...(reduction && { reduction }) };
}

/** The equations under the form's restrictions at θ: one pass over the rows. */
export function equationsAt(problem: ExactProblem, form: Estimation["form"], theta: readonly number[]): ExactEquations {
  const { data, specification, size, estimation, rows, control, reduction } = problem;
  const real = rows.realExpenditure(theta, size, control);
  const source = exactSource(data, specification.demographics, size, real);
  const all = reduceRows(source, "exact easi", control, reduction);
  const { terms } = all;
  const leading: Columns = {
    rows: terms.rows,
    columns: source.equationTerms,
    values: terms.values.slice(0, terms.rows * source.equationTerms),
  };
  const moments: Moments = { ...all, terms: leading };
  const instruments = source.instruments.map((term) => columnOf(terms, term));
  return { ...instrument({ ...estimation, form, moments }, instruments), source, real };
}

/**
 * The exact form by least squares with instruments, y at the coefficients of the last round until they settle
 * (after Lewbel & Pendakur 2009, whose iterated linear three-stage least squares it is). The words of
 * `estimator` mean
 *
 *     least squares                  two-stage least squares, all equations weighing alike
 *     seemingly unrelated            three-stage least squares at the Σ̂ of two-stage least squares without symmetry
 *     iterated seemingly unrelated   three-stage least squares, Σ̂ following the residuals
 *
 * Errors: coefficients the instruments do not identify, no convergence, utility undefined at a row; `Cancelled`.
 */
export function iterateExact(problem: ExactProblem, start: Solution): ExactSolution {
  const { specification, size, estimation } = problem;
  const equal = equalWeights(estimation.equations.length, true);
  const settle = (from: Solution, form: Estimation["form"], weight: (last: Solution) => Columns): ExactSolution => {
    let equations: ExactEquations | undefined;
    const next = (last: Solution): Round => {
      equations = equationsAt(problem, form, last.theta);
      return { equations, weight: weight(last) };
    };
    const { solution } = untilSettled(from, next, problem.control);
    return { solution, equations: equations! };
  };
  switch (specification.estimator) {
    case "least squares":
      return settle(start, estimation.form, () => equal);
    case "seemingly unrelated": {
      // With symmetry in the first step, Σ̂ would depend on the dropped good.
      const form = systemForm(easi, size, withinEquations(specification));
      const free = form.expand.places.map((place) => start.theta[place]);
      const first = settle({ ...start, free }, form, () => equal);
      const weight = weightOf(estimation, first.solution);
      return settle({ ...start, iterations: first.solution.iterations }, estimation.form, () => weight);
    }
    default: {
      const first = settle(start, estimation.form, () => equal);
      return settle(first.solution, estimation.form, (last) => weightOf(estimation, last));
    }
  }
}
