import { identity, type Matrix } from "./matrix.ts";

export interface SymmetricEigen {
  /** Largest first. */
  readonly values: number[];
  /** `vectors[r]` is the unit eigenvector of `values[r]`. */
  readonly vectors: Matrix;
}

/** More sweeps than any matrix of the sizes met here needs (convergence is quadratic, five to eight are usual). */
const MOST_SWEEPS = 60;

/**
 * Eigenvalues and eigenvectors of a symmetric matrix, A = V diag(λ) V'.
 *
 * Cyclic Jacobi rotations (Jacobi 1846; Golub & Van Loan 2013, *Matrix Computations*, section 8.5):
 * backward stable, eigenvectors orthogonal to rounding also where eigenvalues meet. The order of the
 * rotations is fixed and a vector's largest entry (the first of equals) is positive, so the answer is
 * the same everywhere. Only the lower triangle is read. Cost O(n³) a sweep.
 */
export function symmetricEigen(matrix: Matrix): SymmetricEigen {
  const size = matrix.length;
  const a = matrix.map((row, i) => {
    if (row.length !== size) throw new RangeError(`a matrix of ${size} rows has a row of ${row.length} entries`);
    return row.map((_, j) => (j <= i ? matrix[i][j] : matrix[j][i]));
  });
  const v = identity(size);
  const negligible = 2 ** -60 * frobeniusNorm(a);
  if (!Number.isFinite(negligible)) throw new RangeError("the matrix has an entry that is not a number");
  let sweep = 0;
  while (sweepOnce(a, v, negligible)) {
    sweep++;
    if (sweep > MOST_SWEEPS) throw new RangeError(`eigenvalues of a ${size} × ${size} matrix did not settle`);
  }
  const order = Array.from({ length: size }, (_, i) => i).sort((i, j) => a[j][j] - a[i][i] || i - j);
  return {
    values: order.map((i) => a[i][i]),
    vectors: order.map((i) => withPositiveLargest(v.map((row) => row[i]))),
  };
}

/** Rotates every pair whose entry is not negligible; false when nothing was left to rotate. */
function sweepOnce(a: Matrix, v: Matrix, negligible: number): boolean {
  let rotated = false;
  for (let p = 0; p < a.length - 1; p++) {
    for (let q = p + 1; q < a.length; q++) {
      if (Math.abs(a[p][q]) <= negligible) continue;
      rotate(a, v, p, q);
      rotated = true;
    }
  }
  return rotated;
}

function frobeniusNorm(a: Matrix): number {
  let sum = 0;
  for (const row of a) for (const entry of row) sum += entry * entry;
  return Math.sqrt(sum);
}

function rotate(a: Matrix, v: Matrix, p: number, q: number): void {
  const ratio = (a[q][q] - a[p][p]) / (2 * a[p][q]);
  const t = (ratio >= 0 ? 1 : -1) / (Math.abs(ratio) + Math.hypot(ratio, 1));
  const c = 1 / Math.hypot(t, 1);
  const s = t * c;
  const change = t * a[p][q];
  a[p][p] -= change;
  a[q][q] += change;
  a[p][q] = 0;
  a[q][p] = 0;
  for (let k = 0; k < a.length; k++) {
    if (k !== p && k !== q) {
      const kp = a[k][p];
      const kq = a[k][q];
      a[k][p] = c * kp - s * kq;
      a[k][q] = s * kp + c * kq;
      a[p][k] = a[k][p];
      a[q][k] = a[k][q];
    }
    const vp = v[k][p];
    const vq = v[k][q];
    v[k][p] = c * vp - s * vq;
    v[k][q] = s * vp + c * vq;
  }
}

/** Entries within this of the largest count as equal to it, so that rounding does not choose the sign. */
const TIE = 1e-9;

/** The vector or its negative, whichever has its largest entry (the first of equals) positive. */
export function withPositiveLargest(vector: readonly number[]): number[] {
  const size = vector.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0);
  const leading = vector.find((entry) => Math.abs(entry) >= size * (1 - TIE)) ?? 0;
  return leading < 0 ? vector.map((entry) => -entry) : [...vector];
}
