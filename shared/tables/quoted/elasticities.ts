import type { ElasticitiesFinding, ElasticityGroup } from "../../schemas/elasticities.ts";
import type { QuotableWord } from "../../schemas/quotable.ts";
import { conditionally, titled, unconditionalOf } from "../conditional.ts";
import { byGood, entryOf, type OneEstimate } from "../elasticities.ts";
import { whereOf } from "../elasticity-words.ts";
import { printCount, printQuantity } from "../numbers.ts";
import { type Asked, estimateInWords, NothingToQuote, placeAmong, type QuotedAnswer } from "./answer.ts";

type Quote = (finding: ElasticitiesFinding, asked: Asked) => QuotedAnswer;

/** The one group there is, or the one whose name stands after the goods. */
function groupOf({ groups, without }: ElasticitiesFinding, { words }: Asked, goods: number): ElasticityGroup {
  const name = words[goods];
  if (groups.length === 1 && name === undefined) return groups[0];
  const refused = without.find((one) => name !== undefined && one.name.toLowerCase() === name.toLowerCase());
  if (refused) throw new NothingToQuote(`${refused.name}: ${refused.undefined}`);
  return groups[
    placeAmong(
      name,
      groups.map((group) => group.name),
      "group",
    )
  ];
}

interface Found extends OneEstimate {
  readonly says: string;
}

/** "expenditure", "unconditional expenditure". */
const named = (finding: ElasticitiesFinding, which: string) => titled(finding, which).toLowerCase();

function expenditure(finding: ElasticitiesFinding, asked: Asked): Found {
  const group = groupOf(finding, asked, 1);
  const i = placeAmong(asked.words[0], finding.goods, "good");
  const says = `${named(finding, "expenditure")} elasticity of ${finding.goods[i]} ${whereOf(finding, group.name)}${conditionally(finding)}`;
  return { ...byGood(group, "expenditure", i), says };
}

function ofPrice(which: "uncompensated" | "compensated") {
  return (finding: ElasticitiesFinding, asked: Asked): Found => {
    const group = groupOf(finding, asked, 2);
    const i = placeAmong(asked.words[0], finding.goods, "good");
    const j = placeAmong(asked.words[1], finding.goods, "good");
    const says = `${named(finding, which)} elasticity of ${finding.goods[i]} with respect to the price of ${finding.goods[j]} ${whereOf(finding, group.name)}${conditionally(finding)}`;
    return { ...entryOf(group[which], i, j), says };
  };
}

function estimate(find: (finding: ElasticitiesFinding, asked: Asked) => Found): Quote {
  return (finding, asked) => {
    const { value, error, says } = find(finding, asked);
    return { printed: estimateInWords({ estimate: value, error }, "elasticity", asked.part), says };
  };
}

function interval(find: (finding: ElasticitiesFinding, asked: Asked) => Found): Quote {
  return (finding, asked) => {
    const { low, high, says } = find(finding, asked);
    const level = `${Number((100 * finding.level).toFixed(1))} per cent interval of the ${says}`;
    return { printed: `${printQuantity(low, "elasticity")} to ${printQuantity(high, "elasticity")}`, says: level };
  };
}

/** The same of the whole budget. */
function unconditional(find: (finding: ElasticitiesFinding, asked: Asked) => Found) {
  return (finding: ElasticitiesFinding, asked: Asked): Found => {
    const whole = unconditionalOf(finding);
    if (whole === undefined) {
      throw new NothingToQuote("It names no broader system, and so has no unconditional elasticities.");
    }
    return find(whole, asked);
  };
}

/** Numbers of an elasticities cell. */
export const ELASTICITIES_QUOTES: { readonly [W in QuotableWord<"elasticities">]: Quote } = {
  eta: estimate(expenditure),
  uncompensated: estimate(ofPrice("uncompensated")),
  compensated: estimate(ofPrice("compensated")),
  "eta interval": interval(expenditure),
  "uncompensated interval": interval(ofPrice("uncompensated")),
  "compensated interval": interval(ofPrice("compensated")),
  "unconditional eta": estimate(unconditional(expenditure)),
  "unconditional uncompensated": estimate(unconditional(ofPrice("uncompensated"))),
  "unconditional compensated": estimate(unconditional(ofPrice("compensated"))),
  "unconditional eta interval": interval(unconditional(expenditure)),
  share: (finding, asked) => {
    const group = groupOf(finding, asked, 1);
    const i = placeAmong(asked.words[0], finding.goods, "good");
    const says = `${finding.shares} budget share of ${finding.goods[i]} ${whereOf(finding, group.name)}${conditionally(finding)}`;
    return { printed: printQuantity(group.shares[i], "share"), says };
  },
  rows: (finding, asked) => {
    const { rows, name } = groupOf(finding, asked, 0);
    if (rows === undefined) throw new NothingToQuote("It is evaluated at a point, which has no rows.");
    return { printed: printCount(rows), says: `rows of ${name}` };
  },
};
