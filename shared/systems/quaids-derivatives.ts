import type { Point, SlopeDerivatives, SystemSize } from "./demand-system.ts";
import { quaidsPlaces } from "./quaids-parts.ts";
import { quaidsAt } from "./quaids-point.ts";
import { translogDerivatives } from "./translog.ts";

/**
 * Derivatives of w, μ_i and μ_ij by θ. With ∂ln b/∂β_k = ln p_k,
 *
 *     ∂(m²/b) = (2m/b) ∂m − (m²/b) ∂ln b,   ∂(2m/b) = (2/b) ∂m − (2m/b) ∂ln b
 */
export function quaidsDerivatives(theta: readonly number[], size: SystemSize, point: Point): SlopeDerivatives {
  const { goods: n, demographics: s } = size;
  const { parts, logPrices, indexSlopes, real, deflator, square, ratio, total } = quaidsAt(theta, size, point);
  const { beta, lambda } = parts;
  const at = quaidsPlaces(size);
  const almostIdeal = translogDerivatives(size, logPrices, point.demographics);
  const padded = (row: readonly number[]) => [...row, ...new Array<number>(n).fill(0)];
  const realBy = padded(almostIdeal.realByTheta);
  const slopesBy = almostIdeal.indexSlopesByTheta.map(padded);
  const squareBy = realBy.map((entry) => ratio * entry);
  const ratioBy = realBy.map((entry) => (2 / deflator) * entry);
  for (let k = 0; k < n; k++) {
    squareBy[at.beta(k)] -= square * logPrices[k];
    ratioBy[at.beta(k)] -= ratio * logPrices[k];
  }
  const goods = Array.from({ length: n }, (_, i) => i);
  const shares = goods.map((i) => {
    const row = realBy.map((entry, a) => beta[i] * entry + lambda[i] * squareBy[a]);
    row[at.alpha(i)] += 1;
    for (let d = 0; d < s; d++) row[at.demographic(i, d)] += point.demographics[d];
    for (let j = 0; j < n; j++) row[at.gamma(i, j)] += logPrices[j];
    row[at.beta(i)] += real;
    row[at.lambda(i)] += square;
    return row;
  });
  const totals = goods.map((i) => {
    const row = ratioBy.map((entry) => lambda[i] * entry);
    row[at.beta(i)] += 1;
    row[at.lambda(i)] += ratio;
    return row;
  });
  const prices = goods.map((i) =>
    goods.map((j) => {
      const bend = lambda[i] * beta[j];
      const row = totals[i].map((entry, a) => -entry * indexSlopes[j] - total[i] * slopesBy[j][a] - bend * squareBy[a]);
      row[at.gamma(i, j)] += 1;
      row[at.lambda(i)] -= beta[j] * square;
      row[at.beta(j)] -= lambda[i] * square;
      return row;
    }),
  );
  return { shares, total: totals, prices };
}
