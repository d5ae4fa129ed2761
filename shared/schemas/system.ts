import { z } from "zod";
import { INTERACTION_NAMES, PRICE_INDEX_NAMES, RESTRICTION_NAMES, SYSTEM_NAMES } from "../systems/names.ts";
import { theoryChecks } from "./checks.ts";
import { curvatureFinding, curvatureIssues, curvatureSpecification } from "./curvature.ts";
import { easiIssues } from "./easi.ts";
import { equationsExplained, expenditureReport, sampleIssues } from "./equations.ts";
import { endogeneity, firstStepIssues, zerosFinding } from "./first-steps.ts";
import { cellName, columnName, count, fingerprint, finite, goodName, matrix, vector } from "./primitives.ts";
import {
  bootstrapFinding,
  checkStandardErrors,
  clustersFinding,
  STANDARD_ERROR_KINDS,
  standardErrorsSpecification,
} from "./standard-errors.ts";

export { standardErrorsSpecification } from "./standard-errors.ts";

export const ESTIMATOR_NAMES = [
  "least squares",
  "seemingly unrelated",
  "iterated seemingly unrelated",
  "maximum likelihood",
] as const;

/** Terms of the season as shifts of the intercepts: dummies, or pairs of sine and cosine. */
export const seasonSpecification = z.strictObject({
  /** Periods of the time column in one round: 4, 12, 52. */
  period: z.number().int().min(2).max(366),
  /** Pairs of sine and cosine; without it a dummy for every period but the last. */
  harmonics: z.number().int().min(1).optional(),
});

export const systemSpecification = z
  .strictObject({
    kind: z.literal("system"),
    data: cellName,
    form: z.enum(SYSTEM_NAMES),
    /** The price index of la-aids only. */
    index: z.enum(PRICE_INDEX_NAMES).optional(),
    impose: z.array(z.enum(RESTRICTION_NAMES)).default([]),
    estimator: z.enum(ESTIMATOR_NAMES).default("maximum likelihood"),
    demographics: z.array(columnName).default([]),
    /** α₀ of the translog index: fixed, not estimated. */
    alpha0: finite.default(0),
    /** The good whose equation is dropped; nothing depends on it under maximum likelihood. Default: the last. */
    dropped: goodName.optional(),
    "standard errors": standardErrorsSpecification.default("conventional"),
    /** Of the linear expenditure system: on which the errors stand. Shares, unless said otherwise. */
    errors: z.enum(["shares", "expenditures"]).optional(),
    /** Of easi: the degree of the Engel curves in real expenditure; 3 unless said otherwise. */
    degree: z.number().int().min(1).max(6).optional(),
    /** Of easi: which products enter beside main effects. */
    interactions: z.array(z.enum(INTERACTION_NAMES)).optional(),
    /** Of easi: deflated by mean shares and linear, or the exact implicit utility. Exact, unless said otherwise. */
    "real expenditure": z.enum(["exact", "approximate"]).optional(),
    /** Changes from one period of the time column to the next instead of levels. */
    differences: z.boolean().optional(),
    season: seasonSpecification.optional(),
    /** A linear trend in the time column among the intercepts. */
    trend: z.boolean().optional(),
    /** Total expenditure is endogenous: columns that explain it and stand in no share equation. */
    instruments: z.array(columnName).min(1).optional(),
    /** Goods not bought by two steps: participation explained by these columns beside prices and expenditure. */
    zeros: z.union([z.literal("two-step"), z.strictObject({ "two-step": z.array(columnName) })]).optional(),
    curvature: curvatureSpecification.optional(),
    /** Its goods are a group of a broader budget, and its total is what is spent on the group. */
    "conditional on": goodName.optional(),
  })
  .superRefine((system, context) => {
    if (system.index !== undefined && system.form !== "la-aids") {
      context.addIssue({
        code: "custom",
        path: ["index"],
        message: `index belongs to la-aids; ${system.form} has none to choose`,
      });
    }
    for (const { path, message } of easiIssues(system)) context.addIssue({ code: "custom", path, message });
    for (const { path, message } of sampleIssues(system)) context.addIssue({ code: "custom", path, message });
    for (const { path, message } of firstStepIssues(system)) context.addIssue({ code: "custom", path, message });
    for (const { path, message } of curvatureIssues(system)) context.addIssue({ code: "custom", path, message });
    checkStandardErrors(system["standard errors"], (key, message) =>
      context.addIssue({ code: "custom", path: ["standard errors", key], message }),
    );
    if (system.impose.includes("symmetry") && !system.impose.includes("homogeneity")) {
      context.addIssue({
        code: "custom",
        path: ["impose"],
        message: "symmetry is imposed given homogeneity: add homogeneity to impose",
      });
    }
  });
export type SystemSpecification = z.infer<typeof systemSpecification>;

export const coefficient = z.strictObject({
  block: z.string(),
  symbol: z.string(),
  good: goodName,
  /** The price (a good) or the demographic it belongs to. */
  column: z.string().optional(),
  estimate: finite,
  standardError: finite,
});

/** One test of a restriction. */
export const restrictionTest = z.strictObject({
  restriction: z.enum(["homogeneity", "symmetry given homogeneity", "quadratic terms zero"]),
  statistic: finite,
  degreesOfFreedom: count,
  pValue: finite,
  /** Italianer's (1985) small-sample corrected likelihood ratio. */
  corrected: z.strictObject({ statistic: finite, pValue: finite }),
  /** Set where the cell asks for other standard errors: these ratios hold under conventional ones, and decide nothing. */
  assumes: z.literal("conventional errors").optional(),
  /** Laitinen's (1978) exact test: homogeneity of an otherwise unrestricted linear system. */
  exact: z
    .strictObject({
      tSquared: finite,
      f: finite,
      numerator: count,
      denominator: count,
      pValue: finite,
      approximate: z.boolean(),
    })
    .optional(),
});
export type RestrictionTest = z.infer<typeof restrictionTest>;

/** A restriction that could not be tested, and why: a fit refused, or too few rows. */
export const untestedRestriction = z.strictObject({
  restriction: restrictionTest.shape.restriction,
  reason: z.string(),
});
export type UntestedRestriction = z.infer<typeof untestedRestriction>;

/** Everything needed to evaluate the fitted system anywhere: what a referee's browser recomputes from. */
export const fittedSystem = z.strictObject({
  form: z.enum(SYSTEM_NAMES),
  index: z.enum(PRICE_INDEX_NAMES).optional(),
  /** Of systems in differences, which predict no shares: weighted means of the observed ones, n. */
  meanShares: vector.optional(),
  /** Weighted means of the shares, and of the prices in units of estimation: what the index of la-aids is evaluated with. */
  indexMeans: z.strictObject({ shares: vector, prices: vector }).optional(),
  /** Of easi: what its layout follows from. */
  easi: z.strictObject({ degree: count, interactions: z.array(z.enum(INTERACTION_NAMES)) }).optional(),
  goods: z.array(goodName),
  demographics: z.array(columnName),
  alpha0: finite,
  imposed: z.array(z.enum(RESTRICTION_NAMES)),
  /** θ for all n goods in the order of the system's layout. */
  theta: vector,
  /** Covariance of θ, k × k, singular by the restrictions. */
  covariance: matrix,
});
export type FittedSystem = z.infer<typeof fittedSystem>;

export const namedPoint = z.strictObject({ prices: vector, total: finite, demographics: vector });

export const systemFinding = z.strictObject({
  kind: z.literal("system"),
  dataFingerprint: fingerprint,
  fitted: fittedSystem,
  coefficients: z.array(coefficient),
  estimator: z.enum(ESTIMATOR_NAMES),
  /** What `fitted.covariance` and every standard error rest on. */
  standardErrors: z.enum(STANDARD_ERROR_KINDS),
  /** Where rows were grouped by a column, for clustered standard errors or a bootstrap of clusters. */
  clusters: clustersFinding.optional(),
  bootstrap: bootstrapFinding.optional(),
  /** Kish's effective sample size (Σh)²/Σh² of the rows used, where they are weighted. */
  effectiveRows: finite.optional(),
  dropped: goodName,
  /** T: rows of the equations, fewer than the rows used where the first period has none before it. */
  rows: count,
  /** Absent where the equations explain the shares of every row used. */
  equations: equationsExplained.optional(),
  /** Of the linear expenditure system. */
  expenditure: expenditureReport.optional(),
  weighted: z.boolean(),
  /** Where prices are not normalised: by what the estimates depend on the units they were uploaded in, if they do. */
  unitsMatterBy: z
    .enum(["a fixed α₀", "Stone's index", "the lagged Stone index", "real expenditure at unit prices"])
    .optional(),
  freeCoefficients: count,
  /** Of easi: what y stands for in the equations, and what the estimator's name means then. */
  implicit: z.strictObject({ realExpenditure: z.enum(["exact", "approximate"]), method: z.string() }).optional(),
  /** At the estimates; the largest there is only by maximum likelihood or what equals it. */
  logLikelihood: finite,
  /** Absent where the likelihood is not at its maximum and another estimator was asked for. */
  aic: finite.optional(),
  bic: finite.optional(),
  convergence: z.strictObject({ iterations: count, gradient: finite, largestStep: finite, condition: finite }),
  /** By good, all n. */
  rSquared: vector,
  /** McElroy (1977). */
  systemRSquared: finite,
  /** By good, only when the data name a time column. */
  durbinWatson: vector.optional(),
  /** Residual covariance of all n goods, divided by T; singular. */
  residualCovariance: matrix,
  tests: z.array(restrictionTest),
  /** Where the specification names instruments of total expenditure. */
  endogeneity: endogeneity.optional(),
  /** Where goods not bought take two steps. */
  zeros: zerosFinding.optional(),
  /** Where negativity is imposed at a point. */
  curvature: curvatureFinding.optional(),
  /** The group whose expenditure the total is: elasticities and matrices are conditional on it. */
  conditionalOn: goodName.optional(),
  /** Absent where every restriction that the form leaves open was tested. */
  untested: z.array(untestedRestriction).optional(),
  /** In units of estimation (normalised when the data are). */
  points: z.strictObject({ base: namedPoint, mean: namedPoint }),
  /** η_i at the point of the checks below with its standard error, for the sentence at the head. */
  expenditureElasticities: z.array(z.strictObject({ good: goodName, estimate: finite, standardError: finite })),
  /** Predicted shares against ln x at mean prices, none in a system in differences, for the small curves in the head: 25 points over the 1st to 99th percentile. */
  engel: z.strictObject({ logTotal: vector, shares: matrix }),
  /** Checks at the base point (at the mean where prices are not normalised) and over all rows: the system's verdict strip. */
  checks: theoryChecks,
});
export type SystemFinding = z.infer<typeof systemFinding>;
