import { Matrix, QrDecomposition } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { type Columns, zeros } from "../../../../server/engine/estimation/columns.ts";
import { conditionOf } from "../../../../server/engine/estimation/condition.ts";
import { triangularFactor } from "../../../../server/engine/estimation/householder.ts";
import { normalFactor } from "../../../../server/engine/estimation/normal-factor.ts";
import { dampedStep, gaussNewtonStep } from "../../../../server/engine/estimation/steps.ts";
import { semidefiniteCholesky } from "../../../../server/engine/estimation/triangle.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";

const random = seededRandom(15);
function randomColumns(rows: number, columns: number): Columns {
  const matrix = zeros(rows, columns);
  for (let k = 0; k < matrix.values.length; k++) matrix.values[k] = random.normal();
  return matrix;
}
const dense = (matrix: Columns) =>
  new Matrix(
    Array.from({ length: matrix.rows }, (_, i) =>
      Array.from({ length: matrix.columns }, (_, j) => matrix.values[j * matrix.rows + i]),
    ),
  );

describe("the triangular factor", () => {
  it.each([
    [40, 7],
    [7, 7],
    [4, 9],
  ])(
    "of %d rows and %d columns has the matrix's own products, and a diagonal that is not negative",
    (rows, columns) => {
      const matrix = randomColumns(rows, columns);
      const factor = triangularFactor(matrix);
      expect(factor.rows).toBe(Math.min(rows, columns));
      const expected = dense(matrix).transpose().mmul(dense(matrix));
      const actual = dense(factor).transpose().mmul(dense(factor));
      expect(Matrix.sub(actual, expected).abs().max()).toBeLessThan(1e-12);
      for (let i = 0; i < factor.rows; i++) expect(factor.values[i * factor.rows + i]).toBeGreaterThanOrEqual(0);
    },
  );
});

describe("the semidefinite Cholesky factor", () => {
  it("reproduces a singular matrix and marks the column that follows from others", () => {
    const matrix = randomColumns(20, 4);
    for (let r = 0; r < 20; r++) matrix.values[40 + r] = matrix.values[r] - 3 * matrix.values[20 + r];
    const products = dense(matrix).transpose().mmul(dense(matrix));
    const columns = zeros(4, 4);
    products.to2DArray().forEach((row, i) => {
      row.forEach((value, j) => {
        columns.values[j * 4 + i] = value;
      });
    });
    const { factor, dependent } = semidefiniteCholesky(columns, 1e-12);
    expect(dependent).toEqual([2]);
    expect(
      Matrix.sub(dense(factor).transpose().mmul(dense(factor)), products)
        .abs()
        .max(),
    ).toBeLessThan(1e-11);
  });
});

describe.each([
  ["well", 1],
  ["badly", 1e-6],
])("least squares on a %s conditioned matrix", (_, closeness) => {
  const matrix = randomColumns(60, 5);
  for (let r = 0; r < 60; r++) matrix.values[60 + r] = matrix.values[r] + closeness * matrix.values[60 + r];
  const right = randomColumns(60, 1);

  it("agrees with ml-matrix's QR", () => {
    const step = gaussNewtonStep(normalFactor(matrix, right));
    const expected = new QrDecomposition(dense(matrix)).solve(dense(right)).to1DArray();
    const size = Math.max(...expected.map(Math.abs));
    step.forEach((value, f) => {
      expect(Math.abs(-value - expected[f]) / size).toBeLessThan(1e-8);
    });
  });

  it("damped, shrinks with the damping and tends to the undamped step", () => {
    const factor = normalFactor(matrix, right);
    const length = (damping: number) => Math.hypot(...dampedStep(factor, damping));
    expect(length(1)).toBeLessThan(length(1e-3));
    const undamped = gaussNewtonStep(factor);
    const nearly = dampedStep(factor, 1e-24);
    const size = Math.max(...undamped.map(Math.abs));
    undamped.forEach((value, f) => {
      expect(Math.abs(nearly[f] - value) / size).toBeLessThan(1e-6);
    });
  });

  it("tells the condition number", () => {
    const { triangle } = normalFactor(matrix, right);
    const values = dense(triangle).transpose().mmul(dense(triangle));
    const inverse = new QrDecomposition(dense(triangle)).solve(Matrix.eye(5));
    const bound = dense(triangle).norm() * inverse.norm();
    const condition = conditionOf(triangle);
    expect(values.rows).toBe(5);
    expect(condition).toBeLessThanOrEqual(bound);
    expect(condition).toBeGreaterThan(bound / 5);
  });
});
