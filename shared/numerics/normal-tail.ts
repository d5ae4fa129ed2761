import complementaryError from "@stdlib/math-base-special-erfc";

/** Below this the tail is computed relative to the density, which underflows long after nothing else does. */
const FAR = -3;
/** Terms of the continued fraction: at |z| = 3 what is left out is below 1e-25 of the value. */
const TERMS = 50;
const LOG_ROOT_TWO_PI = 0.5 * Math.log(2 * Math.PI);

/** φ(z), the standard normal density. */
export function normalDensity(z: number): number {
  return Math.exp(-0.5 * z * z - LOG_ROOT_TWO_PI);
}

/** Φ(z) = P(X ≤ z) for X standard normal, ½ erfc(−z/√2): a tail is computed as a tail. */
export function normalProbability(z: number): number {
  return 0.5 * complementaryError(-z / Math.SQRT2);
}

/**
 * ln Φ(z), standard normal, to rounding for every z a double holds: where Φ itself would underflow, −z²/2 − ½ ln 2π
 * plus the logarithm of Mills' ratio; above zero ln(1 − Φ(−z)) through the small tail.
 */
export function logNormalProbability(z: number): number {
  if (z < FAR) return -0.5 * z * z - LOG_ROOT_TWO_PI + Math.log(tailOverDensity(-z));
  return z < 0 ? Math.log(normalProbability(z)) : Math.log1p(-normalProbability(-z));
}

/**
 * Inverse Mills ratio φ(z)/Φ(z) = d ln Φ/dz (Heckman 1979, Econometrica 47): tends to −z far below zero and to 0 far
 * above. Its own derivative is −λ(z)(λ(z) + z).
 */
export function inverseMillsRatio(z: number): number {
  return z < FAR ? 1 / tailOverDensity(-z) : normalDensity(z) / normalProbability(z);
}

/** (1 − Φ(x))/φ(x) = 1/(x + 1/(x + 2/(x + 3/…))) for x > 3 (Laplace 1805), from its last term up. */
function tailOverDensity(x: number): number {
  let below = x;
  for (let term = TERMS; term >= 1; term--) below = x + term / below;
  return 1 / below;
}
