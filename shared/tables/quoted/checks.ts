import type { TheoryChecks } from "../../schemas/checks.ts";
import { printCount, printPercent } from "../numbers.ts";
import { withArticle } from "../slutsky-matrix.ts";
import { type Asked, estimateInWords, NothingToQuote, type QuotedAnswer } from "./answer.ts";

const UNSTATED = "Without homogeneity, negativity cannot be stated.";

/** The largest eigenvalue at the point of the checks, with its standard error. */
export function largestEigenvalue({ negativity, pointName }: TheoryChecks, { part }: Asked): QuotedAnswer {
  const { largest, standardError } = negativity;
  if (!negativity.stated || largest === undefined) throw new NothingToQuote(UNSTATED);
  return {
    printed: estimateInWords({ estimate: largest, error: standardError }, "entry", part),
    says: `largest eigenvalue of the Slutsky matrix at ${withArticle(pointName)}`,
  };
}

function overRows({ sample, negativity }: TheoryChecks) {
  if (!negativity.stated) throw new NothingToQuote(UNSTATED);
  if (sample?.negativity === undefined) throw new NothingToQuote("Negativity was not checked over the rows.");
  return { rows: sample.rows, ...sample.negativity };
}

/** The weighted share of rows in which negativity holds. */
export function rowsThatHold(checks: TheoryChecks): QuotedAnswer {
  const { rows, breaks, weightedShareThatHolds } = overRows(checks);
  const without = checks.sample?.undefined?.rows ?? 0;
  const isWeighted = Math.abs(weightedShareThatHolds - (rows - breaks - without) / rows) > 1e-9;
  const says = `share of rows in which negativity holds${isWeighted ? ", weighted" : ""}`;
  return { printed: printPercent(weightedShareThatHolds), says };
}

export function rowsThatBreak(checks: TheoryChecks): QuotedAnswer {
  const { rows, breaks } = overRows(checks);
  return { printed: printCount(breaks), says: `rows of ${printCount(rows)} in which negativity breaks` };
}
