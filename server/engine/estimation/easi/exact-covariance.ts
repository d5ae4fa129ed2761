import { type Columns, columnOf, crossProduct, dot, multiply, pickColumns, transposed, zeros } from "../columns.ts";
import { reduceToTriangle, triangularFactor } from "../householder.ts";
import { asOneColumn, weightBlocks } from "../residuals.ts";
import { semidefiniteCholesky, solveUpper, solveUpperTransposed } from "../triangle.ts";
import type { ExactEquations, ExactProblem, ExactSolution } from "./exact-iteration.ts";
import { RowDerivatives } from "./row-derivatives.ts";
import { loadEntries, packedEntries, termValue, timesSymmetric } from "./row-terms.ts";

/**
 * The estimating equations of the settled estimate are Σ_t Q_t e_t(φ) = 0 with Q_t = Ẑ_t'(W ⊗ ·) from the first stage,
 * and y in e_t moves with φ. Hence, V = A⁻¹ B A⁻ᵀ with
 *
 *     A = Σ_t Q_t ∂e_t/∂φ' = Ẑ'(W ⊗ I)Ẑ + Σ_t Ẑ_t'W v_t (∂y_t/∂φ)',   B = Σ_t Q_t Ω Q_t'
 *
 * W the weight the estimator used and Ω the residual covariance, divided by T (conventional), or B = Σ_t Q_t e_t e_t'Q_t'
 * over rows or clusters times G/(G − 1). Leaving ∂y/∂φ out of A, as the last linear step does, would be wrong by
 * as much as the price effects move y. Hansen (1982, Econometrica 50), theorem 3.1. All of it is in the coordinates in
 * which the equations are well conditioned: A is as it is squared.
 */
export function exactCovariance(problem: ExactProblem, exact: ExactSolution, groups?: Groups): number[][] {
  const { bread, spread } = breadAndSpread(problem, exact, groups);
  const half = solveSquare(bread, transposed(spread));
  for (let f = 0; f < half.columns; f++) solveUpper(exact.equations.turned.root, columnOf(half, f));
  return covarianceOfAll(problem, half);
}

/** S H H'S' for H H' the covariance of the free coefficients. */
export function covarianceOfAll({ estimation }: ExactProblem, half: Columns): number[][] {
  const { matrix } = estimation.form.expand;
  const restriction = zeros(matrix.length, half.rows);
  matrix.forEach((row, a) => {
    row.forEach((weight, f) => {
      restriction.values[f * matrix.length + a] = weight;
    });
  });
  const rows = transposed(multiply(restriction, half));
  return matrix.map((_, a) => matrix.map((__, b) => dot(columnOf(rows, a), columnOf(rows, b))));
}

/**
 * K, F × F upper triangular, with (K'K)⁻¹ the conventional covariance of the free coefficients.
 */
export function rootOfInformation(problem: ExactProblem, exact: ExactSolution): Columns {
  const { bread, spread } = breadAndSpread(problem, exact);
  // R'⁻¹ A by columns, in the coordinates of the equations; then in those of φ.
  for (let f = 0; f < bread.columns; f++) solveUpperTransposed(spread, columnOf(bread, f));
  return triangularFactor(multiply(bread, exact.equations.turned.root));
}

/** A, and the triangular root of B. */
function breadAndSpread(problem: ExactProblem, exact: ExactSolution, groups?: Groups) {
  const { bread, meat } = breadAndMeat(problem, exact, groups);
  const spread =
    meat === undefined ? triangularFactor(conventionalSpread(exact)) : semidefiniteCholesky(meat, 1e-14).factor;
  return { bread, spread };
}

/** Rows or clusters whose scores are independent: the group of each row. */
export interface Groups {
  readonly of: ArrayLike<number>;
  readonly count: number;
}

/** B = spread'spread for Ω the residual covariance: the weighted derivatives times a root of V'ΩV. */
function conventionalSpread({ equations, solution }: ExactSolution): Columns {
  const { estimation, projected } = equations;
  const kept = asOneColumn(pickColumns(solution.residuals, estimation.equations));
  const height = solution.residuals.rows;
  const count = estimation.equations.length;
  const weighted: Columns = {
    rows: height,
    columns: count,
    values: weightBlocks(kept, height, solution.weight).values,
  };
  const inner = crossProduct(weighted, weighted);
  for (let k = 0; k < inner.values.length; k++) inner.values[k] /= estimation.moments.rows;
  const root = semidefiniteCholesky(inner, 0).factor;
  return weightBlocks(solution.jacobian, projected.moments.terms.rows, transposed(root));
}

function breadAndMeat(problem: ExactProblem, { equations, solution }: ExactSolution, groups: Groups | undefined) {
  const { rows, size, control } = problem;
  const { turned } = equations;
  const { form, equations: kept } = equations.estimation;
  const free = solution.free.length;
  const bread = crossProduct(solution.jacobian, solution.jacobian);
  const meat = groups && zeros(free, free);
  const scores = groups && Array.from({ length: groups.count }, () => new Float64Array(free));
  const derivatives = new RowDerivatives(solution.theta, size, problem.estimation.form.expand, rows, equations.real);
  const projections = projectedTerms(equations);
  const weight = multiply(solution.weight, transposed(solution.weight)).values;
  const entries = packedEntries(turned.form.derivatives(turned.form.expand.offset), kept);
  const coefficients = form.coefficients(turned.turn(solution.free));
  const picked = new Float64Array(kept.length);
  const scaled = new Float64Array(kept.length);
  const loaded = new Float64Array(free);
  const byTurned = new Float64Array(free);
  for (let t = 0; t < rows.count; t++) {
    if (t % 4096 === 0) control.progress({ step: "forming scores", fraction: t / rows.count });
    rows.read(t);
    derivatives.at(t);
    projections.at(t);
    const h = rows.weight(t);
    pick(derivatives.tilts, kept, picked);
    timesSymmetric(weight, picked, scaled);
    loadEntries(entries, projections.projected, scaled, loaded);
    byTurned.set(derivatives.byFree);
    solveUpperTransposed(turned.root, byTurned);
    for (let g = 0; g < free; g++) {
      const by = h * byTurned[g];
      if (by === 0) continue;
      const column = columnOf(bread, g);
      for (let f = 0; f < free; f++) column[f] += loaded[f] * by;
    }
    if (groups === undefined || scores === undefined) continue;
    kept.forEach((equation, place) => {
      let value = rows.shares[equation];
      projections.terms.forEach((term, at) => {
        value -= coefficients[equation][at] * term;
      });
      picked[place] = value;
    });
    timesSymmetric(weight, picked, scaled);
    loadEntries(entries, projections.projected, scaled, loaded);
    const score = scores[groups.of[t]];
    for (let f = 0; f < free; f++) score[f] += h * loaded[f];
  }
  if (meat && scores) {
    const factor = scores.length / (scores.length - 1);
    for (const score of scores) {
      for (let g = 0; g < free; g++) {
        const column = columnOf(meat, g);
        for (let f = 0; f < free; f++) column[f] += factor * score[f] * score[g];
      }
    }
  }
  return { bread, meat };
}

/** Z_t and its projection Ẑ_t = Π'H_t. */
function projectedTerms({ source, firstStage }: ExactEquations) {
  const terms = new Float64Array(source.equationTerms);
  const projected = new Float64Array(source.equationTerms);
  const instruments = source.instruments.map((term) => source.terms[term]);
  return {
    terms,
    projected,
    at(t: number): void {
      for (let term = 0; term < terms.length; term++) terms[term] = termValue(source, source.terms[term], t);
      projected.fill(0);
      instruments.forEach((pair, at) => {
        const value = termValue(source, pair, t);
        for (let term = 0; term < projected.length; term++) {
          projected[term] += value * firstStage.values[term * firstStage.rows + at];
        }
      });
    },
  };
}

/** The equations estimated out of all n. */
function pick(values: ArrayLike<number>, kept: readonly number[], into: Float64Array): void {
  for (let i = 0; i < kept.length; i++) into[i] = values[kept[i]];
}

/** A⁻¹ R for a square A, by reflections. */
function solveSquare(square: Columns, right: Columns): Columns {
  const size = square.columns;
  const stacked = zeros(size, size + right.columns);
  stacked.values.set(square.values);
  stacked.values.set(right.values, size * size);
  reduceToTriangle(stacked, size);
  const upper: Columns = { rows: size, columns: size, values: stacked.values.subarray(0, size * size) };
  const solved: Columns = { rows: size, columns: right.columns, values: stacked.values.slice(size * size) };
  for (let j = 0; j < right.columns; j++) solveUpper(upper, columnOf(solved, j));
  return solved;
}
