/** Σ f_r u^r, or its first derivative. */
export function polynomialAt(coefficients: Float64Array, u: number, derivative: 0 | 1): number {
  let value = 0;
  let slope = 0;
  for (let r = coefficients.length - 1; r >= 0; r--) {
    slope = slope * u + value;
    value = value * u + coefficients[r];
  }
  return derivative === 0 ? value : slope;
}

const MOST_STEPS = 200;
const MOST_HALVINGS = 50;
/** In logs of expenditure: a step beyond it could pass over a stretch where the polynomial falls. */
const LONGEST_STEP = 1;

/**
 * The root of a polynomial in the stretch around `start` where it rises: Newton's method with steps of at most 1,
 * halved until the polynomial still rises there and is nearer to nothing. NaN where it does not rise at the start or
 * has no root before it falls.
 *
 * For EASI the polynomial is ln C(p, u, z) − ln x and it rises where cost rises with utility, as it must for utility
 * to mean anything; start = ln x − p'm(0, z), the utility at which only the second-order terms are left.
 */
export function risingRoot(coefficients: Float64Array, start: number): number {
  let u = start;
  let value = polynomialAt(coefficients, u, 0);
  let slope = polynomialAt(coefficients, u, 1);
  for (let count = 0; count < MOST_STEPS; count++) {
    if (!(slope > 0)) return Number.NaN;
    let step = Math.max(-LONGEST_STEP, Math.min(LONGEST_STEP, -value / slope));
    let moved = false;
    for (let halving = 0; halving < MOST_HALVINGS && !moved; halving++) {
      const next = u + step;
      if (next === u) return rounded(coefficients, u, value);
      const nextValue = polynomialAt(coefficients, next, 0);
      const nextSlope = polynomialAt(coefficients, next, 1);
      moved = nextSlope > 0 && Math.abs(nextValue) < Math.abs(value);
      if (moved) {
        u = next;
        value = nextValue;
        slope = nextSlope;
      }
      step /= 2;
    }
    if (!moved || value === 0) return rounded(coefficients, u, value);
  }
  return Number.NaN;
}

/** A dozen roundings of the terms summed: nearer to nothing no step can come. */
const ROUNDING = 12 * Number.EPSILON;

function rounded(coefficients: Float64Array, u: number, value: number): number {
  let size = 0;
  for (let r = coefficients.length - 1; r >= 0; r--) size = size * Math.abs(u) + Math.abs(coefficients[r]);
  return Math.abs(value) <= ROUNDING * size ? u : Number.NaN;
}
