import { z } from "zod";
import { PRICE_INDEX_NAMES, RESTRICTION_NAMES, SYSTEM_NAMES } from "../systems/names.ts";
import { theoryChecks } from "./checks.ts";
import { cellName, columnName, count, fingerprint, finite, goodName, matrix, vector } from "./primitives.ts";

export const ESTIMATOR_NAMES = [
  "least squares",
  "seemingly unrelated",
  "iterated seemingly unrelated",
  "maximum likelihood",
] as const;

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
    "standard errors": z.literal("conventional").default("conventional"),
  })
  .superRefine((system, context) => {
    if (system.index !== undefined && system.form !== "la-aids") {
      context.addIssue({
        code: "custom",
        path: ["index"],
        message: `index belongs to la-aids; ${system.form} has none to choose`,
      });
    }
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
  restriction: z.enum(["homogeneity", "symmetry given homogeneity"]),
  statistic: finite,
  degreesOfFreedom: count,
  pValue: finite,
  /** Italianer's (1985) small-sample corrected likelihood ratio. */
  corrected: z.strictObject({ statistic: finite, pValue: finite }),
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

/** Everything needed to evaluate the fitted system anywhere: what a referee's browser recomputes from. */
export const fittedSystem = z.strictObject({
  form: z.enum(SYSTEM_NAMES),
  index: z.enum(PRICE_INDEX_NAMES).optional(),
  /** Weighted means of the shares, and of the prices in units of estimation: what the index of la-aids is evaluated with. */
  indexMeans: z.strictObject({ shares: vector, prices: vector }).optional(),
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
  standardErrors: z.literal("conventional"),
  dropped: goodName,
  rows: count,
  weighted: z.boolean(),
  /** Where prices are not normalised: by what the estimates depend on the units they were uploaded in, if they do. */
  unitsMatterBy: z.enum(["a fixed α₀", "Stone's index"]).optional(),
  freeCoefficients: count,
  logLikelihood: finite,
  aic: finite,
  bic: finite,
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
  /** In units of estimation (normalised when the data are). */
  points: z.strictObject({ base: namedPoint, mean: namedPoint }),
  /** η_i at the point of the checks below with its standard error, for the sentence at the head. */
  expenditureElasticities: z.array(z.strictObject({ good: goodName, estimate: finite, standardError: finite })),
  /** Predicted shares against ln x at mean prices, for the small curves in the head: 25 points over the 1st to 99th percentile. */
  engel: z.strictObject({ logTotal: vector, shares: matrix }),
  /** Checks at the base point (at the mean where prices are not normalised) and over all rows: the system's verdict strip. */
  checks: theoryChecks,
});
export type SystemFinding = z.infer<typeof systemFinding>;
