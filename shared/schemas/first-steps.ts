import { z } from "zod";
import { columnName, count, finite, goodName } from "./primitives.ts";

/** A coefficient of a regression that is no share equation. */
const named = z.strictObject({ name: z.string(), estimate: finite, standardError: finite });
const byGood = z.strictObject({ good: goodName, estimate: finite, standardError: finite });
const chiSquare = z.strictObject({ statistic: finite, pValue: finite });

/** Total expenditure taken to be endogenous: its first stage, and what the residual does in the share equations. */
export const endogeneity = z.strictObject({
  instruments: z.array(columnName),
  /** ln x on a constant, demographics, log prices and the instruments, which come last. */
  firstStage: z.strictObject({
    coefficients: z.array(named),
    /** F of the instruments: all their coefficients are zero. */
    f: z.strictObject({ statistic: finite, numerator: count, denominator: count, pValue: finite }),
    /** Of the instruments, given the other regressors. */
    partialRSquared: finite,
    rows: count,
  }),
  /** ρ_i of the residual in every share equation; they sum to zero. */
  residual: z.array(byGood),
  /** ρ = 0 on n − 1 degrees of freedom; a test is absent where the data allow none. */
  exogeneity: z.strictObject({
    degreesOfFreedom: count,
    wald: chiSquare.optional(),
    likelihoodRatio: chiSquare.optional(),
  }),
  /** Whether the standard errors take the residual as if it were data. */
  firstStageIgnored: z.boolean(),
});
export type Endogeneity = z.infer<typeof endogeneity>;

/** Goods not bought, by two steps (Shonkwiler & Yen 1999, American Journal of Agricultural Economics 81). */
export const zerosFinding = z.strictObject({
  goods: z.array(
    z.strictObject({
      good: goodName,
      /** Weighted share of the rows that buy none, and how many rows. */
      boughtNone: finite,
      rowsWithout: count,
      /** Absent where every row buys it: then there is no first step. */
      probit: z.strictObject({ coefficients: z.array(named), logLikelihood: finite, iterations: count }).optional(),
    }),
  ),
  /** δ_i of the density in the equation of each good with zeros. */
  corrections: z.array(byGood),
  /** Σ_i (Φ̂_i f_i + δ_i φ̂_i) over the rows used: nothing makes it one. */
  predictedSum: z.strictObject({ lowest: finite, highest: finite, mean: finite }),
  /** Whether the standard errors take the probits as if they were data. */
  firstStepIgnored: z.boolean(),
});
export type ZerosFinding = z.infer<typeof zerosFinding>;

interface Asked {
  readonly form: string;
  readonly errors?: string;
  readonly differences?: boolean;
  readonly "real expenditure"?: string;
  readonly instruments?: readonly string[];
  readonly zeros?: unknown;
}

/** Keys of the first steps that do not fit the form, or one another. */
export function firstStepIssues(asked: Asked): { path: string[]; message: string }[] {
  const { instruments, zeros } = asked;
  const issues: { path: string[]; message: string }[] = [];
  if (instruments !== undefined) {
    const why = whyNot(asked);
    if (why !== undefined) issues.push({ path: ["instruments"], message: `instruments ${why}` });
    if (zeros !== undefined) {
      const message =
        "instruments and zeros do not go together: the probits would take the endogenous expenditure as given";
      issues.push({ path: ["instruments"], message });
    }
  }
  if (zeros !== undefined) {
    const why = whyNot(asked);
    if (why !== undefined) issues.push({ path: ["zeros"], message: `zeros ${why}` });
  }
  return issues;
}

/** What both steps need of a form: share equations in levels that are linear in what is added to them. */
function whyNot({ form, errors, differences, "real expenditure": real }: Asked): string | undefined {
  if (form === "rotterdam")
    return "belongs to systems in levels: rotterdam explains changes, and its total is the volume";
  if (differences) return "belongs to systems in levels: leave differences out";
  if (errors === "expenditures") return "belongs to equations of shares: leave errors: expenditures out";
  if (form === "easi" && real !== "approximate") {
    return "needs real expenditure: approximate, since exact real expenditure moves with the coefficients and the shares";
  }
  return undefined;
}
