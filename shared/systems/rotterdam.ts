import { zeros } from "../numerics/matrix.ts";
import type { CoefficientPlace, DemandSystem, Evaluator, SlopeDerivatives, SystemSize } from "./demand-system.ts";
import { requirePoint, requireTheta, slopesByEvaluator } from "./evaluation.ts";
import { type Dependence, freeForm, remainder } from "./free-form.ts";
import { rotterdamMoments } from "./rotterdam-moments.ts";
import { rotterdamPlaces } from "./rotterdam-places.ts";

function meanSharesOf({ meanShares, goods }: SystemSize): readonly number[] {
  if (meanShares === undefined) {
    throw new RangeError("the Rotterdam system stands at observed mean shares; none were given");
  }
  if (meanShares.length !== goods) {
    throw new RangeError(`mean shares has ${meanShares.length} entries, the system has ${goods} goods`);
  }
  return meanShares;
}

function rotterdamEvaluator(theta: readonly number[], size: SystemSize): Evaluator {
  const n = size.goods;
  const places = rotterdamPlaces(size);
  requireTheta(theta, places.count);
  const means = meanSharesOf(size);
  const shares = new Float64Array(n);
  const total = new Float64Array(n);
  const prices = new Float64Array(n * n);
  const atShares = (observed: ArrayLike<number>) => {
    for (let i = 0; i < n; i++) shares[i] = observed[i];
    for (let i = 0; i < n; i++) {
      const marginal = theta[places.marginal(i)];
      total[i] = marginal - shares[i];
      for (let j = 0; j < n; j++) prices[i * n + j] = theta[places.slutsky(i, j)] - marginal * shares[j];
      prices[i * n + i] += shares[i];
    }
  };
  return { shares, total, prices, at: () => atShares(means), atShares };
}

/** ∂μ_i/∂θ_i = 1, ∂μ_ij/∂π_ij = 1, ∂μ_ij/∂θ_i = −w_j; the shares are observed and no functions of θ. */
function rotterdamDerivatives(size: SystemSize): SlopeDerivatives {
  const n = size.goods;
  const places = rotterdamPlaces(size);
  const shares = meanSharesOf(size);
  const goods = Array.from({ length: n }, (_, i) => i);
  const total = zeros(n, places.count);
  for (const i of goods) total[i][places.marginal(i)] = 1;
  const prices = goods.map((i) =>
    goods.map((j) => {
      const row = new Array<number>(places.count).fill(0);
      row[places.slutsky(i, j)] = 1;
      row[places.marginal(i)] = -shares[j];
      return row;
    }),
  );
  return { shares: zeros(n, places.count), total, prices };
}

function rotterdamFree(size: SystemSize, impose: readonly string[]) {
  const { goods: n, demographics: s } = size;
  const at = rotterdamPlaces(size);
  const goods = Array.from({ length: n }, (_, i) => i);
  const over = (place: (good: number) => number, total = 0) => remainder(goods.map(place), total);
  const dependences: Dependence[] = [over(at.marginal, 1)];
  for (let j = 0; j < n; j++) dependences.push(over((i) => at.slutsky(i, j)));
  for (let k = 0; k < s; k++) dependences.push(over((i) => at.demographic(i, k)));
  if (impose.length > 0) for (let i = 0; i < n - 1; i++) dependences.push(over((j) => at.slutsky(i, j)));
  if (impose.includes("symmetry")) {
    for (let i = 1; i < n - 1; i++) {
      for (let j = 0; j < i; j++) {
        dependences.push({ place: at.slutsky(i, j), constant: 0, on: [[at.slutsky(j, i), 1]] });
      }
    }
  }
  return freeForm(at.count, dependences);
}

/**
 * Rotterdam system, absolute price version.
 *
 *     w̄_it Δln q_it = Σ_k α_ik Δz_kt + θ_i Δln Q_t + Σ_j π_ij Δln p_jt,   Δln Q_t = Σ_i w̄_it Δln q_it
 *
 * with w̄_it the mean share of two consecutive periods. Σθ_i = 1, Σ_i π_ij = Σ_i α_ik = 0; homogeneity
 * Σ_j π_ij = 0; symmetry π_ij = π_ji. π is the Slutsky matrix in share form, the same at every row. A trend
 * among the demographics is an intercept where periods follow one another.
 *
 * **Slopes.** Only changes are explained: there is no share function, and shares at a point are observed ones,
 * the sample means unless a row's own are given. μ_i = θ_i − w_i, μ_ij = π_ij − θ_i w_j + w_i δ_ij, so that k_ij = π_ij
 * and η_i = θ_i/w_i. Standard errors take the observed shares as given.
 *
 * Theil (1965, Econometrica 33, 67–87); Barten (1966, doctoral thesis, Rotterdam).
 */
export const rotterdam: DemandSystem = {
  name: "rotterdam",
  kind: "differences",
  longName: "Rotterdam system",
  source: "Theil (1965), Econometrica 33; Barten (1966)",
  blocks: [
    { name: "marginal", symbol: "θ", columns: "one" },
    { name: "slutsky", symbol: "π", columns: "goods" },
    { name: "demographic", symbol: "α", columns: "demographics" },
  ],
  heldByForm: [],
  takesDemographics: true,
  layout: ({ goods, demographics }) => {
    const each = (count: number) => Array.from({ length: count }, (_, index) => index);
    const grid = (block: string, columns: number) =>
      each(goods).flatMap((good) => each(columns).map((column): CoefficientPlace => ({ block, good, column })));
    const marginal = each(goods).map((good): CoefficientPlace => ({ block: "marginal", good }));
    return [...marginal, ...grid("slutsky", goods), ...grid("demographic", demographics)];
  },
  free: rotterdamFree,
  evaluator: rotterdamEvaluator,
  slopes: (theta, size, point) => slopesByEvaluator(rotterdamEvaluator(theta, size), size, point),
  slopeDerivatives: (theta, size, point) => {
    requirePoint(size, point);
    requireTheta(theta, rotterdamPlaces(size).count);
    return rotterdamDerivatives(size);
  },
  explainPriceSlope: (theta, size, _, i, j) => {
    const places = rotterdamPlaces(size);
    const shares = meanSharesOf(size);
    return [
      { sign: 1, factors: [{ symbol: "π_ij", value: theta[places.slutsky(i, j)] }] },
      {
        sign: -1,
        factors: [
          { symbol: "θ_i", value: theta[places.marginal(i)] },
          { symbol: "w_j", value: shares[j] },
        ],
      },
      ...(i === j ? [{ sign: 1 as const, factors: [{ symbol: "w_i", value: shares[i] }] }] : []),
    ];
  },
  moments: rotterdamMoments,
  shareFunction: {
    absent:
      "the Rotterdam system explains changes from one period to the next and has no level of shares to predict: shares are observed ones",
  },
  /** Volume spread by the shares, no substitution. */
  start: (size, shares) => [...shares, ...new Array<number>(rotterdamPlaces(size).count - size.goods).fill(0)],
  cost: {
    absent:
      "the Rotterdam system explains changes and has no cost function, so no exact welfare and no utility to hold fixed: use aids",
  },
};
