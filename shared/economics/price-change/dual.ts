/**
 * A number with its derivatives in θ (k). Where derivatives are not wanted, as at each of a bootstrap's draws, k is 0 and
 * the same code computes values alone.
 */
export interface Dual {
  readonly value: number;
  readonly gradient: readonly number[];
}

export const constant = (value: number, length: number): Dual => ({
  value,
  gradient: new Array<number>(length).fill(0),
});

/** Σ weight · number. */
export function combination(...terms: readonly (readonly [weight: number, of: Dual])[]): Dual {
  let value = 0;
  const gradient = new Array<number>(terms[0][1].gradient.length).fill(0);
  for (const [weight, of] of terms) {
    if (weight === 0) continue;
    value += weight * of.value;
    for (let a = 0; a < gradient.length; a++) gradient[a] += weight * of.gradient[a];
  }
  return { value, gradient };
}

export const difference = (one: Dual, other: Dual): Dual => combination([1, one], [-1, other]);

export function product(one: Dual, other: Dual): Dual {
  const value = one.value * other.value;
  return { value, gradient: one.gradient.map((entry, a) => entry * other.value + one.value * other.gradient[a]) };
}

export function quotient(above: Dual, below: Dual): Dual {
  const value = above.value / below.value;
  return { value, gradient: above.gradient.map((entry, a) => (entry - value * below.gradient[a]) / below.value) };
}

/** Σ weight_i · number_i. */
export function weighted(weights: readonly number[], numbers: readonly Dual[]): Dual {
  return combination(...numbers.map((number, i) => [weights[i], number] as const));
}
