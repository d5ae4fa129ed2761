import type { SystemFinding } from "../schemas/system.ts";
import { DECIMALS, printCount, printFixed } from "./numbers.ts";
import { withArticle } from "./slutsky-matrix.ts";

/** What imposing negativity at a point did to the estimates, for the sentence at the head. */
export function curvatureSentences({ curvature }: Pick<SystemFinding, "curvature">) {
  if (curvature === undefined) return [];
  const at = withArticle(curvature.pointName);
  if (!curvature.binds) return [`Negativity imposed at ${at} changes nothing: the estimates satisfy it there.`];
  // Estimators that do not maximise the likelihood need not lose any.
  const loss = printFixed(curvature.loss, DECIMALS.fit);
  return [`Negativity is imposed at ${at}${curvature.loss > 0 ? `, which lowers the log-likelihood by ${loss}` : ""}.`];
}

/** "row 76, rank 5 of the 6 asked for": where and of which rank, for the facts of the fit. */
export function curvatureFact({ pointName, asked, rank, binds }: NonNullable<SystemFinding["curvature"]>): string {
  if (!binds) return `${pointName}, not binding`;
  return rank === asked
    ? `${pointName}, rank ${printCount(rank)}`
    : `${pointName}, rank ${printCount(rank)} of the ${printCount(asked)} asked for`;
}

/** What the standard errors take as given where negativity binds. */
export function curvatureNotes({ curvature }: Pick<SystemFinding, "curvature">): string[] {
  if (!curvature?.binds) return [];
  const bound =
    curvature.rank < curvature.asked
      ? ` A further column would not raise the fit: the estimate lies at the bound.`
      : "";
  return [
    `Standard errors hold for a matrix of rank ${printCount(curvature.rank)} at ${withArticle(curvature.pointName)}.${bound}`,
  ];
}
