import type { QuotableWord } from "../../schemas/quotable.ts";
import type { SlutskyFinding } from "../../schemas/slutsky.ts";
import { conditionally } from "../conditional.ts";
import { digitsForAll, printCount, printFixed, printQuantity } from "../numbers.ts";
import { withArticle } from "../slutsky-matrix.ts";
import { type Asked, estimateInWords, NothingToQuote, placeAmong, type QuotedAnswer } from "./answer.ts";
import { largestEigenvalue, rowsThatBreak, rowsThatHold } from "./checks.ts";

type Quote = (finding: SlutskyFinding, asked: Asked) => QuotedAnswer;

function pair({ fitted: { goods } }: SlutskyFinding, { words }: Asked) {
  return { i: placeAmong(words[0], goods, "good"), j: placeAmong(words[1], goods, "good") };
}

/** In share form to four decimals; in quantity form, which has the units uploaded, by the size of the whole matrix. */
const entry: Quote = (finding, asked) => {
  const { at, form, fitted, pointName, conditionalOn } = finding;
  const { i, j } = pair(finding, asked);
  const says = `entry of the Slutsky matrix, ${form} form, ${fitted.goods[i]} and the price of ${fitted.goods[j]}, at ${withArticle(pointName)}${conditionally({ conditionalOn })}`;
  if (form === "share") {
    const one = { estimate: at.share[i][j], error: at.shareErrors[i][j] };
    return { printed: estimateInWords(one, "entry", asked.part), says };
  }
  const { decimals } = digitsForAll(at.quantity.flat());
  // A power of ten in a table's head has no place in prose: as many more decimals say the same.
  const { exponent } = digitsForAll(at.quantity.flat());
  const printed = (value: number) => printFixed(value, decimals - exponent);
  const [estimate, error] = [printed(at.quantity[i][j]), printed(at.quantityErrors[i][j])];
  if (asked.part === "error") return { printed: error, says };
  return { printed: asked.part === "alone" ? estimate : `${estimate} (${error})`, says };
};

const eigenvalue: Quote = ({ at: { eigenvalues }, pointName, conditionalOn }, { words, part }) => {
  const rank = Number(words[0]);
  if (eigenvalues.length === 0) throw new NothingToQuote("Without homogeneity, no eigenvalue is stated.");
  const found = eigenvalues[rank - 1];
  if (found === undefined) throw new NothingToQuote(`It has ${printCount(eigenvalues.length)} eigenvalues.`);
  return {
    printed: estimateInWords({ estimate: found.value, error: found.standardError }, "entry", part),
    says: `eigenvalue ${rank} of the Slutsky matrix at ${withArticle(pointName)}${conditionally({ conditionalOn })}`,
  };
};

/** Numbers of a Slutsky cell. */
export const SLUTSKY_QUOTES: { readonly [W in QuotableWord<"slutsky">]: Quote } = {
  entry,
  compensated: (finding, asked) => {
    const { i, j } = pair(finding, asked);
    const { at, fitted, pointName, conditionalOn } = finding;
    const one = { estimate: at.compensated[i][j], error: at.compensatedErrors[i][j] };
    const says = `compensated elasticity of ${fitted.goods[i]} with respect to the price of ${fitted.goods[j]} at ${withArticle(pointName)}${conditionally({ conditionalOn })}`;
    return { printed: estimateInWords(one, "elasticity", asked.part), says };
  },
  eigenvalue,
  "largest eigenvalue": ({ at }, asked) => largestEigenvalue(at.checks, asked),
  "rows that hold": ({ at }) => rowsThatHold(at.checks),
  "rows that break": ({ at }) => rowsThatBreak(at.checks),
  share: ({ at, fitted, pointName, conditionalOn }, { words }) => {
    const i = placeAmong(words[0], fitted.goods, "good");
    const says = `predicted budget share of ${fitted.goods[i]} at ${withArticle(pointName)}${conditionally({ conditionalOn })}`;
    return { printed: printQuantity(at.shares[i], "share"), says };
  },
  rows: ({ at }) => {
    if (at.checks.sample === undefined) throw new NothingToQuote("The laws were not checked over the rows.");
    return { printed: printCount(at.checks.sample.rows), says: "rows over which the laws were checked" };
  },
};
