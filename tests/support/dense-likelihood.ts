import { CholeskyDecomposition, Matrix, QrDecomposition } from "ml-matrix";

/** Rows of equations as a test forms them from the raw columns, sharing no code with the estimator. */
export interface DenseRows {
  readonly rows: number;
  /** Responses of all goods in row t. */
  observed(t: number): number[];
  /** Predictions of all goods at θ and their derivatives by θ. */
  predicted(theta: readonly number[], t: number): { values: number[]; derivatives: number[][] };
  weight?(t: number): number;
}

/** θ = S φ + s with φ the coefficients at `places`. */
export interface Restrictions {
  readonly matrix: readonly (readonly number[])[];
  readonly offset: readonly number[];
}

/**
 * Maximum likelihood of n − 1 equations by generalised least squares on all rows stacked, Σ̂ recomputed after each
 * step until nothing moves; from φ = `start`.
 */
export function denseLikelihood(
  source: DenseRows,
  { matrix, offset }: Restrictions,
  start: readonly number[],
  kept: readonly number[],
) {
  const expand = (phi: readonly number[]) =>
    matrix.map((row, a) => row.reduce((sum, value, f) => sum + value * phi[f], offset[a]));
  const rootOf = (t: number) => Math.sqrt(source.weight?.(t) ?? 1);
  const residualsAt = (theta: readonly number[], t: number) => {
    const { values } = source.predicted(theta, t);
    return kept.map((i) => rootOf(t) * (source.observed(t)[i] - values[i]));
  };
  const covarianceAt = (theta: readonly number[]) => {
    const all = new Matrix(Array.from({ length: source.rows }, (_, t) => residualsAt(theta, t)));
    return all.transpose().mmul(all).div(source.rows);
  };
  const stacked = (theta: readonly number[], covariance: Matrix) => {
    const lower = new CholeskyDecomposition(covariance).lowerTriangularMatrix;
    const weight = new QrDecomposition(lower).solve(Matrix.eye(kept.length));
    const errors: number[][] = [];
    const slopes: number[][] = [];
    const restriction = new Matrix(matrix.map((row) => [...row]));
    for (let t = 0; t < source.rows; t++) {
      const { derivatives } = source.predicted(theta, t);
      const rows = new Matrix(kept.map((i) => derivatives[i].map((value) => rootOf(t) * value))).mmul(restriction);
      errors.push(...weight.mmul(Matrix.columnVector(residualsAt(theta, t))).to2DArray());
      slopes.push(...weight.mmul(rows).to2DArray());
    }
    return { errors: new Matrix(errors), slopes: new Matrix(slopes) };
  };
  let phi = [...start];
  let covariance = Matrix.eye(kept.length);
  let last = Number.POSITIVE_INFINITY;
  for (let round = 0; round < 300; round++) {
    const { errors, slopes } = stacked(expand(phi), covariance);
    const step = new QrDecomposition(slopes).solve(errors).to1DArray();
    phi = phi.map((value, f) => value + step[f]);
    covariance = covarianceAt(expand(phi));
    const moved = step.reduce((most, value, f) => Math.max(most, Math.abs(value) / (1 + Math.abs(phi[f]))), 0);
    if (round > 2 && (moved < 1e-13 || (moved < 1e-8 && moved > 0.5 * last))) break;
    last = moved;
  }
  const theta = expand(phi);
  const { slopes } = stacked(theta, covariance);
  const restriction = new Matrix(matrix.map((row) => [...row]));
  const information = slopes.transpose().mmul(slopes);
  const spread = restriction.mmul(new CholeskyDecomposition(information).solve(restriction.transpose()));
  const lower = new CholeskyDecomposition(covariance).lowerTriangularMatrix;
  const logDeterminant = 2 * kept.reduce((sum, _, i) => sum + Math.log(lower.get(i, i)), 0);
  return {
    theta,
    standardErrors: theta.map((_, a) => Math.sqrt(Math.max(0, spread.get(a, a)))),
    logLikelihood: -(source.rows / 2) * (kept.length * (1 + Math.log(2 * Math.PI)) + logDeterminant),
  };
}
