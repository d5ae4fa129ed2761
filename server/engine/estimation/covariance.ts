import type { Poll } from "../run.ts";
import { type Columns, columnOf, crossProduct, multiply, zeros } from "./columns.ts";
import type { Estimation } from "./estimation.ts";
import { gram } from "./gram.ts";
import { triangularFactor } from "./householder.ts";
import type { Solution } from "./minimise.ts";
import { weightBlocks } from "./residuals.ts";
import { invertUpper, semidefiniteCholesky } from "./triangle.ts";

/**
 * Conventional covariance of θ̂ (k × k, singular by the restrictions): S A⁻¹S' with A = Ĵ'Ĵ, the
 * derivatives weighted by the Σ̂⁻¹ the estimator used. Right where the estimator is efficient.
 */
export function conventionalCovariance(estimation: Estimation, solution: Solution, poll?: Poll): number[][] {
  const inverse = inverseRoot(solution, poll);
  return outerSquare(estimation, inverse, poll);
}

/**
 * Covariance of least squares while errors are correlated across equations: S A⁻¹B A⁻¹S' with
 * B = Ĵ'(Ω̂ ⊗ I)Ĵ and Ω̂ the residual covariance (divisor T) in the estimator's own metric. Equation by
 * equation it is the textbook σ̂²_i(X'X)⁻¹ with σ̂²_ij (X'X)⁻¹ between equations.
 */
export function leastSquaresCovariance(estimation: Estimation, solution: Solution, poll?: Poll): number[][] {
  const { moments, equations } = estimation;
  const height = moments.terms.rows;
  const weighted = weightBlocks(chosenResiduals(solution, equations), height, solution.weight);
  const triangle = triangularFactor({ rows: height, columns: equations.length, values: weighted.values });
  const root = zeros(equations.length, triangle.rows);
  for (let i = 0; i < triangle.rows; i++) {
    for (let j = 0; j < equations.length; j++) {
      root.values[i * root.rows + j] = triangle.values[j * triangle.rows + i] / Math.sqrt(moments.rows);
    }
  }
  const spread = weightBlocks(solution.jacobian, height, root);
  const inverse = inverseRoot(solution, poll);
  const inner = multiply(gram(spread, poll), inverse, poll);
  const middle = semidefiniteCholesky(crossProduct(inverse, inner, poll), 0, poll).factor;
  return outerSquare(estimation, multiply(inverse, transpose(middle), poll), poll);
}

/**
 * Sandwich covariance of θ̂ (k × k, singular by the restrictions): S A⁻¹B A⁻¹S'·G/(G − 1) with B = Σ_g s_g s_g' of
 * G independent scores, those of rows (heteroskedasticity-robust; White 1980, Econometrica 48) or of clusters
 * (Liang & Zeger 1986, Biometrika 73).
 */
export function sandwichCovariance(
  estimation: Estimation,
  solution: Solution,
  meat: Columns,
  groups: number,
  poll?: Poll,
): number[][] {
  const inverse = inverseRoot(solution, poll);
  const inner = crossProduct(inverse, multiply(meat, inverse, poll), poll);
  for (let k = 0; k < inner.values.length; k++) inner.values[k] *= groups / (groups - 1);
  // In the metric of A every direction counts alike: what falls below this is rounding of a meat of low rank.
  const middle = semidefiniteCholesky(inner, 1e-14, poll).factor;
  return outerSquare(estimation, multiply(inverse, transpose(middle), poll), poll);
}

/** D⁻¹R⁻¹: A⁻¹ is this times its transpose. */
function inverseRoot({ factor }: Solution, poll?: Poll): Columns {
  const inverse = invertUpper(factor.triangle, poll);
  for (let j = 0; j < inverse.columns; j++) {
    const column = columnOf(inverse, j);
    for (let i = 0; i < column.length; i++) column[i] /= factor.lengths[i];
  }
  return inverse;
}

/** S H H'S' of the restrictions θ = S φ + s, exactly symmetric. */
function outerSquare({ form }: Estimation, half: Columns, poll?: Poll): number[][] {
  const { matrix } = form.expand;
  // S' stands on the right, where its many noughts are skipped.
  const restrictions = zeros(form.free, matrix.length);
  matrix.forEach((row, a) => {
    columnOf(restrictions, a).set(row);
  });
  const square = gram(multiply(transpose(half), restrictions, poll), poll);
  return matrix.map((_, a) => Array.from(columnOf(square, a)));
}

function transpose(matrix: Columns): Columns {
  const result = zeros(matrix.columns, matrix.rows);
  for (let j = 0; j < matrix.columns; j++) {
    for (let i = 0; i < matrix.rows; i++) result.values[i * result.rows + j] = matrix.values[j * matrix.rows + i];
  }
  return result;
}

function chosenResiduals(solution: Solution, equations: readonly number[]): Columns {
  const height = solution.residuals.rows;
  const stacked = zeros(height * equations.length, 1);
  equations.forEach((equation, place) => {
    stacked.values.set(columnOf(solution.residuals, equation), place * height);
  });
  return stacked;
}
