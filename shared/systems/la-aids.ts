import { dot } from "../numerics/matrix.ts";
import {
  ALMOST_IDEAL_BLOCKS,
  almostIdealFreeForm,
  almostIdealLayout,
  almostIdealStart,
  interceptsAt,
  partsOf,
  placesOf,
} from "./almost-ideal.ts";
import { almostIdealDerivatives, shareDerivatives } from "./almost-ideal-derivatives.ts";
import type { DemandSystem, Evaluator, Point, PriceIndex, SlopeDerivatives, SystemSize } from "./demand-system.ts";
import { requirePoint, slopesByEvaluator } from "./evaluation.ts";
import { linearApproximateMoments } from "./la-aids-moments.ts";
import { INDEX_WEIGHTS } from "./price-indices.ts";

/** a, b·w̄ and ln p̄ of the formulas above. */
interface PointIndex {
  readonly own: number;
  readonly fixed: Float64Array;
  readonly base: Float64Array;
}

function pointIndex(size: SystemSize): PointIndex {
  const index: PriceIndex | undefined = size.index;
  if (index === undefined) {
    throw new RangeError(
      "the linear approximate system is evaluated with its price index and the sample means of shares and prices; none were given",
    );
  }
  for (const [name, means] of [
    ["mean shares", index.meanShares],
    ["mean prices", index.meanPrices],
  ] as const) {
    if (means.length !== size.goods) {
      throw new RangeError(`${name} has ${means.length} entries, the system has ${size.goods} goods`);
    }
  }
  const { own, mean, relative } = INDEX_WEIGHTS[index.name];
  return {
    own,
    fixed: Float64Array.from(index.meanShares, (share) => mean * share),
    base: Float64Array.from(index.meanPrices, (price) => (relative ? Math.log(price) : 0)),
  };
}

function linearEvaluator(theta: readonly number[], size: SystemSize): Evaluator {
  const n = size.goods;
  const parts = partsOf(theta, size);
  const { gamma, beta } = parts;
  const { own, fixed, base } = pointIndex(size);
  const shares = new Float64Array(n);
  const prices = new Float64Array(n * n);
  const levels = new Float64Array(n);
  return {
    shares,
    total: Float64Array.from(beta),
    prices,
    at(logPrices, logTotal, demographics) {
      interceptsAt(parts, demographics, levels);
      let numerator = logTotal;
      let denominator = 1;
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) levels[i] += gamma[i * n + j] * logPrices[j];
        const deviation = logPrices[i] - base[i];
        numerator -= (own * levels[i] + fixed[i]) * deviation;
        denominator += own * beta[i] * deviation;
      }
      if (!(denominator > 0)) {
        shares.fill(Number.NaN);
        return;
      }
      const real = numerator / denominator;
      for (let i = 0; i < n; i++) shares[i] = levels[i] + beta[i] * real;
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) prices[i * n + j] = gamma[i * n + j] - beta[i] * shares[j];
      }
    },
  };
}

const NO_INDEX = "1 + a Σ β_k d_k is not above 0, d_k being the log price of good k from its base";

function refuseAt(theta: readonly number[], size: SystemSize, { prices }: Point): never {
  const { beta } = partsOf(theta, size);
  const { own, base } = pointIndex(size);
  const denominator = prices.reduce((sum, price, k) => sum + own * beta[k] * (Math.log(price) - base[k]), 1);
  const below = Math.abs(denominator).toFixed(3);
  throw new RangeError(
    `the linear approximate system predicts no shares at these prices: 1 + a Σ β_k d_k must be above 0 and is ${below} below it, d_k being the log price of good k from its base (normalise: mean keeps them small)`,
  );
}

/** Shares with the index's weights frozen at the predicted shares at `point`. */
function sharesNear(theta: readonly number[], size: SystemSize, point: Point): (nearby: Point) => number[] {
  const { shares } = laAids.slopes(theta, size, point);
  const { demographic, gamma, beta } = partsOf(theta, size);
  const { goods: n, demographics: s } = size;
  return (nearby) => {
    requirePoint(size, nearby);
    const step = nearby.prices.map((price, k) => Math.log(price / point.prices[k]));
    const real = Math.log(nearby.total / point.total) - dot(shares, step);
    return shares.map((share, i) => {
      let sum = share + beta[i] * real;
      for (let j = 0; j < n; j++) sum += gamma[i * n + j] * step[j];
      for (let d = 0; d < s; d++) sum += demographic[i * s + d] * (nearby.demographics[d] - point.demographics[d]);
      return sum;
    });
  };
}

/** With D = 1 + a Σ β_k d_k: ∂m/∂A_k = −a d_k/D and ∂m/∂β_k = −a d_k m/D. */
function linearDerivatives(theta: readonly number[], size: SystemSize, point: Point): SlopeDerivatives {
  requirePoint(size, point);
  const { goods: n, demographics: s } = size;
  const parts = partsOf(theta, size);
  const { own, fixed, base } = pointIndex(size);
  const z = point.demographics;
  const logPrices = point.prices.map(Math.log);
  const deviations = logPrices.map((logPrice, k) => logPrice - base[k]);
  const levels = new Float64Array(n);
  interceptsAt(parts, z, levels);
  const denominator = 1 + own * dot(parts.beta, deviations);
  const logIndexAtZero = deviations.reduce((sum, deviation, k) => {
    for (let j = 0; j < n; j++) levels[k] += parts.gamma[k * n + j] * logPrices[j];
    return sum + (own * levels[k] + fixed[k]) * deviation;
  }, 0);
  const real = (Math.log(point.total) - logIndexAtZero) / denominator;
  const places = placesOf(size);
  const realByTheta = new Array<number>(places.count).fill(0);
  for (let k = 0; k < n; k++) {
    const factor = (-own * deviations[k]) / denominator;
    realByTheta[places.alpha(k)] = factor;
    for (let d = 0; d < s; d++) realByTheta[places.demographic(k, d)] = factor * z[d];
    for (let j = 0; j < n; j++) realByTheta[places.gamma(k, j)] = factor * logPrices[j];
    realByTheta[places.beta(k)] = factor * real;
  }
  const sharesByTheta = shareDerivatives(size, {
    logPrices,
    demographics: z,
    beta: parts.beta,
    real,
    realByTheta,
  });
  const shares = Array.from(levels, (level, i) => level + parts.beta[i] * real);
  return almostIdealDerivatives(size, parts.beta, sharesByTheta, shares, sharesByTheta);
}

/**
 * Linear approximate almost ideal demand system: ln P is an index without parameters, which the
 * estimator forms from the data (`logPriceIndex`).
 *
 *     w_i = α_i(z) + Σ_j γ_ij ln p_j + β_i m,   m = ln x − ln P
 *
 * **Predicted shares at a point.** With d_k = ln p_k − ln p̄_k (Stone: ln p_k) the index is
 * ln P = Σ_k (a w_k + b w̄_k) d_k, and away from the sample nothing is observed, so the w_k in it are the
 * predicted shares themselves. The equations are linear in w and solved exactly:
 *
 *     m = (ln x − a Σ_k A_k d_k − b Σ_k w̄_k d_k) / (1 + a Σ_k β_k d_k),   A_k = α_k(z) + Σ_j γ_kj ln p_j
 *
 * Where prices are at their means d = 0 and m = ln x: the base point of normalised data. The shares are
 * not defined where 1 + a Σ β_k d_k ≤ 0: NaN, and the slopes refused there. No prices near a sample do that, but p = 1 may be
 * far from one whose prices are not normalised.
 *
 * **Slopes** hold the index's weights fixed and take them to be the predicted shares at the point
 * (Chalfant 1987, Journal of Business and Economic Statistics 5, 233–242): μ_i = β_i, μ_ij = γ_ij − β_i w_j.
 *
 * Deaton & Muellbauer (1980, American Economic Review 70, 312–326), equation (15). No cost function.
 */
export const laAids: DemandSystem = {
  name: "la-aids",
  kind: "levels",
  longName: "linear approximate almost ideal demand system",
  source: "Deaton and Muellbauer (1980), American Economic Review 70",
  blocks: ALMOST_IDEAL_BLOCKS,
  heldByForm: [],
  takesDemographics: true,
  layout: almostIdealLayout,
  free: almostIdealFreeForm,
  evaluator: linearEvaluator,
  notDefined: NO_INDEX,
  slopes: (theta, size, point) =>
    slopesByEvaluator(linearEvaluator(theta, size), size, point, (at) => refuseAt(theta, size, at)),
  slopeDerivatives: linearDerivatives,
  sharesNear,
  explainPriceSlope: (theta, size, point, i, j) => {
    const { gamma, beta } = partsOf(theta, size);
    const { shares } = laAids.slopes(theta, size, point);
    return [
      { sign: 1, factors: [{ symbol: "γ_ij", value: gamma[i * size.goods + j] }] },
      {
        sign: -1,
        factors: [
          { symbol: "β_i", value: beta[i] },
          { symbol: "w_j", value: shares[j] },
        ],
      },
    ];
  },
  moments: linearApproximateMoments,
  start: almostIdealStart,
  cost: {
    absent:
      "the linear approximate system has no cost function, so no exact welfare and no utility to hold fixed: use aids",
  },
};
