/** Laguerre's iteration from above converges cubically; bisection's worst case is never needed. */
const MOST_STEPS = 100;

/**
 * Largest eigenvalue of many small symmetric matrices of one size, and whether it is below a bound,
 * without allocating: made once, called for each row of a sample.
 *
 * The matrix is reduced to a tridiagonal one by Householder reflections (Golub & Van Loan 2013, section
 * 8.3); its characteristic polynomial has real roots only, so Laguerre's iteration started at the
 * Gershgorin bound falls monotonically to the largest. Error a few roundings of the matrix's norm.
 */
export class LargestEigenvalue {
  private readonly size: number;
  private readonly work: Float64Array;
  private readonly diagonal: Float64Array;
  private readonly squared: Float64Array;
  private readonly reflection: Float64Array;

  constructor(size: number) {
    this.size = size;
    this.work = new Float64Array(size * size);
    this.diagonal = new Float64Array(size);
    this.squared = new Float64Array(size);
    this.reflection = new Float64Array(size);
  }

  /** Largest eigenvalue of the symmetric `matrix` (size², row by row; the lower triangle is read). */
  of(matrix: Float64Array): number {
    const { size } = this;
    if (size === 0) return Number.NEGATIVE_INFINITY;
    if (size === 1) return matrix[0];
    this.work.set(matrix);
    this.tridiagonalise();
    return this.largestRoot();
  }

  /** True when every eigenvalue of `matrix` is below `bound`: the Cholesky factor of bound·I − A exists. */
  allBelow(matrix: Float64Array, bound: number): boolean {
    const { size, work } = this;
    for (let i = 0; i < size; i++) {
      for (let j = 0; j <= i; j++) {
        let sum = (i === j ? bound : 0) - matrix[i * size + j];
        for (let m = 0; m < j; m++) sum -= work[i * size + m] * work[j * size + m];
        if (i === j) {
          if (!(sum > 0)) return false;
          work[i * size + i] = Math.sqrt(sum);
        } else {
          work[i * size + j] = sum / work[j * size + j];
        }
      }
    }
    return true;
  }

  /** Leaves d_i on the diagonal and e_i², the squared entry beside it, from the last row upwards. */
  private tridiagonalise(): void {
    const { size, work, diagonal, squared, reflection } = this;
    for (let last = size - 1; last > 0; last--) {
      const row = last * size;
      let square = 0;
      for (let k = 0; k < last; k++) square += work[row + k] * work[row + k];
      squared[last] = square;
      diagonal[last] = work[row + last];
      const beside = work[row + last - 1];
      const rest = square - beside * beside;
      if (last === 1 || rest <= 0) {
        if (last > 1) squared[last] = beside * beside;
        continue;
      }
      for (let k = 0; k < last; k++) reflection[k] = work[row + k];
      reflection[last - 1] += beside < 0 ? -Math.sqrt(square) : Math.sqrt(square);
      this.reflect(last, square + Math.abs(beside) * Math.sqrt(square));
    }
    diagonal[0] = work[0];
    squared[0] = 0;
  }

  /** A ← H A H on the leading block, H = I − v v'/half with half = ½ v'v: A − v q' − q v'. */
  private reflect(block: number, half: number): void {
    const { size, work, reflection: v } = this;
    const row = block * size;
    let along = 0;
    for (let i = 0; i < block; i++) {
      let sum = 0;
      for (let j = 0; j <= i; j++) sum += work[i * size + j] * v[j];
      for (let j = i + 1; j < block; j++) sum += work[j * size + i] * v[j];
      work[row + i] = sum / half;
      along += v[i] * work[row + i];
    }
    along /= 2 * half;
    for (let i = 0; i < block; i++) work[row + i] -= along * v[i];
    for (let i = 0; i < block; i++) {
      for (let j = 0; j <= i; j++) work[i * size + j] -= v[i] * work[row + j] + work[row + i] * v[j];
    }
  }

  private largestRoot(): number {
    let root = this.gershgorin();
    for (let step = 0; step < MOST_STEPS; step++) {
      const next = root - this.laguerreStep(root);
      if (!(next < root)) return root;
      root = next;
    }
    return root;
  }

  private gershgorin(): number {
    const { size, diagonal, squared } = this;
    let bound = Number.NEGATIVE_INFINITY;
    for (let i = 0; i < size; i++) {
      const above = i + 1 < size ? Math.sqrt(squared[i + 1]) : 0;
      bound = Math.max(bound, diagonal[i] + Math.sqrt(squared[i]) + above);
    }
    return bound;
  }

  /**
   * size / (G + √((size − 1)(size·H − G²))) with G = Σ 1/(x − λ) and H = Σ 1/(x − λ)², from the ratios
   * r_i = p_i/p_{i−1} of the leading minors of xI − A and their logarithmic derivatives; 0 once x is no
   * longer above every eigenvalue by more than rounding.
   */
  private laguerreStep(x: number): number {
    const { size, diagonal, squared } = this;
    let ratio = 1;
    let first = 0;
    let second = 0;
    let g = 0;
    let h = 0;
    for (let i = 0; i < size; i++) {
      const before = squared[i] / ratio;
      const slope = i === 0 ? 1 : 1 + (before * first) / ratio;
      const curve = i === 0 ? 0 : (before * (second - (2 * first * first) / ratio)) / ratio;
      ratio = x - diagonal[i] - before;
      if (!(ratio > 0)) return 0;
      first = slope;
      second = curve;
      g += first / ratio;
      h += (first / ratio) ** 2 - second / ratio;
    }
    const spread = (size - 1) * (size * h - g * g);
    return size / (g + Math.sqrt(Math.max(0, spread)));
  }
}
