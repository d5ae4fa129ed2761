import { chiSquareTail } from "../numerics/distributions.ts";

/** A maximised log-likelihood and the number of free coefficients it is the maximum over. */
export interface Maximum {
  readonly logLikelihood: number;
  readonly freeCoefficients: number;
}

export interface LikelihoodRatio {
  readonly statistic: number;
  readonly degreesOfFreedom: number;
  readonly pValue: number;
}

/** The larger of two nested models cannot fit worse by more than the iterations' own tolerance. */
const SHORT_OF_MAXIMUM = 1e-4;

/**
 * Likelihood ratio of nested models, 2(ln L₁ − ln L₀) on F₁ − F₀ degrees of freedom, and P(χ² above it).
 *
 * Errors: the smaller has no fewer coefficients than the larger, or the larger fits worse than the smaller, which a
 * maximum cannot: then its iterations stopped short.
 * Source: Wilks (1938, Annals of Mathematical Statistics 9), from memory.
 */
export function likelihoodRatio(smaller: Maximum, larger: Maximum): LikelihoodRatio {
  const degreesOfFreedom = larger.freeCoefficients - smaller.freeCoefficients;
  if (degreesOfFreedom <= 0) {
    throw new RangeError(
      `the smaller system has ${smaller.freeCoefficients} free coefficients, the larger ${larger.freeCoefficients}: no degree of freedom is left to test`,
    );
  }
  const statistic = 2 * (larger.logLikelihood - smaller.logLikelihood);
  if (statistic < -SHORT_OF_MAXIMUM) {
    throw new RangeError(
      `the larger system has log-likelihood ${larger.logLikelihood.toFixed(3)}, the smaller ${smaller.logLikelihood.toFixed(3)}: the larger stopped short of its maximum`,
    );
  }
  const atLeast = Math.max(0, statistic);
  return { statistic: atLeast, degreesOfFreedom, pValue: chiSquareTail(atLeast, degreesOfFreedom) };
}
