import betainc from "@stdlib/math-base-special-betainc";
import gammainc from "@stdlib/math-base-special-gammainc";
import tInverse from "@stdlib/stats-base-dists-t-quantile";

/**
 * Tails are computed as tails (regularised upper incomplete gamma, incomplete beta of the complement),
 * never as 1 − cdf, so that a p-value of 10⁻⁴⁰ is one.
 */

/** P(X > x) for X ~ χ²(df): Q(df/2, x/2). */
export function chiSquareTail(x: number, df: number): number {
  refuseUnlessPositive(df, "degrees of freedom");
  return x <= 0 ? 1 : gammainc(x / 2, df / 2, true, true);
}

/** P(X > f) for X ~ F(a, b): I_{b/(b + a f)}(b/2, a/2). */
export function fTail(f: number, a: number, b: number): number {
  refuseUnlessPositive(a, "numerator degrees of freedom");
  refuseUnlessPositive(b, "denominator degrees of freedom");
  return f <= 0 ? 1 : betainc(b / (b + a * f), b / 2, a / 2, true, false);
}

/** P(|X| > |t|) for X ~ t(df). */
export function tTwoSidedTail(t: number, df: number): number {
  refuseUnlessPositive(df, "degrees of freedom");
  return betainc(df / (df + t * t), df / 2, 0.5, true, false);
}

/** P(|X| > |z|) for X standard normal: the χ²(1) tail of z². */
export function normalTwoSidedTail(z: number): number {
  return chiSquareTail(z * z, 1);
}

/** The t with P(X ≤ t) = p for X ~ t(df). */
export function tQuantile(p: number, df: number): number {
  refuseUnlessPositive(df, "degrees of freedom");
  return tInverse(p, df);
}

function refuseUnlessPositive(value: number, name: string): void {
  if (!(value > 0)) throw new RangeError(`${name} must be positive, not ${value}`);
}
