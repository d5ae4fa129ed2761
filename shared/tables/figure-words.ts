import { type GroupsSpecification, TOTAL_EXPENDITURE } from "../schemas/elasticities.ts";
import type { Drawn, DrawnOf, FigureFinding, FigureName, FindingOfFigure } from "../schemas/figure.ts";
import { caveatSentences } from "./caveat-words.ts";
import { digitsForAll, printCount, printFixed, printPercent, printQuantity } from "./numbers.ts";
import { capital, countedRows, listed, undefinedSentence } from "./phrases.ts";
import { WELFARE_CAUTION } from "./price-change-words.ts";
import { withArticle } from "./slutsky-matrix.ts";

/** What a figure is called where it stands alone. */
export const FIGURE_TITLES: Readonly<Record<FigureName, string>> = {
  "engel curves": "Predicted shares against total expenditure",
  "demand curve": "Quantity bought against its own price",
  elasticities: "Elasticities with intervals",
  "fit of shares": "Observed shares against predicted ones",
  "largest eigenvalue": "Largest eigenvalue against total expenditure",
  incidence: "Loss as a part of expenditure",
  "shares by group": "Observed budget shares",
  "price distribution": "How the prices paid are spread",
};

/** The words of each figure: its finding in a sentence. */
type Sentences = { readonly [S in FigureName]: (finding: FindingOfFigure<S>) => string[] };

const SENTENCES: Sentences = {
  "engel curves": engelSentences,
  "demand curve": demandSentences,
  elasticities: elasticitySentences,
  "fit of shares": fitSentences,
  "largest eigenvalue": eigenvalueSentences,
  incidence: incidenceSentences,
  "shares by group": sharesSentences,
  "price distribution": priceSentences,
};

/** What the figure shows, in a sentence or two; it stands for the figure where that is not seen. */
export function figureSentence(finding: FigureFinding): string {
  const said = SENTENCES[finding.drawn.show] as (one: FigureFinding) => string[];
  return said(finding).join(" ");
}

const share = (value: number) => printQuantity(value, "share");
const percent = (value: number) => printPercent(value);
const money = (value: number) => printQuantity(value, "money");
const at = ({ pointName }: FigureFinding) => withArticle(pointName ?? "mean");

/** "falls from 0.3 to 0.2"; "stays at 0.3" where the two print alike. */
function moves(from: number, to: number, print: (value: number) => string): string {
  if (print(from) === print(to)) return `stays at ${print(from)}`;
  return `${to < from ? "falls" : "rises"} from ${print(from)} to ${print(to)}`;
}

/** Of several series the one that falls most and the one that rises most, first to last. */
function mostMoved(series: readonly { readonly name: string; readonly values: readonly number[] }[]) {
  const moved = series
    .map(({ name, values }) => ({ name, from: values[0], to: values[values.length - 1] }))
    .sort((a, b) => a.to - a.from - (b.to - b.from));
  const [falling, rising] = [moved[0], moved[moved.length - 1]];
  return moved.length === 1 || Math.sign(falling.to - falling.from) === Math.sign(rising.to - rising.from)
    ? [Math.abs(falling.to - falling.from) > Math.abs(rising.to - rising.from) ? falling : rising]
    : [falling, rising];
}

const undefinedPoints = ({ points, of }: DrawnOf<"engel curves">["leftOut"]) =>
  points === 0 ? [] : [`The system is not defined at ${printCount(points)} of ${printCount(of)} points.`];

function engelSentences({ drawn, ...finding }: FindingOfFigure<"engel curves">): string[] {
  const { totals, curves, leftOut } = drawn;
  const told = mostMoved(curves.map(({ good, values }) => ({ name: good, values })));
  const parts = told.map(({ name, from, to }) => `that of ${name} ${moves(from, to, percent)}`);
  const [first, ...others] = [parts[0].replace("that of", "the predicted share of"), ...parts.slice(1)];
  const range = `between expenditures of ${money(totals[0])} and ${money(totals[totals.length - 1])}`;
  return [
    `${capital([first, ...others].join(", "))} ${range}, at prices of ${at(finding as FigureFinding)}.`,
    ...undefinedPoints(leftOut),
  ];
}

function demandSentences({ drawn, ...finding }: FindingOfFigure<"demand curve">): string[] {
  const { good, prices, uncompensated, compensated, leftOut } = drawn;
  const print = quantityPrinter(drawn);
  const ends = ({ values }: typeof uncompensated) => moves(values[0], values[values.length - 1], print);
  const kept = compensated ? ` With utility kept it ${ends(compensated)}.` : "";
  const range = `as its price goes from ${money(prices[0])} to ${money(prices[prices.length - 1])}`;
  return [
    `What is bought of ${good} ${ends(uncompensated)} ${range}, everything else at ${at(finding as FigureFinding)}.${kept}`,
    ...undefinedPoints(leftOut),
  ];
}

/** Quantities have whatever units were uploaded: as many decimals as their size asks for. */
export function quantityPrinter({ uncompensated }: DrawnOf<"demand curve">): (value: number) => string {
  const { decimals } = digitsForAll(uncompensated.values);
  return (value) => printFixed(value, Math.min(decimals, 3));
}

function elasticitySentences({ drawn, ...finding }: FindingOfFigure<"elasticities">): string[] {
  const { goods, groups, groupedBy, without } = drawn;
  const range = (which: "expenditure" | "own" | "ownCompensated") => {
    const all = groups.flatMap(({ name, [which]: { values } }) =>
      values.map((value, i) => ({ value, of: groups.length > 1 ? `${goods[i]}, ${name}` : goods[i] })),
    );
    const ordered = all.sort((a, b) => a.value - b.value);
    const said = ({ value, of }: (typeof all)[number]) => `${printQuantity(value, "elasticity")} (${of})`;
    return all.length === 1
      ? `is ${said(all[0])}`
      : `lies between ${said(ordered[0])} and ${said(ordered[ordered.length - 1])}`;
  };
  const where = groupedBy ? `By ${groupedBy.of}` : `At ${at(finding as FigureFinding)}`;
  return [
    `${where} the expenditure elasticity ${range("expenditure")}, the own-price elasticity ${range("own").replace("lies ", "")}.`,
    ...without.map(({ name, undefined: reason }) => `${capital(name)} has none: ${reason}`),
  ];
}

function fitSentences({ drawn }: FindingOfFigure<"fit of shares">): string[] {
  const bins = drawn.goods.flatMap(({ good, bins: own }) => own.map((bin) => ({ good, ...bin })));
  const gap = ({ predicted, observed }: (typeof bins)[number]) => observed.value - predicted;
  const worst = bins.reduce((one, other) => (Math.abs(gap(other)) > Math.abs(gap(one)) ? other : one));
  const covered = bins.filter(({ predicted, observed }) => observed.low <= predicted && predicted <= observed.high);
  const way = gap(worst) < 0 ? "below" : "above";
  return [
    `In ${printCount(covered.length)} of ${printCount(bins.length)} bins of rows with like predictions the interval of the observed mean share covers the predicted one; the widest gap is ${share(Math.abs(gap(worst)))}, ${worst.good} ${way} a prediction of ${share(worst.predicted)}.`,
    ...undefinedSentence(drawn.notDefined, drawn.rows),
  ];
}

function eigenvalueSentences({ drawn, ...finding }: FindingOfFigure<"largest eigenvalue">): string[] {
  const { totals, eigenvalue, breaks, leftOut } = drawn;
  const last = totals[totals.length - 1];
  const highest = Math.max(...eigenvalue.values);
  const where = `with prices at ${at(finding as FigureFinding)}`;
  const range = `from ${money(totals[0])} to ${money(last)}`;
  const stretches = breaks.map(({ from, to }) => {
    if (from === totals[0]) return to === last ? `throughout, ${range}` : `below ${money(to)}`;
    return to === last ? `above ${money(from)}` : `between ${money(from)} and ${money(to)}`;
  });
  const told =
    breaks.length === 0
      ? `Negativity holds at every expenditure drawn, ${range}, ${where}: the largest eigenvalue is at most ${printQuantity(highest, "entry")}.`
      : `Negativity breaks at expenditures ${listed(stretches)}, ${where}: the largest eigenvalue reaches ${printQuantity(highest, "entry")}.`;
  return [told.replace("at expenditures throughout", "throughout"), ...undefinedPoints(leftOut)];
}

/** "the lowest fifth of total expenditure"; a column's own value as it is written. */
export function groupName(groupedBy: GroupsSpecification | undefined, name: string): string {
  return groupedBy?.quantiles === undefined ? name : `the ${name}`;
}

function incidenceSentences({ drawn }: FindingOfFigure<"incidence">): string[] {
  const { groups, groupedBy, all, notDefined, measure, without } = drawn;
  const ordered = groups.toSorted((a, b) => b.share.value - a.share.value);
  const [most, least] = [ordered[0], ordered[ordered.length - 1]];
  const part = ({ share: { value } }: (typeof groups)[number]) => printPercent(value);
  const by = groupedBy ? ` of ${groupedBy.of}` : "";
  const told =
    groups.length === 1
      ? `${capital(groupName(groupedBy, most.name))}${by} loses ${part(most)} of its expenditure`
      : `${capital(groupName(groupedBy, most.name))}${by} loses most, ${part(most)} of its expenditure, ${groupName(groupedBy, least.name)} least, ${part(least)}`;
  const how = measure === "second order" ? " (to second order)" : "";
  const lost = notDefined === 0 ? [] : [`The answer is not defined in ${countedRows(notDefined)}.`];
  return [
    `${told}; all together ${part(all)}${how}.`,
    ...lost,
    ...without.map(({ name, undefined: reason }) => `${capital(name)} has no answer: ${reason}`),
  ];
}

function sharesSentences({ drawn }: FindingOfFigure<"shares by group">): string[] {
  const { goods, groups, groupedBy } = drawn;
  const [first, last] = [groups[0], groups[groups.length - 1]];
  const series = goods.map((name, i) => ({ name, values: groups.map(({ shares }) => shares.values[i]) }));
  if (groupedBy.quantiles === undefined) {
    const widest = series
      .map(({ name, values }) => ({ name, low: Math.min(...values), high: Math.max(...values) }))
      .reduce((one, other) => (other.high - other.low > one.high - one.low ? other : one));
    return [
      `By ${groupedBy.of} the mean share of ${widest.name} differs most, between ${percent(widest.low)} and ${percent(widest.high)}.`,
    ];
  }
  const parts = mostMoved(series).map(({ name, from, to }) => `that of ${name} ${moves(from, to, percent)}`);
  const [head, ...others] = [parts[0].replace("that of", "The mean share of"), ...parts.slice(1)];
  return [`${[head, ...others].join(", ")} between the ${first.name} and the ${last.name} of ${groupedBy.of}.`];
}

function priceSentences({ drawn }: FindingOfFigure<"price distribution">): string[] {
  const [first, middle, third] = drawn.quartiles;
  const different = `${printCount(drawn.different)} different ${drawn.different === 1 ? "price" : "prices"}`;
  return [
    `Half of the rows, by weight, pay between ${money(first)} and ${money(third)} for ${drawn.good}, the median ${money(middle)}; there are ${different} in ${countedRows(drawn.rows)}.`,
  ];
}

/** What has to be known beside the figure: cautions first, then conventions. */
export function figureNotes(finding: FigureFinding): string[] {
  const { drawn, standardErrors, intervals, level } = finding;
  const ends = `${printPercent(level, 0)} intervals`;
  const how =
    intervals === "percentile"
      ? `${ends} are percentiles of ${drawsOf(drawn)}`
      : `${ends} are estimate and standard error times a normal quantile`;
  return [
    ...(drawn.show === "incidence" ? [WELFARE_CAUTION] : []),
    ...(standardErrors ? [`${how}; standard errors ${standardErrors}.`] : []),
    ...conventionsOf(drawn),
    ...caveatSentences(finding),
  ];
}

const drawsOf = (drawn: Drawn) =>
  "draws" in drawn && drawn.draws !== undefined
    ? `${printCount(drawn.draws)} bootstrap draws`
    : "the bootstrap’s draws";

function conventionsOf(drawn: Drawn): string[] {
  switch (drawn.show) {
    case "engel curves":
    case "largest eigenvalue":
      return ["Total expenditure from its 1st to its 99th percentile, in the units uploaded."];
    case "demand curve":
      return [
        "Prices from the 1st to the 99th percentile of those paid; prices and quantities in the units uploaded.",
        ...(drawn.noCompensated ? [`No compensated curve: ${drawn.noCompensated}`] : []),
        ...(drawn.indexMoves
          ? ["The weights of the price index follow the curve; elasticities hold them at their point."]
          : []),
      ];
    case "fit of shares":
      return [
        "Each bin holds a tenth of the weight of all rows, equal predictions together; axes begin where the bins do.",
      ];
    case "price distribution":
      return [
        `Prices from the 1st to the 99th percentile, in the units uploaded; ${printPercent(drawn.below)} of the weight lies below and ${printPercent(drawn.above)} above.`,
      ];
    case "shares by group":
      return drawn.groupedBy.of === TOTAL_EXPENDITURE ? ["Groups of equal weight, lowest expenditure first."] : [];
    default:
      return [];
  }
}
