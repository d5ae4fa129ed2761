import { type Parts, partsOf, placesOf } from "./almost-ideal.ts";
import type { SystemSize } from "./demand-system.ts";
import { requireTheta } from "./evaluation.ts";

/** Where in θ a coefficient stands: those of the almost ideal system (α, α_ik, γ, β), then λ (n). */
export function quaidsPlaces(size: SystemSize) {
  const almostIdeal = placesOf(size);
  return {
    ...almostIdeal,
    lambda: (good: number) => almostIdeal.count + good,
    count: almostIdeal.count + size.goods,
  };
}

export interface QuaidsParts extends Parts {
  readonly lambda: Float64Array;
}

export function quaidsParts(theta: readonly number[], size: SystemSize): QuaidsParts {
  requireTheta(theta, quaidsPlaces(size).count);
  return { ...partsOf(almostIdealPart(theta, size), size), lambda: Float64Array.from(theta.slice(-size.goods)) };
}

/** θ without λ: the almost ideal system with the same index. */
export function almostIdealPart(theta: readonly number[], { goods }: SystemSize): number[] {
  return theta.slice(0, theta.length - goods);
}
