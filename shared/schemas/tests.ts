import { z } from "zod";
import { RESTRICTION_NAMES } from "../systems/names.ts";
import { cellName, columnName, count, fingerprint, finite, goodName } from "./primitives.ts";
import { standardErrorsSpecification } from "./system.ts";

/** What can be tested, in the order of every table. All but the last need a system. */
export const HYPOTHESIS_NAMES = [
  "homogeneity",
  "symmetry",
  "homogeneity and symmetry",
  "demographics",
  "quadratic terms",
  "exogeneity",
  "revealed preference",
] as const;
export type HypothesisName = (typeof HYPOTHESIS_NAMES)[number];

export const testsSpecification = z
  .strictObject({
    kind: z.literal("tests"),
    /** The system whose restrictions are tested; or a data cell, for what needs no model. */
    system: cellName.optional(),
    data: cellName.optional(),
    /** Everything a system admits, or revealed preference of data, unless said otherwise. */
    of: z.array(z.enum(HYPOTHESIS_NAMES)).min(1).optional(),
    /** The probability below which a test rejects. */
    level: z.number().min(0.0001).max(0.5).default(0.05),
  })
  .superRefine(({ system, data, of }, context) => {
    if (system === undefined && data === undefined) {
      context.addIssue({
        code: "custom",
        path: ["system"],
        message: "a tests cell needs system, or data for revealed preference",
      });
    }
    if (system !== undefined && data !== undefined) {
      context.addIssue({
        code: "custom",
        path: ["data"],
        message: "data and system are both named: a tests cell reads one of them",
      });
    }
    of?.forEach((hypothesis, place) => {
      if (system !== undefined || hypothesis === "revealed preference") return;
      const message = `${hypothesis} is a hypothesis about a system; of data only revealed preference can be tested`;
      context.addIssue({ code: "custom", path: ["of", place], message });
    });
  });
export type TestsSpecification = z.infer<typeof testsSpecification>;

/** A statistic against χ²; or why there is none. */
export const chiSquareStatistic = z.union([
  z.strictObject({ statistic: finite, pValue: finite }),
  z.strictObject({ absent: z.string() }),
]);
export type ChiSquareStatistic = z.infer<typeof chiSquareStatistic>;

const named = {
  hypothesis: z.enum(HYPOTHESIS_NAMES),
  /** The demographic tested alone; absent where all are tested together. */
  column: columnName.optional(),
};

export const madeTest = z.strictObject({
  ...named,
  /** Restrictions that hold under both hypotheses, by imposing or by the form. */
  given: z.array(z.enum(RESTRICTION_NAMES)),
  degreesOfFreedom: count,
  /** From the unrestricted fit, with the covariance of the finding's `covariance`. */
  wald: chiSquareStatistic,
  /** 2(lnL_u − lnL_r). */
  likelihoodRatio: chiSquareStatistic,
  /** Score, or Lagrange multiplier, from the restricted fit. */
  score: chiSquareStatistic,
  /** Italianer's (1985) likelihood ratio corrected for small samples. */
  corrected: chiSquareStatistic,
  /** Laitinen's (1978) T² and F, for one linear restriction in each equation; or why there is none. */
  laitinen: z
    .union([
      z.strictObject({
        tSquared: finite,
        f: finite,
        numerator: count,
        denominator: count,
        pValue: finite,
        approximate: z.boolean(),
        /** What makes it exact, or approximate. */
        because: z.string(),
      }),
      z.strictObject({ absent: z.string() }),
    ])
    .optional(),
  /** Homogeneity in each equation: Σ_j γ_ij with its t. */
  equations: z
    .array(
      z.strictObject({
        good: goodName,
        sum: finite,
        standardError: finite,
        t: finite,
        /** T − k where t is exact for equations linear in their coefficients; absent: the normal distribution. */
        freedom: count.optional(),
        pValue: finite,
      }),
    )
    .optional(),
});
export type MadeTest = z.infer<typeof madeTest>;

/** A hypothesis without a test: true by the form, nothing there to test, or fits that could not be made. */
export const unmadeTest = z.strictObject({
  ...named,
  because: z.enum(["by form", "nothing to test", "could not be made"]),
  reason: z.string(),
});
export type UnmadeTest = z.infer<typeof unmadeTest>;

/** GARP and Afriat's critical cost efficiency index (Varian 1982). */
export const revealedPreferenceFinding = z.strictObject({
  rows: count,
  /** Ordered pairs of rows that violate, those of them that need no third row, and the rows in some pair. */
  pairs: count,
  directPairs: count,
  rowsInvolved: count,
  index: finite,
  /** Rows of the upload, each revealed preferred to the next and the last strictly to the first. */
  cycle: z.array(count),
  /** Whether rows are the periods of a time column; otherwise they are read as one consumer's choices all the same. */
  periods: z.boolean(),
  weighted: z.boolean(),
});
export type RevealedPreferenceFinding = z.infer<typeof revealedPreferenceFinding>;

export const testsFinding = z.strictObject({
  kind: z.literal("tests"),
  dataFingerprint: fingerprint,
  level: finite,
  rows: count,
  /** Of the Wald tests; absent where no system is tested. */
  covariance: standardErrorsSpecification.optional(),
  weighted: z.boolean(),
  /** In the order of `HYPOTHESIS_NAMES`. */
  tests: z.array(z.union([madeTest, unmadeTest])),
  revealed: z.union([revealedPreferenceFinding, z.strictObject({ absent: z.string() })]).optional(),
});
export type TestsFinding = z.infer<typeof testsFinding>;
