import { CholeskyDecomposition, Matrix, QrDecomposition } from "ml-matrix";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import type { SystemSize } from "../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import type { RestrictionName, SystemName } from "../../shared/systems/names.ts";
import { logPriceIndex } from "../../shared/systems/price-indices.ts";

/** What the slow path finds. */
export interface RowByRow {
  readonly theta: number[];
  readonly standardErrors: number[];
  readonly logLikelihood: number;
  readonly residualCovariance: number[][];
}

/**
 * Maximum likelihood the obvious way, sharing no code with the estimator: residuals and derivatives of
 * every row and equation from the system's own formulas, stacked into one dense least-squares problem,
 * Σ̂ recomputed after each, until nothing moves or rounding allows no smaller step. Rows weigh √h.
 */
export function rowByRow(
  form: SystemName,
  impose: readonly RestrictionName[],
  data: PreparedData,
  size: SystemSize,
  dropped = data.goods.length - 1,
  start: readonly number[] = SYSTEMS[form].start(size, data.shares.map(meanOf)),
): RowByRow {
  const free = SYSTEMS[form].free(size, impose);
  const kept = data.goods.map((_, i) => i).filter((i) => i !== dropped);
  let phi = free.places.map((place) => start[place]);
  let covariance = Matrix.eye(kept.length);
  let last = Number.POSITIVE_INFINITY;
  for (let round = 0; round < 400; round++) {
    const theta = expand(free, phi);
    const weight = inverseRoot(covariance);
    const { residuals, jacobian } = stacked(form, theta, data, size, free.matrix, kept, weight);
    const step = new QrDecomposition(jacobian).solve(residuals).to1DArray();
    phi = phi.map((value, f) => value + step[f]);
    const moved = step.reduce((most, value, f) => Math.max(most, Math.abs(value) / (1 + Math.abs(phi[f]))), 0);
    covariance = residualCovariance(form, expand(free, phi), data, size, kept);
    if ((moved < 1e-13 || (moved < 1e-7 && moved > 0.5 * last)) && round > 2) break;
    last = moved;
  }
  const theta = expand(free, phi);
  const { jacobian } = stacked(form, theta, data, size, free.matrix, kept, inverseRoot(covariance));
  const information = jacobian.transpose().mmul(jacobian);
  const expanded = new Matrix(free.matrix);
  const spread = expanded.mmul(new CholeskyDecomposition(information).solve(expanded.transpose()));
  const lower = new CholeskyDecomposition(covariance).lowerTriangularMatrix;
  const logDeterminant = 2 * kept.reduce((sum, _, i) => sum + Math.log(lower.get(i, i)), 0);
  const all = data.goods.map((_, i) => i);
  return {
    theta,
    standardErrors: theta.map((_, a) => Math.sqrt(spread.get(a, a))),
    logLikelihood: -(data.rows / 2) * (kept.length * (1 + Math.log(2 * Math.PI)) + logDeterminant),
    residualCovariance: residualCovariance(form, theta, data, size, all).to2DArray(),
  };
}

function expand(free: { matrix: number[][]; offset: number[] }, phi: readonly number[]): number[] {
  return free.matrix.map((row, a) => row.reduce((sum, value, f) => sum + value * phi[f], free.offset[a]));
}

/** Predicted shares of a row and their derivatives by θ, n × k. */
function rowOf(form: SystemName, theta: readonly number[], data: PreparedData, size: SystemSize, t: number) {
  const demographics = [...data.numeric.values()].map((column) => column[t]);
  if (form !== "la-aids") {
    const point = {
      prices: data.logPrices.map((column) => Math.exp(column[t])),
      total: Math.exp(data.logTotal[t]),
      demographics,
    };
    return {
      shares: SYSTEMS[form].slopes(theta, size, point).shares,
      derivatives: SYSTEMS[form].slopeDerivatives(theta, size, point).shares,
    };
  }
  const logIndex = logPriceIndex(
    size.index!,
    data.shares.map((column) => [column[t]]),
    data.logPrices.map((column) => [column[t]]),
  )[0];
  const logPrices = data.logPrices.map((column) => column[t]);
  const derivatives = SYSTEMS[form].layout(size).map((place) => {
    if (place.block === "alpha") return 1;
    if (place.block === "demographic") return demographics[place.column!];
    return place.block === "gamma" ? logPrices[place.column!] : data.logTotal[t] - logIndex;
  });
  const byGood = data.goods.map((_, i) =>
    SYSTEMS[form].layout(size).map((place, a) => (place.good === i ? derivatives[a] : 0)),
  );
  return { shares: byGood.map((row) => row.reduce((sum, value, a) => sum + value * theta[a], 0)), derivatives: byGood };
}

function stacked(
  form: SystemName,
  theta: readonly number[],
  data: PreparedData,
  size: SystemSize,
  restriction: number[][],
  kept: readonly number[],
  weight: Matrix,
) {
  const residuals: number[][] = [];
  const jacobian: number[][] = [];
  const expanded = new Matrix(restriction);
  for (let t = 0; t < data.rows; t++) {
    const { shares, derivatives } = rowOf(form, theta, data, size, t);
    const root = Math.sqrt(data.weights?.[t] ?? 1);
    const errors = Matrix.columnVector(kept.map((i) => root * (data.shares[i][t] - shares[i])));
    const slopes = new Matrix(kept.map((i) => derivatives[i].map((value) => root * value))).mmul(expanded);
    residuals.push(...weight.mmul(errors).to2DArray());
    jacobian.push(...weight.mmul(slopes).to2DArray());
  }
  return { residuals: new Matrix(residuals), jacobian: new Matrix(jacobian) };
}

function residualCovariance(
  form: SystemName,
  theta: readonly number[],
  data: PreparedData,
  size: SystemSize,
  kept: readonly number[],
): Matrix {
  const sum = Matrix.zeros(kept.length, kept.length);
  for (let t = 0; t < data.rows; t++) {
    const { shares } = rowOf(form, theta, data, size, t);
    const errors = Matrix.columnVector(kept.map((i) => data.shares[i][t] - shares[i]));
    sum.add(errors.mmul(errors.transpose()).mul(data.weights?.[t] ?? 1));
  }
  return sum.div(data.rows);
}

/** L⁻¹ for Σ = L L': errors times it have the identity as covariance. */
function inverseRoot(covariance: Matrix): Matrix {
  const lower = new CholeskyDecomposition(covariance).lowerTriangularMatrix;
  return new QrDecomposition(lower).solve(Matrix.eye(covariance.rows));
}

function meanOf(column: Float64Array): number {
  return column.reduce((sum, value) => sum + value, 0) / column.length;
}
