import type { Point, SystemSize } from "./demand-system.ts";
import { almostIdealPart, type QuaidsParts, quaidsParts } from "./quaids-parts.ts";
import { type Translog, translogAt } from "./translog.ts";

/** What QUAIDS is made of at a point. */
export interface QuaidsAt extends Translog {
  readonly parts: QuaidsParts;
  /** m = ln x − ln a(p). */
  readonly real: number;
  /** b(p) = Π p_k^β_k. */
  readonly deflator: number;
  /** m²/b. */
  readonly square: number;
  /** 2m/b. */
  readonly ratio: number;
  /** λ(p) = Σ λ_k ln p_k. */
  readonly bend: number;
  /** μ_i = β_i + λ_i 2m/b. */
  readonly total: number[];
}

export function quaidsAt(theta: readonly number[], size: SystemSize, point: Point): QuaidsAt {
  const parts = quaidsParts(theta, size);
  const translog = translogAt(almostIdealPart(theta, size), size, point);
  const { logPrices, logIndex } = translog;
  const along = (weights: Float64Array) => weights.reduce((sum, weight, k) => sum + weight * logPrices[k], 0);
  const real = Math.log(point.total) - logIndex;
  const deflator = Math.exp(along(parts.beta));
  const ratio = (2 * real) / deflator;
  return {
    ...translog,
    parts,
    real,
    deflator,
    square: (real * real) / deflator,
    ratio,
    bend: along(parts.lambda),
    total: Array.from(parts.beta, (slope, i) => slope + parts.lambda[i] * ratio),
  };
}
