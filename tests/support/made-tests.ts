import type { MadeTest } from "../../shared/schemas/tests.ts";

/**
 * Berndt & Wood's homogeneity test: asymptotic tests reject, Laitinen's exact one does not. The numbers are those that
 * tests/reference/berndt-wood.test.ts holds the engine to.
 */
export const berndtWoodHomogeneity: MadeTest = {
  hypothesis: "homogeneity",
  given: [],
  degreesOfFreedom: 3,
  wald: { statistic: 12.86497026, pValue: 0.004938 },
  likelihoodRatio: { statistic: 10.37876481, pValue: 0.015606 },
  score: { statistic: 8.49397885, pValue: 0.036833 },
  corrected: { statistic: 7.680285956, pValue: 0.0531027 },
  laitinen: {
    tSquared: 10.29197621,
    f: 3.087592862,
    numerator: 3,
    denominator: 18,
    pValue: 0.05338436,
    approximate: false,
    because: "the laspeyres index holds no current shares",
  },
};
