import {
  ALMOST_IDEAL_BLOCKS,
  almostIdealDependences,
  almostIdealLayout,
  almostIdealStart,
  interceptsAt,
} from "./almost-ideal.ts";
import { quaidsCostDerivatives } from "./cost-derivatives.ts";
import { quaidsCostEvaluator } from "./cost-evaluators.ts";
import type { DemandSystem, Evaluator, SystemSize } from "./demand-system.ts";
import { slopesByEvaluator } from "./evaluation.ts";
import { freeForm, remainder } from "./free-form.ts";
import { quaidsDerivatives } from "./quaids-derivatives.ts";
import { quaidsMoments } from "./quaids-moments.ts";
import { quaidsParts, quaidsPlaces } from "./quaids-parts.ts";
import { quaidsAt } from "./quaids-point.ts";
import { symmetricPart } from "./translog.ts";

const NO_UTILITY = "its shares go on there, yet 1 + λ(p) y is not above 0 and no utility belongs to them";

const goodsOf = ({ goods }: SystemSize) => Array.from({ length: goods }, (_, good) => good);

/**
 * Quadratic almost ideal demand system.
 *
 *     w_i = α_i(z) + Σ_j γ_ij ln p_j + β_i m + (λ_i/b(p)) m²,   m = ln x − ln a(p)
 *     ln a(p) = α₀ + Σ_k α_k(z) ln p_k + ½ Σ_k Σ_j γ_kj ln p_k ln p_j,   b(p) = Π p_k^β_k,   Σλ_i = 0
 *     μ_i = β_i + 2λ_i m/b,   μ_ij = γ_ij − μ_i π_j − λ_i β_j m²/b,   π_j = α_j(z) + ½ Σ_k (γ_jk + γ_kj) ln p_k
 *
 * Shares are defined everywhere; utility where 1 + λ(p) y > 0, with λ(p) = Σ λ_k ln p_k and y = m/b(p).
 *
 * α₀ is fixed. λ = 0 is the almost ideal system. Banks, Blundell & Lewbel (1997, Review of Economics and
 * Statistics 79, 527–539), equations (7) to (10).
 */
export const quaids: DemandSystem = {
  name: "quaids",
  kind: "levels",
  longName: "quadratic almost ideal demand system",
  source: "Banks, Blundell and Lewbel (1997), Review of Economics and Statistics 79",
  blocks: [...ALMOST_IDEAL_BLOCKS, { name: "lambda", symbol: "λ", columns: "one" }],
  heldByForm: [],
  takesDemographics: true,
  layout: (size) => [...almostIdealLayout(size), ...goodsOf(size).map((good) => ({ block: "lambda", good }))],
  free: (size, impose) => {
    const places = quaidsPlaces(size);
    const addingUp = remainder(goodsOf(size).map(places.lambda), 0);
    return freeForm(places.count, [...almostIdealDependences(size, impose), addingUp]);
  },
  evaluator: quaidsEvaluator,
  notDefined: NO_UTILITY,
  slopes: (theta, size, point) => slopesByEvaluator(quaidsEvaluator(theta, size), size, point),
  slopeDerivatives: quaidsDerivatives,
  explainPriceSlope: (theta, size, point, i, j) => {
    const { parts, logPrices, indexSlopes, square, total } = quaidsAt(theta, size, point);
    const atUnitPrices = logPrices.every((logPrice) => logPrice === 0);
    const indexSlope = atUnitPrices ? "α_j" : "(α_j + ½Σ_k(γ_jk + γ_kj) ln p_k)";
    return [
      { sign: 1, factors: [{ symbol: "γ_ij", value: parts.gamma[i * size.goods + j] }] },
      {
        sign: -1,
        factors: [
          { symbol: "(β_i + 2λ_i m/b)", value: total[i] },
          { symbol: indexSlope, value: indexSlopes[j] },
        ],
      },
      {
        sign: -1,
        factors: [
          { symbol: "λ_i", value: parts.lambda[i] },
          { symbol: "β_j", value: parts.beta[j] },
          { symbol: "m²/b", value: square },
        ],
      },
    ];
  },
  moments: quaidsMoments,
  start: (size, meanShares) => [...almostIdealStart(size, meanShares), ...meanShares.map(() => 0)],
  cost: {
    evaluator: quaidsCostEvaluator,
    logCostDerivatives: quaidsCostDerivatives,
    /** ln c = ln a(p) + b(p) u/(1 − λ(p) u) with u = ln V; NaN where 1 − λ(p) u ≤ 0. */
    logCost: (theta, size, utility, prices, demographics) => {
      const { logIndex, deflator, bend } = quaidsAt(theta, size, { prices, total: 1, demographics });
      const slack = 1 - bend * utility;
      return slack > 0 ? logIndex + (deflator * utility) / slack : Number.NaN;
    },
    /** u = y/(1 + λ(p) y) with y = m/b(p); NaN where 1 + λ(p) y ≤ 0. */
    utility: (theta, size, point) => {
      const { real, deflator, bend } = quaidsAt(theta, size, point);
      const inUnits = real / deflator;
      const slack = 1 + bend * inUnits;
      return slack > 0 ? inUnits / slack : Number.NaN;
    },
  },
};

function quaidsEvaluator(theta: readonly number[], size: SystemSize): Evaluator {
  const n = size.goods;
  const parts = quaidsParts(theta, size);
  const { gamma, beta, lambda } = parts;
  const symmetric = symmetricPart(gamma, n);
  const shares = new Float64Array(n);
  const total = new Float64Array(n);
  const prices = new Float64Array(n * n);
  const intercepts = new Float64Array(n);
  const indexSlopes = new Float64Array(n);
  /** 1 + λ(p) y. */
  let slack = Number.NaN;
  return {
    shares,
    total,
    prices,
    hasUtility: () => slack > 0,
    at(logPrices, logTotal, demographics) {
      interceptsAt(parts, demographics, intercepts);
      let real = logTotal - size.alpha0;
      let logDeflator = 0;
      let bend = 0;
      for (let j = 0; j < n; j++) {
        let slope = intercepts[j];
        for (let k = 0; k < n; k++) slope += symmetric[j * n + k] * logPrices[k];
        indexSlopes[j] = slope;
        // Σ α_k ln p_k + ½ ln p'Γ ln p = ½ Σ (α_k + π_k) ln p_k
        real -= 0.5 * (intercepts[j] + slope) * logPrices[j];
        logDeflator += beta[j] * logPrices[j];
        bend += lambda[j] * logPrices[j];
      }
      const inUnits = real * Math.exp(-logDeflator);
      const square = real * inUnits;
      slack = 1 + bend * inUnits;
      for (let i = 0; i < n; i++) {
        let share = intercepts[i] + beta[i] * real + lambda[i] * square;
        total[i] = beta[i] + 2 * lambda[i] * inUnits;
        for (let j = 0; j < n; j++) {
          share += gamma[i * n + j] * logPrices[j];
          prices[i * n + j] = gamma[i * n + j] - total[i] * indexSlopes[j] - lambda[i] * beta[j] * square;
        }
        shares[i] = share;
      }
    },
  };
}
