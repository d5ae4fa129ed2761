import type { SystemSize } from "./demand-system.ts";
import { requireTheta } from "./evaluation.ts";

/** Where in θ a coefficient of the linear expenditure system stands: c (n), c_ik (n × s) row by row, b (n). */
export interface LesPlaces {
  readonly committed: (good: number) => number;
  readonly demographic: (good: number, index: number) => number;
  readonly marginal: (good: number) => number;
  /** k = n(2 + s). */
  readonly count: number;
}

export function lesPlaces({ goods: n, demographics: s }: SystemSize): LesPlaces {
  const marginal = n + n * s;
  return {
    committed: (i) => i,
    demographic: (i, k) => n + i * s + k,
    marginal: (i) => marginal + i,
    count: marginal + n,
  };
}

/** θ taken apart; the shifts c_ik row by row. */
export interface LesParts {
  readonly committed: readonly number[];
  readonly demographic: readonly number[];
  readonly marginal: readonly number[];
}

export function lesParts(theta: readonly number[], size: SystemSize): LesParts {
  const { goods: n, demographics: s } = size;
  requireTheta(theta, lesPlaces(size).count);
  return {
    committed: theta.slice(0, n),
    demographic: theta.slice(n, n + n * s),
    marginal: theta.slice(n + n * s),
  };
}

/** c_i(z) = c_i + Σ_k c_ik z_k, into `into`. */
export function committedAt(parts: LesParts, demographics: ArrayLike<number>, into: Float64Array): void {
  const s = demographics.length;
  for (let i = 0; i < into.length; i++) {
    let sum = parts.committed[i];
    for (let k = 0; k < s; k++) sum += parts.demographic[i * s + k] * demographics[k];
    into[i] = sum;
  }
}
