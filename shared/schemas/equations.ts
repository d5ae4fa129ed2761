import { z } from "zod";
import { count, finite, goodName } from "./primitives.ts";

/** What the equations explain and over which rows, where it is not the shares of every row used. */
export const equationsExplained = z.strictObject({
  explains: z.enum(["shares", "expenditures", "changes of shares", "contributions to volume"]),
  /** Rows used that give no equation, there being no period before them: the first, or the first two. */
  leftOut: count,
  /** The lagged Stone index, changes from period to period, or both: why rows are left out. */
  because: z.array(z.enum(["lagged shares", "differences"])),
  /** Rows of the equations whose period before them is further back in time than the nearest two periods are apart. */
  gaps: count,
});
export type EquationsExplained = z.infer<typeof equationsExplained>;

/** What a fitted linear expenditure system says of itself beside its coefficients. */
export const expenditureReport = z.strictObject({
  /** Rows where x ≤ Σ p_j c_j(z), so that utility is not defined. */
  withoutSupernumerary: z.strictObject({
    rows: count,
    /** Of all rows used. */
    weightedShare: finite,
    /** By their numbers in the upload, at most ten. Never part of a referee copy. */
    firstRows: z.array(count).max(10),
  }),
  /** Goods whose marginal budget share is not between 0 and 1. */
  atBound: z.array(z.strictObject({ good: goodName, estimate: finite })),
  /** Frisch's parameter −x/(x − Σ p_j c_j(z)) at the point of the checks; absent where nothing is supernumerary. */
  frisch: z.strictObject({ estimate: finite, standardError: finite }).optional(),
});
export type ExpenditureReport = z.infer<typeof expenditureReport>;

interface Asked {
  readonly form: string;
  readonly errors?: string;
  readonly differences?: boolean;
  readonly season?: { readonly period: number; readonly harmonics?: number };
}

const NOT_IN_DIFFERENCES: Readonly<Record<string, string>> = {
  rotterdam: "rotterdam explains changes already: leave differences out",
  les: "differences belongs to la-aids: the equations of les have no intercepts that differences would take away",
};

/** Keys of the sample that do not fit the form, or one another. */
export function sampleIssues({ form, errors, differences, season }: Asked): { path: string[]; message: string }[] {
  const issues: { path: string[]; message: string }[] = [];
  if (errors !== undefined && form !== "les") {
    issues.push({ path: ["errors"], message: `errors belongs to les; those of ${form} stand on one thing only` });
  }
  if (differences && form !== "la-aids") {
    const why = `differences belongs to la-aids: the price index of ${form} holds coefficients, so its changes are not linear in them`;
    issues.push({ path: ["differences"], message: NOT_IN_DIFFERENCES[form] ?? why });
  }
  if (season?.harmonics !== undefined && 2 * season.harmonics > season.period) {
    const most = Math.floor(season.period / 2);
    const message = `harmonics is ${season.harmonics}; a season of ${season.period} periods has at most ${most}`;
    issues.push({ path: ["season", "harmonics"], message });
  }
  return issues;
}
