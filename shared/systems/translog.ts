import type { Matrix } from "../numerics/matrix.ts";
import { interceptsAt, type Parts, partsOf, placesOf } from "./almost-ideal.ts";
import type { Point, SystemSize } from "./demand-system.ts";
import { requirePoint } from "./evaluation.ts";

/** ½(γ_jk + γ_kj), the only part of Γ the index sees; row by row. */
export function symmetricPart(gamma: Float64Array, n: number): Float64Array {
  return gamma.map((entry, at) => 0.5 * (entry + gamma[(at % n) * n + Math.floor(at / n)]));
}

/** The translog price index ln P = α₀ + Σ_k α_k(z) ln p_k + ½ Σ_k Σ_j γ_kj ln p_k ln p_j at a point. */
export interface Translog {
  readonly parts: Parts;
  readonly logPrices: number[];
  readonly logIndex: number;
  /** π_j = ∂ln P/∂ln p_j. */
  readonly indexSlopes: number[];
}

export function translogAt(theta: readonly number[], size: SystemSize, point: Point): Translog {
  requirePoint(size, point);
  const n = size.goods;
  const parts = partsOf(theta, size);
  const symmetric = symmetricPart(parts.gamma, n);
  const logPrices = point.prices.map(Math.log);
  const intercepts = new Float64Array(n);
  interceptsAt(parts, point.demographics, intercepts);
  const indexSlopes = Array.from(intercepts, (intercept, j) => {
    let slope = intercept;
    for (let k = 0; k < n; k++) slope += symmetric[j * n + k] * logPrices[k];
    return slope;
  });
  const logIndex = indexSlopes.reduce(
    (sum, slope, j) => sum + 0.5 * (intercepts[j] + slope) * logPrices[j],
    size.alpha0,
  );
  return { parts, logPrices, logIndex, indexSlopes };
}

/** ∂m/∂θ with m = ln x − ln P (k), and ∂π_j/∂θ (n × k), k the coefficients of the almost ideal systems. */
export function translogDerivatives(
  size: SystemSize,
  logPrices: readonly number[],
  z: readonly number[],
): { realByTheta: number[]; indexSlopesByTheta: Matrix } {
  const { goods: n, demographics: s } = size;
  const places = placesOf(size);
  const realByTheta = new Array<number>(places.count).fill(0);
  for (let k = 0; k < n; k++) {
    realByTheta[places.alpha(k)] = -logPrices[k];
    for (let d = 0; d < s; d++) realByTheta[places.demographic(k, d)] = -logPrices[k] * z[d];
    for (let j = 0; j < n; j++) realByTheta[places.gamma(k, j)] = -0.5 * logPrices[k] * logPrices[j];
  }
  const indexSlopesByTheta = Array.from({ length: n }, (_, j) => {
    const row = new Array<number>(places.count).fill(0);
    row[places.alpha(j)] = 1;
    for (let d = 0; d < s; d++) row[places.demographic(j, d)] = z[d];
    for (let k = 0; k < n; k++) {
      row[places.gamma(j, k)] += 0.5 * logPrices[k];
      row[places.gamma(k, j)] += 0.5 * logPrices[k];
    }
    return row;
  });
  return { realByTheta, indexSlopesByTheta };
}
