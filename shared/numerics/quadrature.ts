/** Nodes in (−1, 1), ascending, with their weights, which sum to 2. */
export interface QuadratureRule {
  readonly nodes: readonly number[];
  readonly weights: readonly number[];
}

const KNOWN = new Map<number, QuadratureRule>();

/**
 * Gauss and Legendre's rule, exact for polynomials up to degree 2n − 1: the nodes are the roots of P_n, found by Newton's
 * method from cos(π(i − ¼)/(n + ½)), P_n' = n (t P_n − P_{n−1})/(t² − 1), the weights 2(1 − t²)/(n P_{n−1}(t))². Abramowitz & Stegun (1964), 25.4.29.
 */
export function gaussLegendre(count: number): QuadratureRule {
  const known = KNOWN.get(count);
  if (known) return known;
  const nodes = new Array<number>(count);
  const weights = new Array<number>(count);
  for (let i = 0; i < count; i++) {
    let t = -Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
    for (let step = 0; step < 100; step++) {
      const { value, before } = legendre(count, t);
      const by = (value * (t * t - 1)) / (count * (t * value - before));
      t -= by;
      if (Math.abs(by) < 1e-15) break;
    }
    nodes[i] = t;
    weights[i] = (2 * (1 - t * t)) / (count * legendre(count, t).before) ** 2;
  }
  const rule = { nodes, weights };
  KNOWN.set(count, rule);
  return rule;
}

/** P_n(t) and P_{n−1}(t) by the recurrence (k + 1) P_{k+1} = (2k + 1) t P_k − k P_{k−1}. */
function legendre(n: number, t: number): { value: number; before: number } {
  let before = 1;
  let value = t;
  for (let k = 1; k < n; k++) [before, value] = [value, ((2 * k + 1) * t * value - k * before) / (k + 1)];
  return { value, before };
}
