import type { SystemSize } from "./demand-system.ts";
import { type EasiParts, easiParts } from "./easi-layout.ts";
import { polynomialAt, risingRoot } from "./easi-utility.ts";

/**
 * EASI at a point, overwritten by each call of `at` or `atUtility`: everything the shares, their slopes and the
 * derivatives in θ are made of. With p in logs throughout,
 *
 *     F(u) = u + p'm(u,z) + ½ p'A(z)p + ½ u p'Bp − ln x,   F_u = 1 + p'm_u + ½ p'Bp,   F_uu = p'm_uu
 *     w_i = m_i + (A p)_i + u (B p)_i,   v_i = ∂w_i/∂u = m_u,i + (B p)_i
 *     s_j = ∂ln C/∂ln p_j = m_j + (Ā p)_j + u (B̄ p)_j,   Ā = ½(A + A')
 */
export interface EasiPoint {
  readonly parts: EasiParts;
  utility: number;
  /** F_u and F_uu. */
  rise: number;
  bend: number;
  /** w. */
  readonly shares: Float64Array;
  /** v. */
  readonly tilts: Float64Array;
  /** m_uu. */
  readonly bends: Float64Array;
  /** s. */
  readonly gradient: Float64Array;
  /** s_u = m_u + B̄ p. */
  readonly gradientTilts: Float64Array;
  /** A(z), n × n row by row. */
  readonly matrix: Float64Array;
  /** At the utility that solves F(u) = 0; NaN in everything that depends on it where there is none. */
  at(logPrices: ArrayLike<number>, logTotal: number, demographics: ArrayLike<number>): void;
  /** At a given utility; returns ln C(p, u, z). */
  atUtility(logPrices: ArrayLike<number>, utility: number, demographics: ArrayLike<number>): number;
}

export function easiPoint(theta: readonly number[], size: SystemSize): EasiPoint {
  const { goods: n } = size;
  const parts = easiParts(theta, size);
  const { degree, crossed, shifted, tilted } = parts.places;
  const width = degree + 1;
  const { power, demographic, cross, price, shift, tilt } = parts;
  /** m_i(u) = Σ_r levels[i, r] u^r at the demographics of the point. */
  const levels = new Float64Array(n * width);
  const matrix = new Float64Array(n * n);
  const effects = new Float64Array(n);
  const effectsMeant = new Float64Array(n);
  const tiltEffects = new Float64Array(n);
  const tiltMeant = new Float64Array(n);
  const polynomial = new Float64Array(width);

  /** Everything but utility, and F + ln x as a polynomial in u. */
  const prepare = (p: ArrayLike<number>, z: ArrayLike<number>) => {
    polynomial.fill(0);
    polynomial[1] = 1;
    for (let i = 0; i < n; i++) {
      for (let r = 0; r < width; r++) levels[i * width + r] = power[i * width + r];
      for (let k = 0; k < z.length; k++) levels[i * width] += demographic[i * z.length + k] * z[k];
      for (let k = 0; k < crossed; k++) levels[i * width + 1] += cross[i * crossed + k] * z[k];
      for (let r = 0; r < width; r++) polynomial[r] += p[i] * levels[i * width + r];
      for (let j = 0; j < n; j++) {
        let entry = price[i * n + j];
        for (let k = 0; k < shifted; k++) entry += shift[(i * shifted + k) * n + j] * z[k];
        matrix[i * n + j] = entry;
      }
    }
    let square = 0;
    let tiltSquare = 0;
    for (let i = 0; i < n; i++) {
      let own = 0;
      let turned = 0;
      let ownTilt = 0;
      let turnedTilt = 0;
      for (let j = 0; j < n; j++) {
        own += matrix[i * n + j] * p[j];
        turned += matrix[j * n + i] * p[j];
        if (tilted === 0) continue;
        ownTilt += tilt[i * n + j] * p[j];
        turnedTilt += tilt[j * n + i] * p[j];
      }
      effects[i] = own;
      effectsMeant[i] = 0.5 * (own + turned);
      tiltEffects[i] = ownTilt;
      tiltMeant[i] = 0.5 * (ownTilt + turnedTilt);
      square += p[i] * own;
      tiltSquare += p[i] * ownTilt;
    }
    polynomial[1] += 0.5 * tiltSquare;
    return 0.5 * square;
  };

  const fill = (u: number, p: ArrayLike<number>) => {
    state.utility = u;
    state.rise = polynomialAt(polynomial, u, 1);
    let bend = 0;
    for (let i = 0; i < n; i++) {
      let level = 0;
      let first = 0;
      let second = 0;
      for (let r = degree; r >= 0; r--) {
        second = second * u + 2 * first;
        first = first * u + level;
        level = level * u + levels[i * width + r];
      }
      state.shares[i] = level + effects[i] + u * tiltEffects[i];
      state.tilts[i] = first + tiltEffects[i];
      state.bends[i] = second;
      state.gradient[i] = level + effectsMeant[i] + u * tiltMeant[i];
      state.gradientTilts[i] = first + tiltMeant[i];
      bend += p[i] * second;
    }
    state.bend = bend;
  };

  const vector = () => new Float64Array(n);
  const state: EasiPoint = {
    parts,
    utility: Number.NaN,
    rise: Number.NaN,
    bend: Number.NaN,
    shares: vector(),
    tilts: vector(),
    bends: vector(),
    gradient: vector(),
    gradientTilts: vector(),
    matrix,
    at(logPrices, logTotal, demographics) {
      const square = prepare(logPrices, demographics);
      const start = logTotal - polynomial[0];
      polynomial[0] += square - logTotal;
      fill(risingRoot(polynomial, start), logPrices);
    },
    atUtility(logPrices, utility, demographics) {
      const square = prepare(logPrices, demographics);
      fill(utility, logPrices);
      return polynomialAt(polynomial, utility, 0) + square;
    },
  };
  return state;
}
