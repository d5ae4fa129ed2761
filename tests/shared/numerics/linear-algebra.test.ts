import { describe, expect, test } from "vitest";
import { cholesky } from "../../../shared/numerics/cholesky.ts";
import { leastSquares, solveUpper, triangularFactor } from "../../../shared/numerics/least-squares.ts";
import {
  dot,
  identity,
  type Matrix,
  multiply,
  multiplyVector,
  quadraticForm,
  sandwich,
  standardError,
  transpose,
} from "../../../shared/numerics/matrix.ts";
import { seededRandom } from "../../../shared/numerics/random.ts";

function randomMatrix(seed: number, rows: number, columns: number): Matrix {
  const random = seededRandom(seed);
  return Array.from({ length: rows }, () => Array.from({ length: columns }, () => random.normal()));
}

function gap(a: Matrix, b: Matrix): number {
  expect(a.length).toBe(b.length);
  return Math.max(...a.flatMap((row, i) => row.map((entry, j) => Math.abs(entry - b[i][j]))));
}

describe("matrices", () => {
  test("products, by hand", () => {
    const a = [
      [1, 2],
      [3, 4],
    ];
    expect(multiply(a, [[5], [6]])).toEqual([[17], [39]]);
    expect(multiplyVector(a, [5, 6])).toEqual([17, 39]);
    expect(transpose(a)).toEqual([
      [1, 3],
      [2, 4],
    ]);
    expect(
      quadraticForm(
        [
          [2, 1],
          [1, 3],
        ],
        [1, -2],
      ),
    ).toBe(10);
    expect(standardError([[4]], [1.5])).toBe(3);
  });

  test("J V J' is the product and exactly symmetric", () => {
    const j = randomMatrix(1, 4, 6);
    const root = randomMatrix(2, 6, 6);
    const v = sandwich(root, identity(6));
    const product = sandwich(j, v);
    expect(gap(product, multiply(multiply(j, v), transpose(j)))).toBeLessThan(1e-13);
    expect(product).toEqual(transpose(product));
    expect(Math.abs(product[2][2] - quadraticForm(v, j[2]))).toBeLessThan(1e-13);
  });

  test("lengths that do not meet are refused with both numbers", () => {
    expect(() => multiply([[1, 2]], [[1]])).toThrow("the left matrix has 2 columns, the right one has 1 rows");
    expect(() => dot([1], [1, 2])).toThrow("a vector of 1 meets a vector of 2");
    expect(() => quadraticForm([[1]], [1, 2])).toThrow("the gradient has 2 entries, the covariance 1 rows");
  });
});

describe("cholesky", () => {
  test("factor, determinant, solution and inverse", () => {
    const a = sandwich(randomMatrix(3, 7, 7), identity(7));
    const factor = cholesky(a)!;
    expect(gap(multiply(factor.lower, transpose(factor.lower)), a)).toBeLessThan(1e-13);
    // The condition number of this matrix is about a thousand.
    expect(gap(multiply(a, factor.inverse()), identity(7))).toBeLessThan(1e-11);
    const b = randomMatrix(4, 7, 2);
    expect(gap(multiply(a, factor.solve(b)), b)).toBeLessThan(1e-11);
    expect(
      cholesky([
        [4, 2],
        [2, 3],
      ])!.logDeterminant,
    ).toBeCloseTo(Math.log(8), 14);
  });

  test("none where the matrix is not positive definite", () => {
    expect(
      cholesky([
        [1, 2],
        [2, 1],
      ]),
    ).toBeUndefined();
    expect(cholesky([[0]])).toBeUndefined();
    expect(() => cholesky([[1, 0]])).toThrow("a matrix of 1 rows has a row of 2 entries");
  });
});

describe("least squares", () => {
  test("a line through (1, 1), (2, 2), (3, 4): −2/3 + 3x/2, residual variance and (X'X)⁻¹ by hand", () => {
    const fit = leastSquares(
      [
        [1, 1],
        [1, 2],
        [1, 3],
      ],
      [[1], [2], [4]],
    );
    expect(gap(fit.coefficients, [[-2 / 3], [3 / 2]])).toBeLessThan(1e-14);
    expect(
      gap(fit.inverseGram, [
        [7 / 3, -1],
        [-1, 1 / 2],
      ]),
    ).toBeLessThan(1e-14);
  });

  /**
   * Powers of x on [1, 2] of degree 7 have a condition number near 1e9: squared, as normal equations do, nothing
   * would be left. Coefficients that are whole numbers are recovered to condition number times rounding.
   */
  test("keeps its digits where the normal equations lose them all", () => {
    const coefficients = [3, -1, 4, -1, 5, -9, 2, 6];
    const x = Array.from({ length: 60 }, (_, t) => coefficients.map((_, power) => (1 + t / 59) ** power));
    const y = x.map((row) => [dot(row, coefficients)]);
    const fit = leastSquares(x, y);
    expect(
      gap(
        fit.coefficients,
        coefficients.map((entry) => [entry]),
      ),
    ).toBeLessThan(1e-5);
  });

  test("units of a column change nothing but its own coefficient", () => {
    const x = randomMatrix(5, 30, 3);
    const y = randomMatrix(6, 30, 2);
    const scales = [1e-9, 1, 1e9];
    const fit = leastSquares(x, y);
    const scaled = leastSquares(
      x.map((row) => row.map((entry, j) => entry * scales[j])),
      y,
    );
    const back = scaled.coefficients.map((row, j) => row.map((entry) => entry * scales[j]));
    expect(gap(back, fit.coefficients)).toBeLessThan(1e-13);
  });

  test("a column that depends on those before it is named", () => {
    const x = randomMatrix(7, 20, 2).map(([a, b]) => [a, b, a - 2 * b, 1]);
    expect(() => leastSquares(x, x)).toThrow("column 3 of the regressors is a linear combination of those before it");
    expect(() =>
      leastSquares(
        [
          [1, 0],
          [1, 0],
          [2, 0],
        ],
        [[1], [1], [1]],
      ),
    ).toThrow("column 2 of the regressors");
    expect(() => leastSquares([[1, 2]], [[1]])).toThrow("X has 1 rows, fewer than its 2 columns");
    expect(() => leastSquares([[1]], [[1], [2]])).toThrow("X has 1 rows, Y has 2");
  });

  test("triangular factors of blocks merge to that of all rows", () => {
    const x = randomMatrix(8, 50, 4);
    const merged = triangularFactor([...triangularFactor(x.slice(0, 20)), ...triangularFactor(x.slice(20))]);
    expect(gap(merged, triangularFactor(x))).toBeLessThan(1e-13);
    const short = triangularFactor(x.slice(0, 2));
    expect(short.length).toBe(4);
    expect(gap(multiply(transpose(short), short), multiply(transpose(x.slice(0, 2)), x.slice(0, 2)))).toBeLessThan(
      1e-13,
    );
  });

  test("back substitution", () => {
    expect(
      solveUpper(
        [
          [2, 1],
          [0, 4],
        ],
        [[5], [8]],
      ),
    ).toEqual([[1.5], [2]]);
  });
});
