/** Small dense matrices as rows of numbers: the form in which findings are stored and read. */

/** Rows of numbers; `matrix[i][j]` is row i, column j. */
export type Matrix = number[][];
export type Vector = readonly number[];

export function zeros(rows: number, columns: number): Matrix {
  return Array.from({ length: rows }, () => new Array<number>(columns).fill(0));
}

export function identity(size: number): Matrix {
  return Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, j) => (i === j ? 1 : 0)));
}

export function transpose(a: Matrix): Matrix {
  const columns = a[0]?.length ?? 0;
  return Array.from({ length: columns }, (_, j) => a.map((row) => row[j]));
}

/** A·B, for A r × m and B m × c; refuses when the inner lengths differ. */
export function multiply(a: Matrix, b: Matrix): Matrix {
  const inner = a[0]?.length ?? 0;
  if (inner !== b.length) {
    throw new RangeError(`the left matrix has ${inner} columns, the right one has ${b.length} rows`);
  }
  const columns = b[0]?.length ?? 0;
  return a.map((row) => {
    const product = new Array<number>(columns).fill(0);
    for (let m = 0; m < inner; m++) {
      const factor = row[m];
      if (factor === 0) continue;
      const right = b[m];
      for (let j = 0; j < columns; j++) product[j] += factor * right[j];
    }
    return product;
  });
}

/** a'b. */
export function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  if (a.length !== b.length) throw new RangeError(`a vector of ${a.length} meets a vector of ${b.length}`);
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}

/** A·v. */
export function multiplyVector(a: Matrix, v: Vector): number[] {
  return a.map((row) => dot(row, v));
}

/** ½(A + A'). */
export function symmetrised(a: Matrix): Matrix {
  return a.map((row, i) => row.map((entry, j) => 0.5 * (entry + a[j][i])));
}

/** max |a_ij|, 0 for an empty matrix. */
export function largestEntry(a: Matrix): number {
  let largest = 0;
  for (const row of a) for (const entry of row) largest = Math.max(largest, Math.abs(entry));
  return largest;
}

/**
 * g'V g, the variance of a quantity with gradient g. V is symmetric and only its lower triangle is read;
 * entries of g that are zero cost nothing.
 */
export function quadraticForm(v: Matrix, g: Vector): number {
  if (g.length !== v.length) {
    throw new RangeError(`the gradient has ${g.length} entries, the covariance ${v.length} rows`);
  }
  const at: number[] = [];
  let sum = 0;
  for (let a = 0; a < g.length; a++) {
    if (g[a] === 0) continue;
    const row = v[a];
    let inner = 0;
    for (const b of at) inner += row[b] * g[b];
    sum += g[a] * (2 * inner + row[a] * g[a]);
    at.push(a);
  }
  return sum;
}

/** Standard error √(g'V g): the delta method. Rounding below zero counts as zero. */
export function standardError(v: Matrix, g: Vector): number {
  return Math.sqrt(Math.max(0, quadraticForm(v, g)));
}

/** J·V·J', r × r for J r × k and V k × k symmetric; exactly symmetric. */
export function sandwich(j: Matrix, v: Matrix): Matrix {
  const half = multiply(j, v);
  const product = zeros(j.length, j.length);
  for (let a = 0; a < j.length; a++) {
    for (let b = 0; b <= a; b++) {
      product[a][b] = dot(half[a], j[b]);
      product[b][a] = product[a][b];
    }
  }
  return product;
}
