import { chiSquareTail, fTail } from "../../../shared/numerics/distributions.ts";
import type { RestrictionTest } from "../../../shared/schemas/system.ts";

/** What a test needs of a fitted model. */
export interface NestedFit {
  readonly logLikelihood: number;
  readonly freeCoefficients: number;
}

/** Fits by maximum likelihood, each nested in the one before; absent where the data do not allow one. */
export interface NestedFits {
  readonly unrestricted?: NestedFit;
  readonly homogeneity?: NestedFit;
  readonly symmetry?: NestedFit;
}

export interface TestedSystem {
  /** T. */
  readonly rows: number;
  /** m = n − 1. */
  readonly equations: number;
  /**
   * For Laitinen's test: present where the share equations are linear in coefficients and variables,
   * exact where in addition nothing on the right depends on current shares and rows weigh the same.
   */
  readonly linear?: { readonly exact: boolean };
}

/** Homogeneity, and symmetry given homogeneity: likelihood ratios with their small-sample companions. */
export function restrictionTests(fits: NestedFits, system: TestedSystem): RestrictionTest[] {
  const tests: RestrictionTest[] = [];
  const { unrestricted, homogeneity, symmetry } = fits;
  if (unrestricted && homogeneity) {
    const test = likelihoodRatioTest("homogeneity", unrestricted, homogeneity, system);
    const exact = system.linear && laitinenTest(test?.statistic ?? 0, unrestricted, system, system.linear.exact);
    if (test) tests.push({ ...test, ...(exact && { exact }) });
  }
  if (homogeneity && symmetry) {
    const test = likelihoodRatioTest("symmetry given homogeneity", homogeneity, symmetry, system);
    if (test) tests.push(test);
  }
  return tests;
}

/**
 * LR = 2(lnL_u − lnL_r) on k_u − k_r degrees of freedom, and Italianer's (1985, Economics Letters 19)
 * LR·[mT − ½(k_u + k_r) − ½m(m + 1)]/(mT). Absent where nothing is restricted or the correction would
 * be negative: so few rows support no test.
 */
export function likelihoodRatioTest(
  restriction: RestrictionTest["restriction"],
  wide: NestedFit,
  narrow: NestedFit,
  { rows, equations }: Pick<TestedSystem, "rows" | "equations">,
): RestrictionTest | undefined {
  const degreesOfFreedom = wide.freeCoefficients - narrow.freeCoefficients;
  const size = equations * rows;
  const factor =
    (size - (wide.freeCoefficients + narrow.freeCoefficients) / 2 - (equations * (equations + 1)) / 2) / size;
  if (degreesOfFreedom <= 0 || factor <= 0) return undefined;
  // A difference below zero is rounding of two equal likelihoods.
  const statistic = Math.max(0, 2 * (wide.logLikelihood - narrow.logLikelihood));
  const corrected = statistic * factor;
  return {
    restriction,
    statistic,
    degreesOfFreedom,
    pValue: chiSquareTail(statistic, degreesOfFreedom),
    corrected: { statistic: corrected, pValue: chiSquareTail(corrected, degreesOfFreedom) },
  };
}

/**
 * Laitinen's (1978, Economics Letters 1) test of one linear restriction in each of m equations with the
 * same k regressors: T² = ν(e^{LR/T} − 1) with ν = T − k, and F = T²(ν − m + 1)/(νm) on (m, ν − m + 1).
 */
export function laitinenTest(
  likelihoodRatio: number,
  unrestricted: NestedFit,
  { rows, equations }: Pick<TestedSystem, "rows" | "equations">,
  exact: boolean,
): RestrictionTest["exact"] {
  const freedom = rows - unrestricted.freeCoefficients / equations;
  const denominator = freedom - equations + 1;
  if (denominator <= 0) return undefined;
  const tSquared = freedom * Math.expm1(likelihoodRatio / rows);
  const f = (tSquared * denominator) / (freedom * equations);
  return {
    tSquared,
    f,
    numerator: equations,
    denominator,
    pValue: fTail(f, equations, denominator),
    approximate: !exact,
  };
}
