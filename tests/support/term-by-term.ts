import { CholeskyDecomposition, Matrix, QrDecomposition } from "ml-matrix";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { sourceAt } from "../../server/engine/estimation/local-moments.ts";
import { momentsRequest, sizeOf } from "../../server/engine/estimation/request.ts";
import { specifiedSystem } from "../../server/engine/estimation/specified-system.ts";
import type { SystemSpecification } from "../../shared/schemas/system.ts";
import type { RowByRow } from "./row-by-row.ts";

/**
 * Maximum likelihood of any registered system the slow way: the terms of every row as they are (neither centred nor
 * whitened nor summed), residuals w − C(θ)Z and their derivatives of every row and equation stacked into one dense
 * least-squares problem, Σ̂ recomputed after each, until nothing moves. Where terms move with θ they are formed anew
 * each time. It starts at `start` and must find its own way from there.
 */
export function termByTerm(
  specification: SystemSpecification,
  data: PreparedData,
  start: readonly number[],
  dropped = data.goods.length - 1,
): RowByRow {
  const system = specifiedSystem(specification, data);
  const size = sizeOf(specification, data);
  const free = system.free(size, specification.impose);
  const request = momentsRequest(specification, data);
  const expand = (phi: readonly number[]) =>
    free.matrix.map((row, a) => row.reduce((sum, weight, f) => sum + weight * phi[f], free.offset[a]));
  const expanded = new Matrix(free.matrix);
  const goods = data.goods.map((_, i) => i);
  const kept = goods.filter((i) => i !== dropped);

  /** Residuals of all equations (n) and derivatives by φ (n × F) of every row, times √h. */
  function rowsAt(theta: readonly number[]) {
    const source = sourceAt(data, request, system.moments, size, theta);
    const coefficients = system.moments.coefficients(theta, size);
    const derivatives = system.moments.derivatives(theta, size);
    return Array.from({ length: source.rows }, (_, t) => {
      const root = Math.sqrt(source.weights?.[t] ?? 1);
      const place = (at: number) => (at === 0 ? 1 : source.columns[at - 1][t]);
      const z = source.terms.map((term) => term.reduce((product, at) => product * place(at), root));
      const errors = goods.map(
        (i) => root * source.responses[i][t] - coefficients[i].reduce((sum, value, k) => sum + value * z[k], 0),
      );
      const byTheta = Matrix.zeros(goods.length, theta.length);
      derivatives.forEach((entries, a) => {
        for (const [i, k, value] of entries) byTheta.set(i, a, byTheta.get(i, a) + value * z[k]);
      });
      return { errors, slopes: byTheta.mmul(expanded) };
    });
  }
  const covarianceOf = (rows: ReturnType<typeof rowsAt>, equations: readonly number[]) => {
    const errors = new Matrix(rows.map((row) => equations.map((i) => row.errors[i])));
    return errors.transpose().mmul(errors).div(rows.length);
  };
  function stacked(rows: ReturnType<typeof rowsAt>, covariance: Matrix) {
    const lower = new CholeskyDecomposition(covariance).lowerTriangularMatrix;
    const weight = new QrDecomposition(lower).solve(Matrix.eye(kept.length));
    const residuals = rows.flatMap((row) =>
      weight.mmul(Matrix.columnVector(kept.map((i) => row.errors[i]))).to2DArray(),
    );
    const jacobian = rows.flatMap((row) => weight.mmul(row.slopes.selection(kept, all(row.slopes))).to2DArray());
    return { residuals: new Matrix(residuals), jacobian: new Matrix(jacobian), lower };
  }

  let phi = free.places.map((place) => start[place]);
  let last = Number.POSITIVE_INFINITY;
  for (let round = 0; round < 400; round++) {
    const rows = rowsAt(expand(phi));
    const { residuals, jacobian } = stacked(rows, covarianceOf(rows, kept));
    const step = new QrDecomposition(jacobian).solve(residuals).to1DArray();
    phi = phi.map((value, f) => value + step[f]);
    const moved = step.reduce((most, value, f) => Math.max(most, Math.abs(value) / (1 + Math.abs(phi[f]))), 0);
    if ((moved < 1e-13 || (moved < 1e-10 && moved > 0.9 * last)) && round > 2) break;
    last = moved;
  }
  const theta = expand(phi);
  const rows = rowsAt(theta);
  const { jacobian, lower } = stacked(rows, covarianceOf(rows, kept));
  const information = jacobian.transpose().mmul(jacobian);
  const spread = expanded.mmul(new CholeskyDecomposition(information).solve(expanded.transpose()));
  const logDeterminant = 2 * kept.reduce((sum, _, i) => sum + Math.log(lower.get(i, i)), 0);
  return {
    theta,
    standardErrors: theta.map((_, a) => Math.sqrt(Math.max(0, spread.get(a, a)))),
    logLikelihood: -(rows.length / 2) * (kept.length * (1 + Math.log(2 * Math.PI)) + logDeterminant),
    residualCovariance: covarianceOf(rows, goods).to2DArray(),
  };
}

function all(matrix: Matrix): number[] {
  return Array.from({ length: matrix.columns }, (_, column) => column);
}
