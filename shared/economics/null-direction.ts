import type { Matrix } from "../numerics/matrix.ts";

/**
 * Setting the null direction aside. Prices that all rise together compensate themselves, so K ι = 0 and
 * one eigenvalue of the share form is zero whatever the data; the others are those of B'KB with B an
 * orthonormal basis of the directions orthogonal to ι, the first n − 1 columns of the reflection that
 * turns ι/√n into the last axis:
 *
 *     B_j = e_j − c u,   u = ι/√n + e_n,   c = 1/(√n + 1)
 */

/** B'½(K + K')B into `into` ((n − 1)² row by row); `k` is n² row by row, `scratch` has room for n. */
export function projectSymmetricPart(k: ArrayLike<number>, n: number, into: Float64Array, scratch: Float64Array): void {
  const root = Math.sqrt(n);
  const c = 1 / (root + 1);
  let along = 0;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += k[i * n + j] + k[j * n + i];
    const image = 0.5 * (sum / root + k[i * n + n - 1] + k[(n - 1) * n + i]);
    scratch[i] = c * image;
    along += (i === n - 1 ? 1 / root + 1 : 1 / root) * image;
  }
  along *= c * c;
  const m = n - 1;
  for (let i = 0; i < m; i++) {
    for (let j = 0; j <= i; j++) {
      const entry = 0.5 * (k[i * n + j] + k[j * n + i]) - scratch[i] - scratch[j] + along;
      into[i * m + j] = entry;
      into[j * m + i] = entry;
    }
  }
}

/** The same as rows of numbers, (n − 1) × (n − 1). */
export function withoutNullDirection(k: Matrix): Matrix {
  const n = k.length;
  const into = new Float64Array((n - 1) * (n - 1));
  projectSymmetricPart(k.flat(), n, into, new Float64Array(n));
  return Array.from({ length: n - 1 }, (_, i) => Array.from(into.subarray(i * (n - 1), (i + 1) * (n - 1))));
}

/** B y: a direction of n − 1 entries as one over the n goods, orthogonal to ι. */
export function overGoods(direction: readonly number[]): number[] {
  const n = direction.length + 1;
  const root = Math.sqrt(n);
  const sum = direction.reduce((total, entry) => total + entry, 0) / (root + 1);
  return [...direction.map((entry) => entry - sum / root), -sum * (1 / root + 1)];
}
