import { symmetricEigen } from "../../../../shared/numerics/eigen.ts";
import { type Matrix, zeros } from "../../../../shared/numerics/matrix.ts";
import type { Slopes } from "../../../../shared/systems/demand-system.ts";

/**
 * A negative semidefinite matrix whose rows sum to zero, K = −B B', B = E L (n × r), with L lower triangular
 * ((n − 1) × r) and E putting what makes columns sum to zero in the last row. Of rank r at most.
 */
export const entriesOfTriangle = (goods: number, rank: number): readonly (readonly [row: number, column: number])[] =>
  Array.from({ length: rank }, (_, column) => column).flatMap((column) =>
    Array.from({ length: goods - 1 - column }, (_, below) => [column + below, column] as const),
  );

/** B from the entries of L, column by column. */
export function factorOf(entries: readonly number[], goods: number, rank: number): Matrix {
  const factor = zeros(goods, rank);
  entriesOfTriangle(goods, rank).forEach(([row, column], at) => {
    factor[row][column] = entries[at];
    factor[goods - 1][column] -= entries[at];
  });
  return factor;
}

/**
 * The entries of an L of the rank asked for whose −B B' is nearest `matrix` (n × n, rows summing to zero) in the
 * sense that eigenvalues of the wrong sign, and the smallest beyond the rank, are set to zero.
 */
export function nearestTriangle(matrix: Matrix, rank: number): number[] {
  const size = matrix.length - 1;
  const { values, vectors } = symmetricEigen(
    Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, j) => -(matrix[i][j] + matrix[j][i]) / 2)),
  );
  const kept = values
    .map((value, at) => ({ value: Math.max(0, value), vector: vectors[at] }))
    .sort((one, two) => two.value - one.value)
    .slice(0, rank);
  const root = Array.from({ length: size }, (_, i) => kept.map(({ value, vector }) => Math.sqrt(value) * vector[i]));
  const triangle = lowerTriangular(root);
  return entriesOfTriangle(matrix.length, rank).map(([row, column]) => triangle[row][column]);
}

/** How many eigenvalues of −matrix, its last good left out, are above `threshold` times the largest. */
export function rankOf(matrix: Matrix, threshold: number): number {
  const size = matrix.length - 1;
  const { values } = symmetricEigen(
    Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, j) => -(matrix[i][j] + matrix[j][i]) / 2)),
  );
  const largest = Math.max(...values.map(Math.abs));
  return values.filter((value) => value > threshold * largest).length;
}

/** F (m × r) turned by reflections from the right until it is lower triangular: F F' stays. */
function lowerTriangular(factor: Matrix): Matrix {
  const turned = factor.map((row) => [...row]);
  const rank = turned[0]?.length ?? 0;
  for (let pivot = 0; pivot < Math.min(rank, turned.length); pivot++) {
    const tail = turned[pivot].slice(pivot);
    const length = Math.hypot(...tail);
    if (length === 0) continue;
    const direction = [...tail];
    direction[0] += tail[0] >= 0 ? length : -length;
    const squares = direction.reduce((sum, entry) => sum + entry * entry, 0);
    for (const row of turned) {
      const along = direction.reduce((sum, entry, at) => sum + entry * row[pivot + at], 0);
      direction.forEach((entry, at) => {
        row[pivot + at] -= (2 * along * entry) / squares;
      });
    }
  }
  return turned;
}

/** K in share form, μ_ij − w_i δ_ij + (w_i + μ_i) w_j: what is to be made negative semidefinite. */
export function compensatedResponses({ shares, total, prices }: Slopes): Matrix {
  return prices.map((row, i) =>
    row.map((slope, j) => slope + (shares[i] + total[i]) * shares[j] - (i === j ? shares[i] : 0)),
  );
}
