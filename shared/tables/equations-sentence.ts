import type { SystemFinding } from "../schemas/system.ts";
import { printCount, printFixed } from "./numbers.ts";
import { countedRows, listed } from "./phrases.ts";

type Told = Pick<SystemFinding, "rows" | "equations" | "expenditure">;

/** Where the linear expenditure system is not regular: for the head of a finding. */
export function equationsSentences({ rows, expenditure }: Omit<Told, "equations">): string[] {
  return expenditure ? regularity(rows, expenditure) : [];
}

/** What the equations explain and from how many periods: for its note. Nothing where they explain every row's shares. */
export function equationsNotes({ rows, equations }: Omit<Told, "expenditure">): string[] {
  return equations ? explained(rows, equations) : [];
}

function explained(rows: number, { explains, leftOut, because, gaps }: NonNullable<Told["equations"]>): string[] {
  const sentences: string[] = [];
  if (explains === "expenditures") {
    sentences.push(
      "Errors stand on expenditures: the log-likelihood is one of expenditures and is not comparable with one of shares.",
    );
  }
  if (explains === "changes of shares" || explains === "contributions to volume") {
    const what = explains === "changes of shares" ? "changes of shares" : "each good's part in the change of volume";
    sentences.push(
      `The equations explain ${what} from one period to the next, so their log-likelihood is not comparable with one of shares.`,
    );
  }
  if (explains === "contributions to volume") {
    sentences.push("No level of shares is predicted: elasticities stand at observed shares.");
  }
  if (leftOut > 0) {
    const [first, second] = because;
    const one = first === "lagged shares" ? "no shares before it" : "no change from a period before it";
    const reason =
      second === undefined
        ? `the first period has ${one}`
        : `the first ${leftOut} periods in turn have no shares, or no change of shares, before them`;
    sentences.push(`T is ${printCount(rows)} of ${countedRows(rows + leftOut)} used: ${reason}.`);
  }
  if (gaps > 0) {
    sentences.push(
      `In ${printCount(gaps)} of ${countedRows(rows)} the period before is the last one in the data, further back than the others are.`,
    );
  }
  return sentences;
}

function regularity(
  rows: number,
  { withoutSupernumerary, atBound, frisch }: NonNullable<Told["expenditure"]>,
): string[] {
  const sentences: string[] = [];
  if (withoutSupernumerary.rows > 0) {
    const { rows: without, weightedShare, firstRows } = withoutSupernumerary;
    const which = firstRows.length > 0 ? `, first in row ${firstRows[0]}` : "";
    sentences.push(
      `In ${printCount(without)} of ${countedRows(rows)} (${printFixed(100 * weightedShare, 1)} % by weight) committed expenditure takes all of the total${which}: utility is not defined there.`,
    );
  }
  if (atBound.length > 0) {
    const goods = atBound.map(({ good, estimate }) => `${good} (${printFixed(estimate, 4)})`);
    const verb = atBound.length === 1 ? "is at or beyond its bound" : "are at or beyond their bounds";
    sentences.push(`The marginal budget share of ${listed(goods)} ${verb} of 0 and 1.`);
  }
  if (frisch === undefined) sentences.push("At the point of the checks nothing is left beyond committed expenditure.");
  return sentences;
}
