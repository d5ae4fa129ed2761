import { aids } from "./aids.ts";
import { leadingTerms } from "./almost-ideal.ts";
import type { SystemSize } from "./demand-system.ts";
import type { BaseColumn, LocalColumns, MomentEntry, MomentForm, MomentTerm, TermCombination } from "./moment-form.ts";
import { quaidsParts, quaidsPlaces } from "./quaids-parts.ts";
import { symmetricPart } from "./translog.ts";

/**
 * QUAIDS at given θ as w = C Z(θ). With m = ln(x/a(p)), q = m²/b(p) and r = 2m/b(p), which move with θ,
 *
 *     ŵ_i = α_i(z) + Σ_j γ_ij ln p_j + β_i m + λ_i q
 *     ∂ŵ_i = (direct) + (β_i + λ_i r) ∂m − λ_i q Σ_k ln p_k ∂β_k
 *     ∂m/∂α_k = −ln p_k,  ∂m/∂α_ks = −z_s ln p_k,  ∂m/∂γ_kl = −½ ln p_k ln p_l
 *
 * so that shares and their derivatives are combinations of
 *
 *     Z = (1, z, ln p, m, q, s, r, {ln p_k ln p_l}, {z_s ln p_k}, r·{ln p_k, ln p_k ln p_l, z_s ln p_k}, q·{ln p_k})
 *
 * For small β m = ½ r b(p) is all but a combination of r, r ln p_k and r ln p_k ln p_l, more nearly than second
 * moments can tell. So what is left, s = m − ½ r (1 + L + ½L²) with L = ln b(p), is a column of its own, formed
 * without cancellation, and m is declared the combination of the others that it is.
 */
export const quaidsMoments: MomentForm = {
  terms,
  coefficients: (theta, size) => {
    const { alpha, demographic, gamma, beta, lambda } = quaidsParts(theta, size);
    const { goods: n, demographics: s } = size;
    const at = termPlaces(size);
    return Array.from(alpha, (intercept, i) => {
      const row = new Array<number>(at.count).fill(0);
      row[0] = intercept;
      for (let d = 0; d < s; d++) row[at.demographic(d)] = demographic[i * s + d];
      for (let k = 0; k < n; k++) row[at.logPrice(k)] = gamma[i * n + k];
      row[at.real] = beta[i];
      row[at.square] = lambda[i];
      return row;
    });
  },
  derivatives,
  local: {
    labels: [
      "ln real expenditure",
      "the square of ln real expenditure over b(p)",
      "ln real expenditure over b(p)",
      "ln real expenditure less its expansion in b(p)",
    ],
    filler,
    combinations,
    from: {
      moments: aids.moments,
      layout: aids.layout,
      free: aids.free,
      start: aids.start,
      embed: (theta, { goods }) => [...theta, ...new Array<number>(goods).fill(0)],
    },
  },
};

const REAL: BaseColumn = { kind: "local", index: 0 };
const SQUARE: BaseColumn = { kind: "local", index: 1 };
const RATIO: BaseColumn = { kind: "local", index: 2 };
const REMAINDER: BaseColumn = { kind: "local", index: 3 };

/** Where in Z a term stands. */
function termPlaces({ goods: n, demographics: s }: SystemSize) {
  const pairs = (n * (n + 1)) / 2;
  const products = 1 + s + n + 4;
  const shifts = products + pairs;
  const ratios = shifts + s * n;
  const ratioProducts = ratios + n;
  const ratioShifts = ratioProducts + pairs;
  const squares = ratioShifts + s * n;
  const pair = (k: number, l: number) => {
    const low = Math.min(k, l);
    return low * n - (low * (low - 1)) / 2 + Math.abs(k - l);
  };
  return {
    demographic: (d: number) => 1 + d,
    logPrice: (k: number) => 1 + s + k,
    real: 1 + s + n,
    square: 1 + s + n + 1,
    remainder: 1 + s + n + 2,
    ratioAlone: 1 + s + n + 3,
    product: (k: number, l: number) => products + pair(k, l),
    shift: (d: number, k: number) => shifts + d * n + k,
    ratio: (k: number) => ratios + k,
    ratioProduct: (k: number, l: number) => ratioProducts + pair(k, l),
    ratioShift: (d: number, k: number) => ratioShifts + d * n + k,
    squareTimes: (k: number) => squares + k,
    count: squares + n,
  };
}

function terms(size: SystemSize): MomentTerm[] {
  const goods = Array.from({ length: size.goods }, (_, good) => good);
  const price = (good: number): BaseColumn => ({ kind: "log price", good });
  const pairs = goods.flatMap((k) => goods.slice(k).map((l) => [price(k), price(l)] as const));
  const shifts = Array.from({ length: size.demographics }, (_, index) => index).flatMap((index) =>
    goods.map((k) => [{ kind: "demographic", index } as BaseColumn, price(k)] as const),
  );
  const column = (of: BaseColumn): MomentTerm => ({ kind: "column", column: of });
  const product = ([left, right]: readonly [BaseColumn, BaseColumn]): MomentTerm => ({ kind: "product", left, right });
  const timesRatio = (factors: readonly BaseColumn[]): MomentTerm => ({
    kind: "monomial",
    factors: [...factors, RATIO],
  });
  return [
    ...leadingTerms(size),
    column(REAL),
    column(SQUARE),
    column(REMAINDER),
    column(RATIO),
    ...pairs.map(product),
    ...shifts.map(product),
    ...goods.map((k) => product([price(k), RATIO])),
    ...pairs.map(timesRatio),
    ...shifts.map(timesRatio),
    ...goods.map((k) => product([price(k), SQUARE])),
  ];
}

function derivatives(theta: readonly number[], size: SystemSize): MomentEntry[][] {
  const { goods: n, demographics: s } = size;
  const { beta, lambda } = quaidsParts(theta, size);
  const at = termPlaces(size);
  const places = quaidsPlaces(size);
  const list: MomentEntry[][] = Array.from({ length: places.count }, () => []);
  const throughReal = (term: number, timesRatio: number, weight: number): MomentEntry[] => [
    ...Array.from(beta, (slope, i): MomentEntry => [i, term, -slope * weight]),
    ...Array.from(lambda, (bend, i): MomentEntry => [i, timesRatio, -bend * weight]),
  ];
  for (let a = 0; a < n; a++) {
    list[places.alpha(a)] = [[a, 0, 1], ...throughReal(at.logPrice(a), at.ratio(a), 1)];
    for (let d = 0; d < s; d++) {
      list[places.demographic(a, d)] = [
        [a, at.demographic(d), 1],
        ...throughReal(at.shift(d, a), at.ratioShift(d, a), 1),
      ];
    }
    for (let b = 0; b < n; b++) {
      list[places.gamma(a, b)] = [[a, at.logPrice(b), 1], ...throughReal(at.product(a, b), at.ratioProduct(a, b), 0.5)];
    }
    list[places.beta(a)] = [
      [a, at.real, 1],
      ...Array.from(lambda, (bend, i): MomentEntry => [i, at.squareTimes(a), -bend]),
    ];
    list[places.lambda(a)] = [[a, at.square, 1]];
  }
  return list;
}

/** m = s + ½ r (1 + Σ β_k ln p_k + ½ Σ_k Σ_l β_k β_l ln p_k ln p_l). */
function combinations(theta: readonly number[], size: SystemSize): TermCombination[] {
  const { beta } = quaidsParts(theta, size);
  const at = termPlaces(size);
  const of: [number, number][] = [
    [at.remainder, 1],
    [at.ratioAlone, 0.5],
  ];
  beta.forEach((slope, k) => {
    of.push([at.ratio(k), 0.5 * slope]);
    for (let l = k; l < beta.length; l++) of.push([at.ratioProduct(k, l), (k === l ? 0.25 : 0.5) * slope * beta[l]]);
  });
  return [{ term: at.real, of }];
}

/** m, m²/b, 2m/b and the remainder of a row. */
function filler(theta: readonly number[], size: SystemSize): ReturnType<LocalColumns["filler"]> {
  const { goods: n, demographics: s } = size;
  const { alpha, demographic, gamma, beta } = quaidsParts(theta, size);
  const symmetric = symmetricPart(gamma, n);
  const values = new Float64Array(4);
  return {
    values,
    at(logPrices, logTotal, demographics) {
      let real = logTotal - size.alpha0;
      let logB = 0;
      for (let k = 0; k < n; k++) {
        let slope = alpha[k];
        for (let d = 0; d < s; d++) slope += demographic[k * s + d] * demographics[d];
        let quadratic = 0;
        for (let l = 0; l < n; l++) quadratic += symmetric[k * n + l] * logPrices[l];
        real -= (slope + 0.5 * quadratic) * logPrices[k];
        logB += beta[k] * logPrices[k];
      }
      const overB = real * Math.exp(-logB);
      values[0] = real;
      values[1] = real * overB;
      values[2] = 2 * overB;
      values[3] = overB * cubicRemainder(logB);
    },
  };
}

/** e^L − 1 − L − ½L². */
function cubicRemainder(log: number): number {
  if (Math.abs(log) > 0.5) return Math.exp(log) - 1 - log - 0.5 * log * log;
  let sum = 1;
  for (let order = 16; order > 3; order--) sum = 1 + (log / order) * sum;
  return ((log * log * log) / 6) * sum;
}
