import { chiSquareTail, fTail } from "../../../shared/numerics/distributions.ts";
import type { RestrictionTest, UntestedRestriction } from "../../../shared/schemas/system.ts";

/** What a test needs of a fitted model. */
export interface NestedFit {
  readonly logLikelihood: number;
  readonly freeCoefficients: number;
}

/** Why the data do not allow a fit, in the words of the refusal. */
export interface RefusedFit {
  readonly refused: string;
}

/** Fits by maximum likelihood, each nested in the one before; symmetry says nothing of two goods and is absent. */
export interface NestedFits {
  readonly unrestricted: NestedFit | RefusedFit;
  readonly homogeneity: NestedFit | RefusedFit;
  readonly symmetry?: NestedFit | RefusedFit;
  /** Systems with quadratic terms: under the restrictions imposed, with these terms and without. */
  readonly quadratic?: { readonly wide: NestedFit | RefusedFit; readonly narrow: NestedFit | RefusedFit };
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

export interface RestrictionTests {
  readonly tests: RestrictionTest[];
  /** What could not be tested, each with its reason. */
  readonly untested: UntestedRestriction[];
}

/** Homogeneity, symmetry given homogeneity, and quadratic terms: likelihood ratios with their small-sample companions. */
export function restrictionTests(fits: NestedFits, system: TestedSystem): RestrictionTests {
  const { unrestricted, homogeneity, symmetry, quadratic } = fits;
  const first = tested("homogeneity", unrestricted, homogeneity, system);
  if ("statistic" in first && system.linear && !("refused" in unrestricted)) {
    const exact = laitinenTest(first.statistic, unrestricted, system, system.linear.exact);
    if (exact) first.exact = exact;
  }
  const all = [
    first,
    ...(symmetry ? [tested("symmetry given homogeneity", homogeneity, symmetry, system)] : []),
    ...(quadratic ? [tested("quadratic terms zero", quadratic.wide, quadratic.narrow, system)] : []),
  ];
  return {
    tests: all.filter((test) => "statistic" in test),
    untested: all.filter((test) => "reason" in test),
  };
}

function tested(
  restriction: RestrictionTest["restriction"],
  wide: NestedFit | RefusedFit,
  narrow: NestedFit | RefusedFit,
  system: TestedSystem,
): RestrictionTest | UntestedRestriction {
  if ("refused" in wide) return { restriction, reason: `Without the restriction there is no fit: ${wide.refused}` };
  if ("refused" in narrow) return { restriction, reason: `Under the restriction there is no fit: ${narrow.refused}` };
  return likelihoodRatioTest(restriction, wide, narrow, system) ?? { restriction, reason: tooFewFor(wide, system) };
}

function tooFewFor({ freeCoefficients }: NestedFit, { rows, equations }: TestedSystem): string {
  return `${rows} rows are too few to correct a likelihood ratio of ${freeCoefficients} coefficients in ${equations} equations for small samples, and uncorrected it would reject far too often.`;
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
  const factor = italianerFactor(wide.freeCoefficients, narrow.freeCoefficients, { rows, equations });
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

/** [mT − ½(k_u + k_r) − ½m(m + 1)]/(mT), Italianer (1985); not positive where rows are too few for any test. */
export function italianerFactor(
  wide: number,
  narrow: number,
  { rows, equations }: Pick<TestedSystem, "rows" | "equations">,
): number {
  const size = equations * rows;
  return (size - (wide + narrow) / 2 - (equations * (equations + 1)) / 2) / size;
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
