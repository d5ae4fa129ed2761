import type { FittedCoefficients } from "../systems/index.ts";

/**
 * The interval between the (1 ∓ level)/2 quantiles of bootstrap draws (Efron 1979, Annals of Statistics 7): the
 * (B + 1)α-th smallest, between two of them in proportion (Davison & Hinkley 1997, Bootstrap Methods and their
 * Application, section 5.3), at most the outermost draws.
 */
export function percentileInterval(values: readonly number[], level = 0.95): [low: number, high: number] {
  const sorted = Float64Array.from(values).sort();
  const tail = (1 - level) / 2;
  return [quantile(sorted, tail), quantile(sorted, 1 - tail)];
}

function quantile(sorted: Float64Array, probability: number): number {
  const place = Math.min(Math.max((sorted.length + 1) * probability, 1), sorted.length) - 1;
  const below = Math.floor(place);
  const above = Math.min(below + 1, sorted.length - 1);
  return sorted[below] + (place - below) * (sorted[above] - sorted[below]);
}

/** Something derived from the coefficients, at every bootstrap draw of them (replicates × k). */
export function overDraws<T>(
  fitted: FittedCoefficients,
  draws: readonly (readonly number[])[],
  derive: (fitted: FittedCoefficients) => T,
): T[] {
  return draws.map((theta) => derive({ ...fitted, theta: [...theta] }));
}
