import { dot } from "../numerics/matrix.ts";
import { aidsMoments } from "./aids-moments.ts";
import {
  ALMOST_IDEAL_BLOCKS,
  almostIdealFreeForm,
  almostIdealLayout,
  almostIdealStart,
  interceptsAt,
  partsOf,
} from "./almost-ideal.ts";
import { almostIdealDerivatives, shareDerivatives } from "./almost-ideal-derivatives.ts";
import { aidsCostDerivatives } from "./cost-derivatives.ts";
import { aidsCostEvaluator } from "./cost-evaluators.ts";
import type { DemandSystem, Evaluator, Point, SlopeDerivatives, SystemSize } from "./demand-system.ts";
import { slopesByEvaluator } from "./evaluation.ts";
import { symmetricPart, translogAt, translogDerivatives } from "./translog.ts";

/**
 * Almost ideal demand system with the exact translog index.
 *
 *     w_i = α_i(z) + Σ_j γ_ij ln p_j + β_i m,   m = ln x − ln P
 *     ln P = α₀ + Σ_k α_k(z) ln p_k + ½ Σ_k Σ_j γ_kj ln p_k ln p_j
 *     μ_i = β_i,   μ_ij = γ_ij − β_i π_j,   π_j = ∂ln P/∂ln p_j = α_j(z) + ½ Σ_k (γ_jk + γ_kj) ln p_k
 *
 * α₀ is fixed. Symmetry of Γ is not assumed. Deaton & Muellbauer (1980, American Economic Review 70,
 * 312–326), equations (8) and (9).
 */
export const aids: DemandSystem = {
  name: "aids",
  kind: "levels",
  longName: "almost ideal demand system",
  source: "Deaton and Muellbauer (1980), American Economic Review 70",
  blocks: ALMOST_IDEAL_BLOCKS,
  heldByForm: [],
  takesDemographics: true,
  layout: almostIdealLayout,
  free: almostIdealFreeForm,
  evaluator: aidsEvaluator,
  slopes: (theta, size, point) => slopesByEvaluator(aidsEvaluator(theta, size), size, point),
  slopeDerivatives: aidsDerivatives,
  explainPriceSlope: (theta, size, point, i, j) => {
    const { parts, indexSlopes, logPrices } = translogAt(theta, size, point);
    const atUnitPrices = logPrices.every((logPrice) => logPrice === 0);
    const symbol = atUnitPrices ? "α_j" : "(α_j + ½Σ_k(γ_jk + γ_kj) ln p_k)";
    return [
      { sign: 1, factors: [{ symbol: "γ_ij", value: parts.gamma[i * size.goods + j] }] },
      {
        sign: -1,
        factors: [
          { symbol: "β_i", value: parts.beta[i] },
          { symbol, value: indexSlopes[j] },
        ],
      },
    ];
  },
  moments: aidsMoments,
  start: almostIdealStart,
  cost: {
    evaluator: aidsCostEvaluator,
    logCostDerivatives: aidsCostDerivatives,
    /** ln c = ln P(p) + u Π p_k^β_k. */
    logCost: (theta, size, utility, prices, demographics) => {
      const { logIndex, logPrices, parts } = translogAt(theta, size, { prices, total: 1, demographics });
      return logIndex + utility * Math.exp(dot(parts.beta, logPrices));
    },
    /** u = m / Π p_k^β_k. */
    utility: (theta, size, point) => {
      const { logIndex, logPrices, parts } = translogAt(theta, size, point);
      return (Math.log(point.total) - logIndex) / Math.exp(dot(parts.beta, logPrices));
    },
  },
};

function aidsEvaluator(theta: readonly number[], size: SystemSize): Evaluator {
  const n = size.goods;
  const parts = partsOf(theta, size);
  const { gamma, beta } = parts;
  const symmetric = symmetricPart(gamma, n);
  const shares = new Float64Array(n);
  const total = Float64Array.from(beta);
  const prices = new Float64Array(n * n);
  const intercepts = new Float64Array(n);
  const indexSlopes = new Float64Array(n);
  return {
    shares,
    total,
    prices,
    at(logPrices, logTotal, demographics) {
      interceptsAt(parts, demographics, intercepts);
      let real = logTotal - size.alpha0;
      for (let j = 0; j < n; j++) {
        let slope = intercepts[j];
        for (let k = 0; k < n; k++) slope += symmetric[j * n + k] * logPrices[k];
        indexSlopes[j] = slope;
        // Σ α_k ln p_k + ½ ln p'Γ ln p = ½ Σ (α_k + π_k) ln p_k
        real -= 0.5 * (intercepts[j] + slope) * logPrices[j];
      }
      for (let i = 0; i < n; i++) {
        let share = intercepts[i] + beta[i] * real;
        for (let j = 0; j < n; j++) {
          share += gamma[i * n + j] * logPrices[j];
          prices[i * n + j] = gamma[i * n + j] - beta[i] * indexSlopes[j];
        }
        shares[i] = share;
      }
    },
  };
}

function aidsDerivatives(theta: readonly number[], size: SystemSize, point: Point): SlopeDerivatives {
  const { parts, logPrices, logIndex, indexSlopes } = translogAt(theta, size, point);
  const { realByTheta, indexSlopesByTheta } = translogDerivatives(size, logPrices, point.demographics);
  const sharesByTheta = shareDerivatives(size, {
    logPrices,
    demographics: point.demographics,
    beta: parts.beta,
    real: Math.log(point.total) - logIndex,
    realByTheta,
  });
  return almostIdealDerivatives(size, parts.beta, sharesByTheta, indexSlopes, indexSlopesByTheta);
}
