import { Refusal } from "../../refusal.ts";
import { type Columns, columnOf, multiply, transposed, zeros } from "../columns.ts";
import { invertUpper, semidefiniteCholesky, solveUpper } from "../triangle.ts";
import { covarianceOfAll, type Groups } from "./exact-covariance.ts";
import type { ExactProblem } from "./exact-iteration.ts";
import { ExactLikelihood } from "./exact-likelihood.ts";
import type { ExactMaximum } from "./exact-maximum.ts";

/**
 * Covariance of the maximum likelihood estimate: H⁻¹ of the observed information of the concentrated likelihood, or
 * H⁻¹ B H⁻¹·G/(G − 1) with B the outer products of the scores of rows or clusters (White 1982, Econometrica 50).
 *
 * Errors: a likelihood with no maximum there.
 */
export function maximumCovariance(problem: ExactProblem, maximum: ExactMaximum, groups?: Groups): number[][] {
  const { root, inRoot } = maximum.information;
  const { factor, dependent } = semidefiniteCholesky(inRoot, 1e-12);
  if (dependent.length > 0) {
    const names = dependent.map((f) => problem.estimation.coefficientLabels[problem.estimation.form.expand.places[f]]);
    throw new Refusal(
      `The likelihood has no maximum where the iteration ended: it does not bend down in ${names.join(", ")}.`,
    );
  }
  const half = invertUpper(factor);
  for (let f = 0; f < half.columns; f++) solveUpper(root, columnOf(half, f));
  if (groups === undefined) return covarianceOfAll(problem, half);
  const meat = meatOf(problem, maximum, groups);
  const inner = multiply(transposed(half), multiply(meat, half));
  const spread = semidefiniteCholesky(inner, 1e-14).factor;
  return covarianceOfAll(problem, multiply(half, transposed(spread)));
}

/**
 * Σ_g s_g s_g'·G/(G − 1). Σ̂ is estimated too, and the score of φ depends on it where the derivatives of the residuals are
 * correlated with them, as here: s_f = (∂/∂φ_f)_t − (e_t'N_f e_t − tr Σ̂N_f), N_f = Σ̂⁻¹(Σ_τ h_τ e_τ J_τ,f')Σ̂⁻¹/T.
 */
function meatOf(problem: ExactProblem, { solution }: ExactMaximum, groups: Groups): Columns {
  const likelihood = new ExactLikelihood(problem);
  const free = solution.free.length;
  const count = problem.estimation.equations.length;
  const cross = Array.from({ length: free }, () => new Float64Array(count * count));
  const derivative = new Float64Array(count);
  likelihood.forEachScore(solution.free, (weight, row) => {
    for (let f = 0; f < free; f++) {
      likelihood.derivativeOf(f, row, derivative);
      for (let i = 0; i < count; i++) {
        for (let j = 0; j < count; j++) cross[f][i * count + j] += weight * row.scaled[i] * derivative[j];
      }
    }
  });
  const scores = Array.from({ length: groups.count }, () => new Float64Array(free));
  const trace = cross.map((matrix) => {
    // e'N e averages tr ΣN over rows, which is tr(Σ̂⁻¹ Σ_τ e_τ J_τ')/T.
    let sum = 0;
    for (let i = 0; i < count; i++) sum += matrix[i * count + i];
    return sum / problem.rows.count;
  });
  likelihood.forEachScore(solution.free, (weight, row, t) => {
    const score = scores[groups.of[t]];
    for (let f = 0; f < free; f++) {
      let quadratic = 0;
      for (let i = 0; i < count; i++) {
        for (let j = 0; j < count; j++) quadratic += row.residual[i] * cross[f][i * count + j] * row.scaled[j];
      }
      score[f] += weight * (row.score[f] - (quadratic / problem.rows.count - trace[f]));
    }
  });
  const meat = zeros(free, free);
  const factor = groups.count / (groups.count - 1);
  for (const score of scores) {
    for (let g = 0; g < free; g++) {
      const column = columnOf(meat, g);
      for (let f = 0; f < free; f++) column[f] += factor * score[f] * score[g];
    }
  }
  return meat;
}
