import { interceptsAt, type Parts, partsOf } from "./almost-ideal.ts";
import type { CostEvaluator, SystemSize } from "./demand-system.ts";
import { easiPoint } from "./easi-point.ts";
import { committedAt, lesParts } from "./les-parts.ts";
import { quaidsParts } from "./quaids-parts.ts";
import { symmetricPart } from "./translog.ts";

/**
 * Utility and cost at fixed θ, evaluated again and again without allocating: what a million households' welfare is
 * computed with. The same formulas as `utility` and `logCost` of each system.
 */
type Evaluators = (theta: readonly number[], size: SystemSize) => CostEvaluator;

/** ln P + u b, b = Π p_k^β_k. */
export const aidsCostEvaluator: Evaluators = (theta, size) => {
  const parts = partsOf(theta, size);
  const logIndex = translogIndex(parts, size);
  return {
    utility: (logPrices, logTotal, demographics) =>
      (logTotal - logIndex(logPrices, demographics)) / Math.exp(along(parts.beta, logPrices)),
    logCost: (logPrices, utility, demographics) =>
      logIndex(logPrices, demographics) + utility * Math.exp(along(parts.beta, logPrices)),
  };
};

/** u = y/(1 + λ(p) y), y = m/b;  ln a + b u/(1 − λ(p) u). */
export const quaidsCostEvaluator: Evaluators = (theta, size) => {
  const parts = quaidsParts(theta, size);
  const logIndex = translogIndex(parts, size);
  return {
    utility: (logPrices, logTotal, demographics) => {
      const inUnits = (logTotal - logIndex(logPrices, demographics)) / Math.exp(along(parts.beta, logPrices));
      const slack = 1 + along(parts.lambda, logPrices) * inUnits;
      return slack > 0 ? inUnits / slack : Number.NaN;
    },
    logCost: (logPrices, utility, demographics) => {
      const slack = 1 - along(parts.lambda, logPrices) * utility;
      if (!(slack > 0)) return Number.NaN;
      return logIndex(logPrices, demographics) + (Math.exp(along(parts.beta, logPrices)) * utility) / slack;
    },
  };
};

/** u = (x − Σ p_j c_j)/Π p_j^b_j;  Σ p_j c_j + u Π p_j^b_j. */
export const lesCostEvaluator: Evaluators = (theta, size) => {
  const parts = lesParts(theta, size);
  const committed = new Float64Array(size.goods);
  const needs = (logPrices: ArrayLike<number>, demographics: ArrayLike<number>) => {
    committedAt(parts, demographics, committed);
    let cost = 0;
    for (let j = 0; j < committed.length; j++) cost += committed[j] * Math.exp(logPrices[j]);
    return cost;
  };
  return {
    utility: (logPrices, logTotal, demographics) => {
      const above = Math.exp(logTotal) - needs(logPrices, demographics);
      return above > 0 ? above / Math.exp(along(parts.marginal, logPrices)) : Number.NaN;
    },
    logCost: (logPrices, utility, demographics) =>
      utility > 0
        ? Math.log(needs(logPrices, demographics) + utility * Math.exp(along(parts.marginal, logPrices)))
        : Number.NaN,
  };
};

/** The root of ln C(p, u, z) = ln x on the stretch where cost rises with utility; ln C. */
export const easiCostEvaluator: Evaluators = (theta, size) => {
  const point = easiPoint(theta, size);
  return {
    utility: (logPrices, logTotal, demographics) => {
      point.at(logPrices, logTotal, demographics);
      return point.utility;
    },
    logCost: (logPrices, utility, demographics) => {
      const logCost = point.atUtility(logPrices, utility, demographics);
      return point.rise > 0 ? logCost : Number.NaN;
    },
  };
};

/** ln P = α₀ + Σ_k α_k(z) ln p_k + ½ Σ_k Σ_j γ_kj ln p_k ln p_j at any prices. */
function translogIndex(parts: Parts, { goods: n, alpha0 }: SystemSize) {
  const symmetric = symmetricPart(parts.gamma, n);
  const intercepts = new Float64Array(n);
  return (logPrices: ArrayLike<number>, demographics: ArrayLike<number>): number => {
    interceptsAt(parts, demographics, intercepts);
    let index = alpha0;
    for (let j = 0; j < n; j++) {
      let effects = 0;
      for (let k = 0; k < n; k++) effects += symmetric[j * n + k] * logPrices[k];
      index += (intercepts[j] + 0.5 * effects) * logPrices[j];
    }
    return index;
  };
}

function along(weights: ArrayLike<number>, logPrices: ArrayLike<number>): number {
  let sum = 0;
  for (let k = 0; k < weights.length; k++) sum += weights[k] * logPrices[k];
  return sum;
}
