import { zeros } from "../numerics/matrix.ts";
import { lesCostDerivatives } from "./cost-derivatives.ts";
import { lesCostEvaluator } from "./cost-evaluators.ts";
import type {
  CoefficientPlace,
  DemandSystem,
  Evaluator,
  Point,
  SlopeDerivatives,
  SystemSize,
} from "./demand-system.ts";
import { requirePoint, slopesByEvaluator } from "./evaluation.ts";
import { freeForm, remainder } from "./free-form.ts";
import { lesExpenditureMoments, lesShareMoments } from "./les-moments.ts";
import { committedAt, lesParts, lesPlaces } from "./les-parts.ts";
import { lesStraight } from "./les-straight.ts";

function expenditureEvaluator(theta: readonly number[], size: SystemSize): Evaluator {
  const n = size.goods;
  const parts = lesParts(theta, size);
  const { marginal } = parts;
  const shares = new Float64Array(n);
  const total = new Float64Array(n);
  const prices = new Float64Array(n * n);
  const committedShares = new Float64Array(n);
  return {
    shares,
    total,
    prices,
    at(logPrices, logTotal, demographics) {
      committedAt(parts, demographics, committedShares);
      let supernumerary = 1;
      for (let j = 0; j < n; j++) {
        committedShares[j] *= Math.exp(logPrices[j] - logTotal);
        supernumerary -= committedShares[j];
      }
      for (let i = 0; i < n; i++) {
        shares[i] = committedShares[i] + marginal[i] * supernumerary;
        total[i] = marginal[i] - shares[i];
        for (let j = 0; j < n; j++) prices[i * n + j] = -marginal[i] * committedShares[j];
        prices[i * n + i] += committedShares[i];
      }
    },
  };
}

/** c_j(z) at a point. */
function committedAtPoint(theta: readonly number[], size: SystemSize, demographics: readonly number[]): Float64Array {
  const committed = new Float64Array(size.goods);
  committedAt(lesParts(theta, size), demographics, committed);
  return committed;
}

function expenditureDerivatives(theta: readonly number[], size: SystemSize, point: Point): SlopeDerivatives {
  requirePoint(size, point);
  const { goods: n, demographics: s } = size;
  const { marginal } = lesParts(theta, size);
  const committed = committedAtPoint(theta, size, point.demographics);
  const at = lesPlaces(size);
  const ratios = point.prices.map((price) => price / point.total);
  const supernumerary = ratios.reduce((rest, ratio, j) => rest - committed[j] * ratio, 1);
  const goods = Array.from({ length: n }, (_, i) => i);
  /** A derivative by c_a(z) is one by c_a, and z_k times it one by c_ak. */
  const spread = (row: number[], a: number, value: number) => {
    row[at.committed(a)] = value;
    for (let k = 0; k < s; k++) row[at.demographic(a, k)] = value * point.demographics[k];
  };
  const shares = zeros(n, at.count);
  const total = zeros(n, at.count);
  for (let i = 0; i < n; i++) {
    for (let a = 0; a < n; a++) spread(shares[i], a, ((i === a ? 1 : 0) - marginal[i]) * ratios[a]);
    shares[i][at.marginal(i)] = supernumerary;
    for (let a = 0; a < at.count; a++) total[i][a] = -shares[i][a];
    total[i][at.marginal(i)] += 1;
  }
  const prices = goods.map((i) =>
    goods.map((j) => {
      const row = new Array<number>(at.count).fill(0);
      spread(row, j, ((i === j ? 1 : 0) - marginal[i]) * ratios[j]);
      row[at.marginal(i)] = -committed[j] * ratios[j];
      return row;
    }),
  );
  return { shares, total, prices };
}

/** Σ p_j c_j(z) and Σ b_j ln p_j. */
function subsistence(
  theta: readonly number[],
  size: SystemSize,
  prices: readonly number[],
  demographics: readonly number[],
) {
  const { marginal } = lesParts(theta, size);
  const committed = committedAtPoint(theta, size, demographics);
  return {
    cost: prices.reduce((sum, price, j) => sum + price * committed[j], 0),
    logPrice: prices.reduce((sum, price, j) => sum + marginal[j] * Math.log(price), 0),
  };
}

/**
 * Linear expenditure system.
 *
 *     w_i = c_i(z) p_i/x + b_i (1 − Σ_j c_j(z) p_j/x),   Σ b_i = 1,   c_i(z) = c_i + Σ_k c_ik z_k
 *     μ_i = b_i − w_i,   μ_ij = δ_ij c_i(z) p_i/x − b_i c_j(z) p_j/x
 *     c(u, p; z) = Σ_j p_j c_j(z) + u Π_j p_j^{b_j}      (Stone–Geary; u > 0)
 *
 * Demographics shift committed quantities (translating: Pollak & Wales 1981, Econometrica 49, 1533–1551).
 * Committed quantities are in units of estimation: multiplied by totalScale / priceScale_i they are in
 * the upload's. Errors stand on shares or, by `expenditureMoments`, on expenditures.
 * Stone (1954, Economic Journal 64, 511–527).
 */
export const les: DemandSystem = {
  name: "les",
  kind: "levels",
  longName: "linear expenditure system",
  source: "Stone (1954), Economic Journal 64",
  blocks: [
    { name: "committed", symbol: "c", columns: "one" },
    { name: "demographic", symbol: "c", columns: "demographics" },
    { name: "marginal", symbol: "b", columns: "one" },
  ],
  heldByForm: ["homogeneity", "symmetry"],
  takesDemographics: true,
  layout: ({ goods, demographics }) => {
    const each = (count: number) => Array.from({ length: count }, (_, index) => index);
    const block = (name: string) => each(goods).map((good): CoefficientPlace => ({ block: name, good }));
    const shifts = each(goods).flatMap((good) =>
      each(demographics).map((column): CoefficientPlace => ({ block: "demographic", good, column })),
    );
    return [...block("committed"), ...shifts, ...block("marginal")];
  },
  free: (size) => {
    const { marginal, count } = lesPlaces(size);
    const places = Array.from({ length: size.goods }, (_, i) => marginal(i));
    return freeForm(count, [remainder(places, 1)]);
  },
  evaluator: expenditureEvaluator,
  slopes: (theta, size, point) => slopesByEvaluator(expenditureEvaluator(theta, size), size, point),
  slopeDerivatives: expenditureDerivatives,
  explainPriceSlope: (theta, size, point, i, j) => {
    const { marginal } = lesParts(theta, size);
    const committedShare = (committedAtPoint(theta, size, point.demographics)[j] * point.prices[j]) / point.total;
    return [
      ...(i === j ? [{ sign: 1 as const, factors: [{ symbol: "c_i p_i/x", value: committedShare }] }] : []),
      {
        sign: -1,
        factors: [
          { symbol: "b_i", value: marginal[i] },
          { symbol: "c_j p_j/x", value: committedShare },
        ],
      },
    ];
  },
  moments: lesShareMoments,
  straight: lesStraight,
  expenditureMoments: lesExpenditureMoments,
  /** Nothing committed: shares that do not move. */
  start: (size, meanShares) => [...new Array<number>(size.goods * (1 + size.demographics)).fill(0), ...meanShares],
  cost: {
    evaluator: lesCostEvaluator,
    logCostDerivatives: lesCostDerivatives,
    logCost: (theta, size, utility, prices, demographics) => {
      const { cost, logPrice } = subsistence(theta, size, prices, demographics);
      return utility > 0 ? Math.log(cost + utility * Math.exp(logPrice)) : Number.NaN;
    },
    utility: (theta, size, point) => {
      requirePoint(size, point);
      const { cost, logPrice } = subsistence(theta, size, point.prices, point.demographics);
      return point.total > cost ? (point.total - cost) / Math.exp(logPrice) : Number.NaN;
    },
  },
};
