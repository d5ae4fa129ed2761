import type { MomentSource } from "./moment-source.ts";

/**
 * Durbin & Watson's (1950, Biometrika 37) d by equation: Σ (e_t − e_{t−1})²/Σ e_t² over rows in the
 * order of time. Undefined where two rows share a time: such rows have no order.
 */
export function durbinWatson(
  source: MomentSource,
  time: Float64Array,
  coefficients: readonly (readonly number[])[],
): number[] | undefined {
  const sorted = time.slice().sort();
  if (sorted.some((value, place) => place > 0 && !(value > sorted[place - 1]))) return undefined;
  const order = Array.from(time.keys()).sort((one, two) => time[one] - time[two]);
  const squares = new Float64Array(coefficients.length);
  const changes = new Float64Array(coefficients.length);
  const last = new Float64Array(coefficients.length);
  const terms = new Float64Array(source.terms.length);
  order.forEach((row, place) => {
    source.terms.forEach((factors, term) => {
      terms[term] = factors.reduce(
        (product, place) => (place === 0 ? product : product * source.columns[place - 1][row]),
        1,
      );
    });
    coefficients.forEach((equation, i) => {
      let residual = source.responses[i][row];
      for (let term = 0; term < terms.length; term++) residual -= equation[term] * terms[term];
      squares[i] += residual * residual;
      if (place > 0) changes[i] += (residual - last[i]) ** 2;
      last[i] = residual;
    });
  });
  return Array.from(changes, (change, i) => change / squares[i]);
}
