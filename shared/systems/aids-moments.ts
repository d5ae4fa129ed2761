import { zeros } from "../numerics/matrix.ts";
import { leadingTerms, partsOf, placesOf } from "./almost-ideal.ts";
import type { Matrix, SystemSize } from "./demand-system.ts";
import type { MomentForm, MomentTerm } from "./moment-form.ts";

/**
 * The exact AIDS as w = C(θ) Z: ln P is linear in ln p_k, in the products ln p_k ln p_l and in z_s ln p_k, so
 *
 *     Z = (1, z, ln p, ln x, {ln p_k ln p_l, k ≤ l}, {z_s ln p_k})
 *     C_i = (α_i − β_i α₀, α_is, γ_ik − β_i α_k, β_i, −½β_i(γ_kl + γ_lk) or −½β_i γ_kk, −β_i α_ks)
 */
export const aidsMoments: MomentForm = { terms, coefficients, derivatives };

/** Where in Z a term stands. */
function termPlaces({ goods: n, demographics: s }: SystemSize) {
  const logTotal = 1 + s + n;
  const products = logTotal + 1;
  const shifts = products + (n * (n + 1)) / 2;
  return {
    demographic: (d: number) => 1 + d,
    logPrice: (k: number) => 1 + s + k,
    logTotal,
    product: (k: number, l: number) => {
      const low = Math.min(k, l);
      return products + low * n - (low * (low - 1)) / 2 + Math.abs(k - l);
    },
    shift: (d: number, k: number) => shifts + d * n + k,
    count: shifts + s * n,
  };
}

function terms(size: SystemSize): MomentTerm[] {
  const { goods: n, demographics: s } = size;
  const list = leadingTerms(size);
  list.push({ kind: "column", column: { kind: "log total" } });
  for (let k = 0; k < n; k++) {
    for (let l = k; l < n; l++) {
      list.push({ kind: "product", left: { kind: "log price", good: k }, right: { kind: "log price", good: l } });
    }
  }
  for (let index = 0; index < s; index++) {
    for (let k = 0; k < n; k++) {
      list.push({ kind: "product", left: { kind: "demographic", index }, right: { kind: "log price", good: k } });
    }
  }
  return list;
}

/** What multiplies −β_i in C_i: the coefficients of ln P, laid out over Z. */
function indexOverTerms(theta: readonly number[], size: SystemSize): number[] {
  const { goods: n, demographics: s } = size;
  const { alpha, demographic, gamma } = partsOf(theta, size);
  const at = termPlaces(size);
  const index = new Array<number>(at.count).fill(0);
  index[0] = size.alpha0;
  for (let k = 0; k < n; k++) {
    index[at.logPrice(k)] = alpha[k];
    for (let l = 0; l < n; l++) index[at.product(k, l)] += 0.5 * gamma[k * n + l];
    for (let d = 0; d < s; d++) index[at.shift(d, k)] = demographic[k * s + d];
  }
  return index;
}

function coefficients(theta: readonly number[], size: SystemSize): Matrix {
  const { goods: n, demographics: s } = size;
  const { alpha, demographic, gamma, beta } = partsOf(theta, size);
  const at = termPlaces(size);
  const index = indexOverTerms(theta, size);
  const c = zeros(n, at.count);
  for (let i = 0; i < n; i++) {
    for (let term = 0; term < at.count; term++) c[i][term] = -beta[i] * index[term];
    c[i][0] += alpha[i];
    for (let d = 0; d < s; d++) c[i][at.demographic(d)] += demographic[i * s + d];
    for (let k = 0; k < n; k++) c[i][at.logPrice(k)] += gamma[i * n + k];
    c[i][at.logTotal] = beta[i];
  }
  return c;
}

type Entry = [good: number, term: number, value: number];

function derivatives(theta: readonly number[], size: SystemSize): Entry[][] {
  const { goods: n, demographics: s } = size;
  const { beta } = partsOf(theta, size);
  const at = termPlaces(size);
  const index = indexOverTerms(theta, size);
  const places = placesOf(size);
  const list: Entry[][] = Array.from({ length: places.count }, () => []);
  const throughIndex = (term: number, weight: number): Entry[] =>
    Array.from(beta, (slope, i): Entry => [i, term, -slope * weight]);
  for (let a = 0; a < n; a++) {
    list[places.alpha(a)] = [[a, 0, 1], ...throughIndex(at.logPrice(a), 1)];
    for (let d = 0; d < s; d++) {
      list[places.demographic(a, d)] = [[a, at.demographic(d), 1], ...throughIndex(at.shift(d, a), 1)];
    }
    for (let b = 0; b < n; b++) {
      list[places.gamma(a, b)] = [[a, at.logPrice(b), 1], ...throughIndex(at.product(a, b), 0.5)];
    }
    const own: Entry[] = [[a, at.logTotal, 1]];
    for (let term = 0; term < at.count; term++) {
      if (term !== at.logTotal && (term > s || term === 0)) own.push([a, term, -index[term]]);
    }
    list[places.beta(a)] = own;
  }
  return list;
}
