/**
 * Derivative of a vector function of one number at 0 by Richardson extrapolation of central differences
 * (step h, h/2, h/4; error O(h⁶) plus rounding ε/h): with h = 0.02 about 1e-12 where derivatives are of order one.
 */
export function derivative(of: (step: number) => number[], h = 0.02): number[] {
  const central = (step: number) => {
    const up = of(step);
    const down = of(-step);
    return up.map((value, i) => (value - down[i]) / (2 * step));
  };
  const [d1, d2, d4] = [central(h), central(h / 2), central(h / 4)];
  return d1.map((first, i) => {
    const a = d2[i] + (d2[i] - first) / 3;
    const b = d4[i] + (d4[i] - d2[i]) / 3;
    return b + (b - a) / 15;
  });
}

/** The vector with entry `at` moved by `step`. */
export function moved(vector: readonly number[], at: number, step: number): number[] {
  return vector.map((entry, i) => (i === at ? entry + step : entry));
}

/** Prices with ln p_j moved by `step`. */
export function repriced(prices: readonly number[], j: number, step: number): number[] {
  return prices.map((price, i) => (i === j ? price * Math.exp(step) : price));
}

/** Largest |a_i − b_i|. */
export function gap(a: readonly number[], b: readonly number[]): number {
  return a.reduce((most, entry, i) => Math.max(most, Math.abs(entry - b[i])), a.length === b.length ? 0 : Infinity);
}
