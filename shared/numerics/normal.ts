import complementaryErrorInverse from "@stdlib/math-base-special-erfcinv";

// A file of its own: a page that draws intervals needs this and not the tails of other distributions.

/** The z with P(X ≤ z) = p for X standard normal: −√2 erfc⁻¹(2p), from the nearer tail. */
export function normalQuantile(p: number): number {
  if (p > 0.5) return Math.SQRT2 * complementaryErrorInverse(2 * (1 - p));
  return 0 - Math.SQRT2 * complementaryErrorInverse(2 * p);
}
