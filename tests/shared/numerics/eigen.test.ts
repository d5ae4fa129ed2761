import { Matrix as Dense, EigenvalueDecomposition } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { symmetricEigen } from "../../../shared/numerics/eigen.ts";
import { LargestEigenvalue } from "../../../shared/numerics/largest-eigenvalue.ts";
import { type Matrix, multiply, symmetrised, transpose } from "../../../shared/numerics/matrix.ts";
import { type Random, seededRandom } from "../../../shared/numerics/random.ts";

/** Random matrices of every kind that breaks eigenvalue solvers: full, low rank, graded, diagonal, with equal eigenvalues. */
function randomSymmetric(random: Random, kind: number, size: number): Matrix {
  const square = () => Array.from({ length: size }, () => Array.from({ length: size }, () => random.normal()));
  switch (kind) {
    case 0:
      return symmetrised(square());
    case 1: {
      const [first] = square();
      return first.map((a) => first.map((b) => -a * b));
    }
    case 2: {
      const scales = Array.from({ length: size }, (_, i) => 10 ** (-2 * i));
      return symmetrised(square()).map((row, i) => row.map((entry, j) => entry * scales[i] * scales[j]));
    }
    case 3:
      return square().map((row, i) => row.map((entry, j) => (i === j ? entry : 0)));
    default:
      return square().map((row, i) => row.map((_, j) => (i === j ? 1 : 0.5)));
  }
}

function normOf(matrix: Matrix): number {
  return Math.sqrt(matrix.flat().reduce((sum, entry) => sum + entry * entry, 0)) || 1;
}

const matrices = (() => {
  const random = seededRandom(1);
  return Array.from({ length: 500 }, (_, at) => randomSymmetric(random, at % 5, 1 + random.integer(15)));
})();

describe("symmetricEigen", () => {
  test("V diag(λ) V' is the matrix and V is orthogonal, to 1e-14 of its norm", () => {
    for (const matrix of matrices) {
      const { values, vectors } = symmetricEigen(matrix);
      const rebuilt = multiply(
        transpose(vectors),
        vectors.map((vector, r) => vector.map((entry) => values[r] * entry)),
      );
      const norm = normOf(matrix);
      for (const [i, row] of matrix.entries()) {
        for (const [j, entry] of row.entries()) {
          expect(Math.abs(rebuilt[i][j] - entry)).toBeLessThan(1e-14 * norm);
          const product = vectors[i].reduce((sum, a, k) => sum + a * vectors[j][k], 0);
          expect(Math.abs(product - (i === j ? 1 : 0))).toBeLessThan(1e-14);
        }
      }
    }
  });

  test("eigenvalues are those of an independent method (tridiagonal QL of ml-matrix)", () => {
    for (const matrix of matrices) {
      const other = new EigenvalueDecomposition(new Dense(matrix), { assumeSymmetric: true }).realEigenvalues;
      const { values } = symmetricEigen(matrix);
      const sorted = [...other].sort((a, b) => b - a);
      for (const [r, value] of values.entries()) {
        expect(Math.abs(value - sorted[r])).toBeLessThan(2e-14 * normOf(matrix));
      }
    }
  });

  test("a known matrix: 2, −1, −1 beside each other have eigenvalues 3, 1 and vectors of fixed sign", () => {
    const { values, vectors } = symmetricEigen([
      [2, -1],
      [-1, 2],
    ]);
    expect(values[0]).toBeCloseTo(3, 15);
    expect(values[1]).toBeCloseTo(1, 15);
    expect(vectors[0][0]).toBeCloseTo(Math.SQRT1_2, 15);
    expect(vectors[0][1]).toBeCloseTo(-Math.SQRT1_2, 15);
    expect(vectors[1].every((entry) => entry > 0)).toBe(true);
  });

  test("an empty matrix has none, a ragged one and one with a hole are refused", () => {
    expect(symmetricEigen([])).toEqual({ values: [], vectors: [] });
    expect(() => symmetricEigen([[1, 0], [1]])).toThrow("a matrix of 2 rows has a row of 1 entries");
    expect(() => symmetricEigen([[Number.NaN]])).toThrow("not a number");
  });
});

describe("LargestEigenvalue", () => {
  test("agrees with all eigenvalues, one workspace for many matrices", () => {
    const solvers = new Map<number, LargestEigenvalue>();
    for (const matrix of matrices) {
      const size = matrix.length;
      const solver = solvers.get(size) ?? new LargestEigenvalue(size);
      solvers.set(size, solver);
      const [largest] = symmetricEigen(matrix).values;
      expect(Math.abs(solver.of(Float64Array.from(matrix.flat())) - largest)).toBeLessThan(1e-14 * normOf(matrix));
    }
  });

  test("the bound holds exactly on its own side", () => {
    for (const matrix of matrices) {
      const [largest] = symmetricEigen(matrix).values;
      const flat = Float64Array.from(matrix.flat());
      const solver = new LargestEigenvalue(matrix.length);
      const margin = 1e-12 * normOf(matrix);
      expect(solver.allBelow(flat, largest + margin)).toBe(true);
      expect(solver.allBelow(flat, largest - margin)).toBe(false);
    }
  });
});
