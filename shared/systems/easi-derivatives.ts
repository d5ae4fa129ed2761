import { zeros } from "../numerics/matrix.ts";
import type { Matrix, SlopeDerivatives } from "./demand-system.ts";
import type { EasiPoint } from "./easi-point.ts";

/** What one coefficient does at fixed utility. */
interface Direct {
  /** Its place in θ. */
  readonly place: number;
  /** ∂F/∂θ_a and ∂F_u/∂θ_a. */
  readonly level: number;
  readonly rise: number;
  /** The good in whose equation it stands, and ∂w_i/∂θ_a, ∂v_i/∂θ_a there. */
  readonly good: number;
  readonly share: number;
  readonly tilt: number;
  /** The price whose effect it is, when it is one: ∂(A + uB)_ij/∂θ_a. */
  readonly price?: number;
  readonly effect: number;
}

/**
 * Derivatives in θ of the shares and slopes by the implicit function theorem: u_a = −F_a/F_u, and then, with
 * subscript a at fixed u,
 *
 *     dw_i = w_ia + v_i u_a,   dv_i = v_ia + m_uu,i u_a,   dF_u = F_ua + F_uu u_a,   ds_j = s_ja + s_ju u_a
 *     dμ_i = (dv_i − μ_i dF_u)/F_u,   dμ_ij = (A + uB)_ij,a + B_ij u_a − dμ_i s_j − μ_i ds_j
 */
export function easiDerivatives(
  point: EasiPoint,
  logPrices: readonly number[],
  demographics: readonly number[],
): SlopeDerivatives {
  const n = logPrices.length;
  const { places, tilt } = point.parts;
  const { rise, bend, tilts, bends, gradient, gradientTilts } = point;
  const slopes = Array.from(tilts, (value) => value / rise);
  const shares: Matrix = zeros(n, places.count);
  const total: Matrix = zeros(n, places.count);
  const prices = Array.from({ length: n }, () => zeros(n, places.count));
  for (const one of directs(point, logPrices, demographics)) {
    const { place: a, good, price } = one;
    const utility = -one.level / rise;
    const riseBy = one.rise + bend * utility;
    const gradientBy = Array.from(gradientTilts, (value) => value * utility);
    if (price === undefined) gradientBy[good] += one.share;
    else {
      gradientBy[good] += 0.5 * one.effect * logPrices[price];
      gradientBy[price] += 0.5 * one.effect * logPrices[good];
    }
    for (let i = 0; i < n; i++) {
      const own = i === good;
      shares[i][a] = (own ? one.share : 0) + tilts[i] * utility;
      total[i][a] = ((own ? one.tilt : 0) + bends[i] * utility - slopes[i] * riseBy) / rise;
      for (let j = 0; j < n; j++) {
        const direct = (own && j === price ? one.effect : 0) + (tilt.length > 0 ? tilt[i * n + j] * utility : 0);
        prices[i][j][a] = direct - total[i][a] * gradient[j] - slopes[i] * gradientBy[j];
      }
    }
  }
  return { shares, total, prices };
}

function directs(point: EasiPoint, p: readonly number[], z: readonly number[]): Direct[] {
  const { places: at } = point.parts;
  const u = point.utility;
  const list: Direct[] = [];
  /** A coefficient that multiplies `share` in equation i, with derivative `tilt` of that in u. */
  const level = (place: number, good: number, share: number, tilt: number) => {
    list.push({ place, good, share, tilt, level: p[good] * share, rise: p[good] * tilt, effect: 0 });
  };
  /** One that multiplies factor · ln p_j in equation i, and half of that product in F. */
  const price = (place: number, good: number, j: number, factor: number, tilt: number) => {
    const half = 0.5 * p[good] * p[j];
    list.push({
      place,
      good,
      price: j,
      effect: factor,
      share: factor * p[j],
      tilt: tilt * p[j],
      level: half * factor,
      rise: half * tilt,
    });
  };
  for (let i = 0; i < p.length; i++) {
    for (let r = 0; r <= at.degree; r++) level(at.power(i, r), i, u ** r, r === 0 ? 0 : r * u ** (r - 1));
    for (let k = 0; k < z.length; k++) level(at.demographic(i, k), i, z[k], 0);
    for (let k = 0; k < at.crossed; k++) level(at.cross(i, k), i, z[k] * u, z[k]);
    for (let j = 0; j < p.length; j++) {
      price(at.price(i, j), i, j, 1, 0);
      for (let k = 0; k < at.shifted; k++) price(at.shift(i, k, j), i, j, z[k], 0);
      if (at.tilted > 0) price(at.tilt(i, j), i, j, u, 1);
    }
  }
  return list;
}
