import type { CoefficientBlock, CoefficientPlace, FreeForm, SystemSize } from "./demand-system.ts";
import { requireTheta } from "./evaluation.ts";
import { type Dependence, freeForm, remainder } from "./free-form.ts";
import type { MomentTerm } from "./moment-form.ts";
import type { RestrictionName } from "./names.ts";

/**
 * What the almost ideal systems share, whatever their price index P:
 *
 *     w_i = α_i(z) + Σ_j γ_ij ln p_j + β_i m,   α_i(z) = α_i + Σ_k α_ik z_k,   m = ln(x/P)
 */

export const ALMOST_IDEAL_BLOCKS: readonly CoefficientBlock[] = [
  { name: "alpha", symbol: "α", columns: "one" },
  { name: "demographic", symbol: "α", columns: "demographics" },
  { name: "gamma", symbol: "γ", columns: "goods" },
  { name: "beta", symbol: "β", columns: "one" },
];

/** Where in θ a coefficient stands: α (n), then α_ik (n × s), γ (n × n), β (n), each row by row. */
export interface Places {
  readonly alpha: (good: number) => number;
  readonly demographic: (good: number, index: number) => number;
  readonly gamma: (good: number, price: number) => number;
  readonly beta: (good: number) => number;
  /** k = n(1 + s + n + 1). */
  readonly count: number;
}

export function placesOf({ goods: n, demographics: s }: SystemSize): Places {
  const gamma = n + n * s;
  const beta = gamma + n * n;
  return {
    alpha: (i) => i,
    demographic: (i, k) => n + i * s + k,
    gamma: (i, j) => gamma + i * n + j,
    beta: (i) => beta + i,
    count: beta + n,
  };
}

export function almostIdealLayout({ goods, demographics }: SystemSize): CoefficientPlace[] {
  const each = (count: number) => Array.from({ length: count }, (_, index) => index);
  return [
    ...each(goods).map((good) => ({ block: "alpha", good })),
    ...each(goods).flatMap((good) => each(demographics).map((column) => ({ block: "demographic", good, column }))),
    ...each(goods).flatMap((good) => each(goods).map((column) => ({ block: "gamma", good, column }))),
    ...each(goods).map((good) => ({ block: "beta", good })),
  ];
}

/** Σα_i = 1, Σ_i α_ik = Σ_i γ_ij = Σβ_i = 0; homogeneity Σ_j γ_ij = 0; symmetry γ_ij = γ_ji. */
export function almostIdealFreeForm(size: SystemSize, impose: readonly RestrictionName[]): FreeForm {
  return freeForm(placesOf(size).count, almostIdealDependences(size, impose));
}

export function almostIdealDependences(size: SystemSize, impose: readonly RestrictionName[]): Dependence[] {
  const { goods: n, demographics: s } = size;
  const at = placesOf(size);
  const goods = Array.from({ length: n }, (_, i) => i);
  const over = (place: (good: number) => number, total = 0) => remainder(goods.map(place), total);
  const dependences: Dependence[] = [over(at.alpha, 1), over(at.beta)];
  for (let k = 0; k < s; k++) dependences.push(over((i) => at.demographic(i, k)));
  for (let j = 0; j < n; j++) dependences.push(over((i) => at.gamma(i, j)));
  if (impose.length > 0) {
    for (let i = 0; i < n - 1; i++) dependences.push(over((j) => at.gamma(i, j)));
  }
  if (impose.includes("symmetry")) {
    for (let i = 1; i < n - 1; i++) {
      for (let j = 0; j < i; j++) dependences.push({ place: at.gamma(i, j), constant: 0, on: [[at.gamma(j, i), 1]] });
    }
  }
  return dependences;
}

/** Iteration starts from constant shares. */
export function almostIdealStart(size: SystemSize, meanShares: readonly number[]): number[] {
  const theta = new Array<number>(placesOf(size).count).fill(0);
  for (let i = 0; i < size.goods; i++) theta[i] = meanShares[i];
  return theta;
}

/** θ taken apart into arrays for fast evaluation; matrices row by row. */
export interface Parts {
  readonly alpha: Float64Array;
  readonly demographic: Float64Array;
  readonly gamma: Float64Array;
  readonly beta: Float64Array;
}

export function partsOf(theta: readonly number[], size: SystemSize): Parts {
  const { goods: n, demographics: s } = size;
  requireTheta(theta, placesOf(size).count);
  const gamma = n + n * s;
  const beta = gamma + n * n;
  return {
    alpha: Float64Array.from(theta.slice(0, n)),
    demographic: Float64Array.from(theta.slice(n, gamma)),
    gamma: Float64Array.from(theta.slice(gamma, beta)),
    beta: Float64Array.from(theta.slice(beta)),
  };
}

/** α_i(z), into `into`. */
export function interceptsAt(parts: Parts, demographics: ArrayLike<number>, into: Float64Array): void {
  const n = into.length;
  const s = demographics.length;
  for (let i = 0; i < n; i++) {
    let sum = parts.alpha[i];
    for (let k = 0; k < s; k++) sum += parts.demographic[i * s + k] * demographics[k];
    into[i] = sum;
  }
}

/** The first terms of Z in both systems: 1, z, ln p. */
export function leadingTerms({ goods, demographics }: SystemSize): MomentTerm[] {
  const terms: MomentTerm[] = [{ kind: "constant" }];
  for (let index = 0; index < demographics; index++) {
    terms.push({ kind: "column", column: { kind: "demographic", index } });
  }
  for (let good = 0; good < goods; good++) terms.push({ kind: "column", column: { kind: "log price", good } });
  return terms;
}
