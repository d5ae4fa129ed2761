import { gaussLegendre } from "../../numerics/quadrature.ts";
import { bundleAt, lengthOf, type Subject } from "./bundle.ts";
import { combination, constant, type Dual, weighted } from "./dual.ts";

/** Nodes on a stretch over which no price, nor the total, changes by more than a factor e. */
const NODES = 20;

/**
 * The loss of Marshallian surplus along the straight path from (p0, x0) to (p1, x1),
 *
 *     −ΔCS = ∫_0^1 Σ_i q_i(p(s), x(s)) Δp_i ds − Δx,   p(s) = p0 + s Δp,  x(s) = x0 + s Δx.
 *
 * Where several prices change its value depends on the path (Silberberg 1972, Journal of Economic Theory 5): another path,
 * another number; the exact variations do not.
 */
export function marshallianLoss(
  subject: Subject,
  [before, after]: readonly [readonly number[], readonly number[]],
  [total, totalAfter]: readonly [number, number],
  demographics: readonly number[],
): Dual {
  const change = after.map((price, i) => price - before[i]);
  const k = lengthOf(subject);
  const stretches = Math.max(1, Math.ceil(largestLog(before, after, total, totalAfter)));
  const { nodes, weights } = gaussLegendre(NODES);
  const terms: (readonly [number, Dual])[] = [[1, constant(total - totalAfter, k)]];
  for (let stretch = 0; stretch < stretches; stretch++) {
    for (let node = 0; node < NODES; node++) {
      const s = (stretch + (1 + nodes[node]) / 2) / stretches;
      const prices = before.map((price, i) => price + s * change[i]);
      const bundle = bundleAt(subject, prices, constant(total + s * (totalAfter - total), k), demographics);
      terms.push([weights[node] / (2 * stretches), weighted(change, bundle.quantities)]);
    }
  }
  return combination(...terms);
}

function largestLog(before: readonly number[], after: readonly number[], total: number, totalAfter: number): number {
  return before.reduce(
    (most, price, i) => Math.max(most, Math.abs(Math.log(after[i] / price))),
    Math.abs(Math.log(totalAfter / total)),
  );
}
