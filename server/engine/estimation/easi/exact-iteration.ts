import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import { easi } from "../../../../shared/systems/easi.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { polling, type RunControl } from "../../run.ts";
import { expand, systemForm } from "../coefficient-form.ts";
import { type Columns, columnOf, zeros } from "../columns.ts";
import { scaledCondition } from "../condition.ts";
import type { Estimation } from "../estimation.ts";
import type { Solution } from "../minimise.ts";
import { type Moments, type Reduction, reduceRows } from "../moments.ts";
import { withinEquations } from "../solve.ts";
import { type Instrumented, instrument, type Round, untilSettled, weightOf } from "../three-stage.ts";
import { equalWeights } from "../weighting.ts";
import { EasiRows, type RealExpenditure } from "./exact-rows.ts";
import { type ExactSource, exactSource } from "./exact-source.ts";
import { type TurnedForm, turnedForm } from "./turned-form.ts";
import { type WhitenedPrices, whitenedPrices } from "./whitened-prices.ts";

/** The share equations over whitened prices, with y and its instrument at some θ. */
export interface ExactEquations extends Instrumented {
  readonly source: ExactSource;
  readonly real: RealExpenditure;
  /** How the equations' coefficients come from the free ones. */
  readonly turned: TurnedForm;
}

/** A settled estimate and the equations it was settled in, whose coordinates its `jacobian` and `factor` have. */
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
  readonly prices: WhitenedPrices;
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
  const prices = whitenedPrices(data, control);
  return { data, specification, size, estimation, rows, prices, control, ...(reduction && { reduction }) };
}

/** The equations of a form turned over whitened prices, at θ: one pass over the rows. */
export function equationsAt(problem: ExactProblem, turned: TurnedForm, theta: readonly number[]): ExactEquations {
  const { data, specification, size, estimation, rows, prices, control, reduction } = problem;
  const real = rows.realExpenditure(theta, size, control);
  const source = exactSource(data, specification.demographics, size, real, prices.columns);
  const all = reduceRows(source, "exact easi", control, reduction);
  const { terms } = all;
  const leading: Columns = {
    rows: terms.rows,
    columns: source.equationTerms,
    values: terms.values.slice(0, terms.rows * source.equationTerms),
  };
  const moments: Moments = { ...all, terms: leading };
  const instruments = source.instruments.map((term) => columnOf(terms, term));
  const coefficientLabels = turned.places.map((place) => estimation.coefficientLabels[place]);
  const equations = { ...estimation, form: turned.form, moments, coefficientLabels };
  return { ...instrument(equations, instruments, polling(control, "forming equations")), source, real, turned };
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
    const turned = turnedForm(form, size, problem.prices, polling(problem.control, "turning prices"));
    const freeOf = ({ theta }: Solution) => turned.turnBack(theta);
    const thetaOf = (solution: Solution) => expand(form.expand, freeOf(solution));
    let equations: ExactEquations | undefined;
    const next = (last: Solution): Round => {
      equations = equationsAt(problem, turned, thetaOf(last));
      return { equations, weight: weight(last) };
    };
    const free = turned.turn(form.expand.places.map((place) => from.theta[place]));
    const { solution } = untilSettled({ ...from, free, theta: free }, next, problem.control, thetaOf);
    return {
      solution: {
        ...solution,
        free: freeOf(solution),
        theta: thetaOf(solution),
        condition: conditionOfFree(solution, turned),
      },
      equations: equations!,
    };
  };
  switch (specification.estimator) {
    case "least squares":
      return settle(start, estimation.form, () => equal);
    case "seemingly unrelated": {
      // With symmetry in the first step, Σ̂ would depend on the dropped good.
      const form = systemForm(easi, size, withinEquations(specification));
      const first = settle(start, form, () => equal);
      const weight = weightOf(estimation, first.solution);
      return settle({ ...start, iterations: first.solution.iterations }, estimation.form, () => weight);
    }
    default: {
      const first = settle(start, estimation.form, () => equal);
      return settle(first.solution, estimation.form, (last) => weightOf(estimation, last));
    }
  }
}

/** Of the derivatives by the free coefficients themselves, columns scaled to unit length. */
function conditionOfFree({ factor }: Solution, { root }: TurnedForm): number {
  const count = root.columns;
  const product = zeros(count, count);
  for (let f = 0; f < count; f++) {
    const column = columnOf(product, f);
    for (let g = 0; g <= f; g++) {
      const along = root.values[f * count + g] * factor.lengths[g];
      for (let h = 0; h <= g; h++) column[h] += along * factor.triangle.values[g * count + h];
    }
  }
  return scaledCondition(product);
}
