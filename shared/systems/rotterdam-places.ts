import type { SystemSize } from "./demand-system.ts";

/** Where in θ a coefficient of the Rotterdam system stands: θ_i (n), π (n × n), α_ik (n × s), each row by row. */
export interface RotterdamPlaces {
  readonly marginal: (good: number) => number;
  readonly slutsky: (good: number, price: number) => number;
  readonly demographic: (good: number, index: number) => number;
  /** k = n(1 + n + s). */
  readonly count: number;
}

export function rotterdamPlaces({ goods: n, demographics: s }: SystemSize): RotterdamPlaces {
  const demographic = n + n * n;
  return {
    marginal: (i) => i,
    slutsky: (i, j) => n + i * n + j,
    demographic: (i, k) => demographic + i * s + k,
    count: demographic + n * s,
  };
}
