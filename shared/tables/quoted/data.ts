import type { DataFinding } from "../../schemas/data.ts";
import type { QuotableWord } from "../../schemas/quotable.ts";
import { printCount, printPercent, printQuantity } from "../numbers.ts";
import { type Asked, NothingToQuote, placeAmong, type QuotedAnswer } from "./answer.ts";

type Quote = (finding: DataFinding, asked: Asked) => QuotedAnswer;

function goodOf({ goods }: DataFinding, { words }: Asked) {
  return goods[
    placeAmong(
      words[0],
      goods.map(({ name }) => name),
      "good",
    )
  ];
}

const weighted = (finding: DataFinding) => (finding.weighted ? ", weighted" : "");

/** Numbers of a data cell. */
export const DATA_QUOTES: { readonly [W in QuotableWord<"data">]: Quote } = {
  "rows used": ({ accounting }) => ({ printed: printCount(accounting.used), says: "rows used" }),
  "rows uploaded": ({ accounting }) => ({ printed: printCount(accounting.uploaded), says: "rows of the upload" }),
  "rows left out": ({ accounting: { uploaded, used } }) => ({
    printed: printCount(uploaded - used),
    says: "rows left out",
  }),
  goods: ({ goods }) => ({ printed: printCount(goods.length), says: "number of goods" }),
  clusters: ({ clusters }) => {
    if (clusters === undefined) throw new NothingToQuote("Its rows have no clusters.");
    return { printed: printCount(clusters), says: "number of clusters" };
  },
  "mean expenditure": (finding) => ({
    printed: printQuantity(finding.meanTotal, "money"),
    says: `mean total expenditure, in the units uploaded${weighted(finding)}`,
  }),
  "mean share": (finding, asked) => {
    const { name, meanShare } = goodOf(finding, asked);
    return { printed: printQuantity(meanShare, "share"), says: `mean budget share of ${name}${weighted(finding)}` };
  },
  "mean price": (finding, asked) => {
    const { name, meanPrice } = goodOf(finding, asked);
    const says = `mean price of ${name}, in the units uploaded${weighted(finding)}`;
    return { printed: printQuantity(meanPrice, "money"), says };
  },
  "bought none": (finding, asked) => {
    const { name, boughtNone } = goodOf(finding, asked);
    return { printed: printPercent(boughtNone), says: `share of rows that buy no ${name}${weighted(finding)}` };
  },
};
