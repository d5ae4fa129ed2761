import { zeros } from "../numerics/matrix.ts";
import type {
  CoefficientPlace,
  DemandSystem,
  Evaluator,
  MomentForm,
  Point,
  SlopeDerivatives,
  SystemSize,
} from "./demand-system.ts";
import { requirePoint, requireTheta, slopesByEvaluator } from "./evaluation.ts";
import { freeForm, remainder } from "./free-form.ts";

/** θ = (c, b): committed quantities, marginal budget shares. */
function committedAndMarginal(theta: readonly number[], { goods: n }: SystemSize) {
  requireTheta(theta, 2 * n);
  return { committed: theta.slice(0, n), marginal: theta.slice(n) };
}

function expenditureEvaluator(theta: readonly number[], size: SystemSize): Evaluator {
  const n = size.goods;
  const { committed, marginal } = committedAndMarginal(theta, size);
  const shares = new Float64Array(n);
  const total = new Float64Array(n);
  const prices = new Float64Array(n * n);
  const committedShares = new Float64Array(n);
  return {
    shares,
    total,
    prices,
    at(logPrices, logTotal) {
      let supernumerary = 1;
      for (let j = 0; j < n; j++) {
        committedShares[j] = committed[j] * Math.exp(logPrices[j] - logTotal);
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

function expenditureDerivatives(theta: readonly number[], size: SystemSize, point: Point): SlopeDerivatives {
  requirePoint(size, point);
  const n = size.goods;
  const { committed, marginal } = committedAndMarginal(theta, size);
  const ratios = point.prices.map((price) => price / point.total);
  const supernumerary = ratios.reduce((rest, ratio, j) => rest - committed[j] * ratio, 1);
  const goods = Array.from({ length: n }, (_, i) => i);
  const shares = zeros(n, 2 * n);
  const total = zeros(n, 2 * n);
  for (let i = 0; i < n; i++) {
    for (let a = 0; a < n; a++) shares[i][a] = ((i === a ? 1 : 0) - marginal[i]) * ratios[a];
    shares[i][n + i] = supernumerary;
    for (let a = 0; a < 2 * n; a++) total[i][a] = -shares[i][a];
    total[i][n + i] += 1;
  }
  const prices = goods.map((i) =>
    goods.map((j) => {
      const row = new Array<number>(2 * n).fill(0);
      row[j] = ((i === j ? 1 : 0) - marginal[i]) * ratios[j];
      row[n + i] = -committed[j] * ratios[j];
      return row;
    }),
  );
  return { shares, total, prices };
}

/** w = C Z with Z = (1, p_1/x, …, p_n/x) and C_i = (b_i, δ_ij c_i − b_i c_j). */
const shareMoments: MomentForm = {
  terms: ({ goods }) => [
    { kind: "constant" },
    ...Array.from({ length: goods }, (_, good) => ({
      kind: "column" as const,
      column: { kind: "price over total" as const, good },
    })),
  ],
  coefficients: (theta, size) => {
    const { committed, marginal } = committedAndMarginal(theta, size);
    return marginal.map((b, i) => [b, ...committed.map((c, j) => (i === j ? c : 0) - b * c)]);
  },
  derivatives: (theta, size) => {
    const { committed, marginal } = committedAndMarginal(theta, size);
    const byCommitted = committed.map((_, a) =>
      marginal.map((b, i): [number, number, number] => [i, 1 + a, (i === a ? 1 : 0) - b]),
    );
    const byMarginal = marginal.map((_, a) => [
      [a, 0, 1] as [number, number, number],
      ...committed.map((c, j): [number, number, number] => [a, 1 + j, -c]),
    ]);
    return [...byCommitted, ...byMarginal];
  },
};

/** Σ p_j c_j and Σ b_j ln p_j. */
function subsistence(theta: readonly number[], size: SystemSize, prices: readonly number[]) {
  const { committed, marginal } = committedAndMarginal(theta, size);
  return {
    cost: prices.reduce((sum, price, j) => sum + price * committed[j], 0),
    logPrice: prices.reduce((sum, price, j) => sum + marginal[j] * Math.log(price), 0),
  };
}

/**
 * Linear expenditure system, share form.
 *
 *     w_i = c_i p_i/x + b_i (1 − Σ_j c_j p_j/x),   Σ b_i = 1
 *     μ_i = b_i − w_i,   μ_ij = δ_ij c_i p_i/x − b_i c_j p_j/x
 *     c(u, p) = Σ_j p_j c_j + u Π_j p_j^{b_j}      (Stone–Geary; u > 0)
 *
 * Committed quantities are in units of estimation: multiplied by totalScale / priceScale_i they are in
 * the upload's. Stone (1954, Economic Journal 64, 511–527).
 */
export const les: DemandSystem = {
  name: "les",
  longName: "linear expenditure system",
  source: "Stone (1954), Economic Journal 64",
  blocks: [
    { name: "committed", symbol: "c", columns: "one" },
    { name: "marginal", symbol: "b", columns: "one" },
  ],
  heldByForm: ["homogeneity", "symmetry"],
  takesDemographics: false,
  layout: ({ goods }) =>
    ["committed", "marginal"].flatMap((block) =>
      Array.from({ length: goods }, (_, good): CoefficientPlace => ({ block, good })),
    ),
  free: ({ goods: n }) =>
    freeForm(2 * n, [
      remainder(
        Array.from({ length: n }, (_, i) => n + i),
        1,
      ),
    ]),
  evaluator: expenditureEvaluator,
  slopes: (theta, size, point) => slopesByEvaluator(expenditureEvaluator(theta, size), size, point),
  slopeDerivatives: expenditureDerivatives,
  explainPriceSlope: (theta, size, point, i, j) => {
    const { committed, marginal } = committedAndMarginal(theta, size);
    const committedShare = (committed[j] * point.prices[j]) / point.total;
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
  moments: shareMoments,
  /** Nothing committed: shares that do not move. */
  start: (_, meanShares) => [...meanShares.map(() => 0), ...meanShares],
  cost: {
    logCost: (theta, size, utility, prices) => {
      const { cost, logPrice } = subsistence(theta, size, prices);
      return utility > 0 ? Math.log(cost + utility * Math.exp(logPrice)) : Number.NaN;
    },
    utility: (theta, size, point) => {
      requirePoint(size, point);
      const { cost, logPrice } = subsistence(theta, size, point.prices);
      return point.total > cost ? (point.total - cost) / Math.exp(logPrice) : Number.NaN;
    },
  },
};
