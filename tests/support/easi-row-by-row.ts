import { CholeskyDecomposition, Matrix, QrDecomposition } from "ml-matrix";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import type { FreeForm, SystemSize } from "../../shared/systems/demand-system.ts";
import { easiLayout } from "../../shared/systems/easi-layout.ts";
import { implicitUtility } from "./implicit-utility.ts";

/** How equations weigh: all alike, or by the inverse of the residual covariance of the last round. */
export type Weighting = "alike" | "by residuals";

/**
 * Exact EASI by iterated three-stage least squares the obvious way, sharing no code with the estimator: dense matrices
 * of every row and equation, y from its definition, instruments by QR, rows weighing √h. The covariance is
 * (Q'J)⁻¹ Q'(I ⊗ Ω)Q (Q'J)⁻ᵀ with J by numerical derivatives of the residuals, y moving.
 */
export function easiRowByRow(data: PreparedData, size: SystemSize, free: FreeForm, weighting: Weighting) {
  const n = size.goods;
  const kept = Array.from({ length: n - 1 }, (_, i) => i);
  const layout = easiLayout(size);
  const means = data.shares.map((share) => mean(share, data.weights));
  const restriction = new Matrix(free.matrix);
  const expanded = (phi: readonly number[]) =>
    free.matrix.map((row, a) => row.reduce((sum, value, f) => sum + value * phi[f], free.offset[a]));
  let phi = free.places.map((place) => (layout[place].block === "constant" ? means[layout[place].good] : 0));
  // The squares of all n equations, written in those of n − 1; for the first round of either weighting.
  let weight = Matrix.eye(n - 1).add(Matrix.ones(n - 1, n - 1));
  let round: Round | undefined;
  let last = Number.POSITIVE_INFINITY;
  for (let count = 0; count < 300; count++) {
    round = roundAt(expanded(phi));
    const target = Matrix.sub(round.responses, round.regressors.mmul(Matrix.columnVector(free.offset)));
    const projected = round.projected.mmul(restriction);
    // Ẑ'(W ⊗ I)(w − Zφ) = 0 without a square: Z − Ẑ is orthogonal to the instruments, and so to Ẑ.
    const root = new CholeskyDecomposition(weight).lowerTriangularMatrix.transpose();
    const next = new QrDecomposition(round.times(root, projected)).solve(round.times(root, target)).to1DArray();
    const largest = next.reduce((most, value) => Math.max(most, Math.abs(value)), 1);
    const moved = next.reduce((most, value, f) => Math.max(most, Math.abs(value - phi[f]) / largest), 0);
    phi = next;
    if (weighting === "by residuals") weight = symmetric(inverse(residualCovariance(expanded(phi))));
    if (moved < 1e-12 || (moved < 1e-8 && moved >= last)) break;
    last = moved;
  }
  const q = round!.times(weight, round!.projected.mmul(restriction));
  const jacobian = Matrix.zeros(data.rows * kept.length, phi.length);
  phi.forEach((_, f) => {
    const step = 1e-4;
    const at = (by: number) => residuals(expanded(phi.map((value, g) => (g === f ? value + by : value))), true);
    const [one, other] = [at(step), at(-step)];
    jacobian.setColumn(
      f,
      one.map((value, k) => (other[k] - value) / (2 * step)),
    );
  });
  const bread = new QrDecomposition(q.transpose().mmul(jacobian));
  const omega = residualCovariance(expanded(phi));
  const spread = Matrix.zeros(q.rows, q.columns);
  for (let t = 0; t < data.rows; t++) {
    const block = q.subMatrix(t * kept.length, (t + 1) * kept.length - 1, 0, q.columns - 1);
    spread.setSubMatrix(omega.mmul(block), t * kept.length, 0);
  }
  const meat = q.transpose().mmul(spread);
  const half = bread.solve(meat).transpose();
  const ofFree = bread.solve(half);
  const ofTheta = restriction.mmul(ofFree).mmul(restriction.transpose());
  return {
    theta: expanded(phi),
    standardErrors: layout.map((_, a) => Math.sqrt(Math.max(0, ofTheta.get(a, a)))),
    residualCovariance: residualCovariance(expanded(phi), true).to2DArray(),
  };

  interface Round {
    readonly responses: Matrix;
    /** Terms of every equation by θ, rows times equations × k; and those projected on the instruments. */
    readonly regressors: Matrix;
    readonly projected: Matrix;
    /** A matrix applied to the equations of every row. */
    times(left: Matrix, matrix: Matrix): Matrix;
  }

  function pointOf(t: number) {
    return {
      prices: data.logPrices.map((column) => Math.exp(column[t])),
      total: Math.exp(data.logTotal[t]),
      demographics: [...data.numeric.values()].map((column) => column[t]),
    };
  }

  /** What multiplies θ_a in its own equation at row t. */
  function termsOf(t: number, y: number): number[] {
    const point = pointOf(t);
    const logs = point.prices.map(Math.log);
    return layout.map(({ block, column }) => {
      switch (block) {
        case "constant":
          return 1;
        case "power":
          return y ** (column! + 1);
        case "demographic":
          return point.demographics[column!];
        case "demographic expenditure":
          return point.demographics[column!] * y;
        case "price":
          return logs[column!];
        case "price demographic":
          return point.demographics[Math.floor(column! / n)] * logs[column! % n];
        default:
          return y * logs[column!];
      }
    });
  }

  function roundAt(theta: readonly number[]): Round {
    const root = (t: number) => Math.sqrt(data.weights?.[t] ?? 1);
    const own: number[][] = [];
    const instruments: number[][] = [];
    for (let t = 0; t < data.rows; t++) {
      const shares = data.shares.map((column) => column[t]);
      const y = implicitUtility(theta, size, pointOf(t), shares);
      const instrument = implicitUtility(theta, size, pointOf(t), means);
      own.push(termsOf(t, y).map((value) => value * root(t)));
      instruments.push(termsOf(t, instrument).map((value) => value * root(t)));
    }
    // The terms of one equation: those whose coefficient is of the first good.
    const first = layout.flatMap(({ good }, a) => (good === 0 ? [a] : []));
    const h = new QrDecomposition(new Matrix(instruments.map((row) => first.map((a) => row[a])))).orthogonalMatrix;
    const projectedTerms = h.mmul(h.transpose().mmul(new Matrix(own)));
    const stack = (terms: (t: number, a: number) => number) =>
      new Matrix(own.flatMap((_, t) => kept.map((i) => layout.map(({ good }, a) => (good === i ? terms(t, a) : 0)))));
    return {
      responses: Matrix.columnVector(own.flatMap((_, t) => kept.map((i) => data.shares[i][t] * root(t)))),
      regressors: stack((t, a) => own[t][a]),
      projected: stack((t, a) => projectedTerms.get(t, a)),
      times(left, matrix) {
        const result = Matrix.zeros(matrix.rows, matrix.columns);
        for (let t = 0; t < data.rows; t++) {
          const block = matrix.subMatrix(t * kept.length, (t + 1) * kept.length - 1, 0, matrix.columns - 1);
          result.setSubMatrix(left.mmul(block), t * kept.length, 0);
        }
        return result;
      },
    };
  }

  /** e of the equations kept, row by row; times √h where asked. */
  function residuals(theta: readonly number[], rooted: boolean, equations = kept): number[] {
    return Array.from({ length: data.rows }, (_, t) => {
      const shares = data.shares.map((column) => column[t]);
      const terms = termsOf(t, implicitUtility(theta, size, pointOf(t), shares));
      const root = rooted ? Math.sqrt(data.weights?.[t] ?? 1) : 1;
      return equations.map(
        (i) => root * layout.reduce((rest, { good }, a) => (good === i ? rest - theta[a] * terms[a] : rest), shares[i]),
      );
    }).flat();
  }

  function residualCovariance(theta: readonly number[], all = false): Matrix {
    const equations = all ? data.goods.map((_, i) => i) : kept;
    const e = new Matrix(chunks(residuals(theta, true, equations), equations.length));
    return e.transpose().mmul(e).div(data.rows);
  }
}

const symmetric = (matrix: Matrix) => Matrix.add(matrix, matrix.transpose()).div(2);

function chunks(values: readonly number[], length: number): number[][] {
  return Array.from({ length: values.length / length }, (_, t) => values.slice(t * length, (t + 1) * length));
}

function inverse(matrix: Matrix): Matrix {
  return new CholeskyDecomposition(matrix).solve(Matrix.eye(matrix.rows));
}

function mean(column: Float64Array, weights: Float64Array | undefined): number {
  return column.reduce((sum, value, t) => sum + value * (weights?.[t] ?? 1), 0) / column.length;
}
