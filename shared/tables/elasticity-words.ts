import type { ClassOfGood, ElasticitiesFinding, ElasticityGroup } from "../schemas/elasticities.ts";
import { caveatSentences } from "./caveat-words.ts";
import { conditionalWords, isUnconditional, unconditionalOf } from "./conditional.ts";
import { printCount, printPercent, printQuantity } from "./numbers.ts";
import { capital, countedRows, listed, undefinedSentence } from "./phrases.ts";
import { withArticle } from "./slutsky-matrix.ts";
import { meetsBadly, unconditionallyBy, unconditionalNotes } from "./two-stage-words.ts";

/** The name of a group where a sentence or a line begins: a column's own name stays as it is written. */
export function groupHead(groupedBy: ElasticitiesFinding["groupedBy"], name: string): string {
  return groupedBy !== undefined && groupedBy.quantiles === undefined ? name : capital(name);
}

/** Groups of fewer rows than these are named: their mean point is the mean of few. */
export const FEW_ROWS = 30;

const KINDS = ["luxury", "necessity", "inferior"] as const;
const PLURAL = { luxury: "luxuries", necessity: "necessities", inferior: "inferior goods", undecided: "undecided" };
const SINGULAR = { luxury: "a luxury", necessity: "a necessity", inferior: "an inferior good", undecided: "undecided" };

/** "at the sample mean", "over all rows", "in the lowest fifth of total expenditure". */
export function whereOf(finding: Pick<ElasticitiesFinding, "groupedBy" | "over">, name: string): string {
  if (finding.groupedBy === undefined) return finding.over === "rows" ? "over all rows" : `at ${withArticle(name)}`;
  return finding.groupedBy.quantiles === undefined ? `where ${name}` : `in the ${name} of ${finding.groupedBy.of}`;
}

/**
 * What a reader takes along: which goods are luxuries, necessities or inferior beyond doubt, and where; of several
 * groups also the elasticity that differs most between them.
 */
export function elasticitiesSentence(finding: ElasticitiesFinding): string {
  const { groups } = finding;
  const told = groups.length === 1 ? oneGroup(finding, groups[0]) : severalGroups(finding);
  const giffen = groups.length === 1 ? giffenGoods(groups[0]) : [];
  return [
    ...unconditionally(finding),
    told,
    ...giffen,
    ...notDefined(finding),
    ...withoutAny(finding),
    ...caveatSentences(finding),
  ].join(" ");
}

/** What the goods are given the whole budget comes first: it is what a policy asks for. */
function unconditionally(finding: ElasticitiesFinding): string[] {
  const { unconditional } = finding;
  const whole = unconditionalOf(finding);
  if (unconditional === undefined || whole === undefined) return [];
  const decided = classesInWords(unconditional.classes);
  const what = decided.length === 0 ? "no good is a luxury or a necessity beyond doubt" : listed(decided);
  const said = `${unconditionallyBy(unconditional)}, ${whereOf(whole, whole.groups[0].name)}, ${what}.`;
  const spent = "What is spent on the group differs between the two systems there.";
  return meetsBadly(finding) ? [said, spent] : [said];
}

function oneGroup(finding: ElasticitiesFinding, group: ElasticityGroup): string {
  const decided = classesInWords(group.classes);
  const place = whereOf(finding, group.name);
  const condition = conditionalWords(finding);
  const where = capital(condition ? `${condition}, ${place}` : place);
  const intervals = `by ${printPercent(finding.level, 0)} intervals`;
  if (decided.length === 0) return `${where} no good is a luxury or a necessity beyond doubt, ${intervals}.`;
  return `${where}, ${intervals}, ${listed(decided)}.`;
}

/** "meat and sweet drinks are luxuries", "grains is a necessity"; those undecided last. */
function classesInWords(classes: readonly ClassOfGood[]): string[] {
  const told = KINDS.flatMap((kind) => {
    const goods = goodsOf(classes, kind);
    return goods.length === 0 ? [] : [said(goods, kind)];
  });
  const open = goodsOf(classes, "undecided");
  return told.length === 0 || open.length === 0 ? told : [...told, said(open, "undecided")];
}

function said(goods: readonly string[], kind: ClassOfGood["kind"]): string {
  return goods.length === 1 ? `${goods[0]} is ${SINGULAR[kind]}` : `${listed(goods)} are ${PLURAL[kind]}`;
}

function goodsOf(classes: readonly ClassOfGood[], kind: ClassOfGood["kind"]): string[] {
  return classes.filter((one) => one.kind === kind).map(({ good }) => good);
}

function severalGroups(finding: ElasticitiesFinding): string {
  const { groups, goods, level } = finding;
  const always = goods.map((good, i) => {
    const kinds = new Set(groups.map(({ classes }) => classes[i].kind));
    return { good, kind: kinds.size === 1 ? groups[0].classes[i].kind : ("undecided" as const) };
  });
  const alike = KINDS.flatMap((kind) => {
    const of = always.filter((one) => one.kind === kind).map(({ good }) => good);
    return of.length === 0 ? [] : [said(of, kind)];
  });
  const intervals = `by ${printPercent(level, 0)} intervals`;
  const condition = conditionalWords(finding) && `${conditionalWords(finding)}, `;
  const first =
    alike.length === 0
      ? `${condition}no good is a luxury or a necessity beyond doubt in every one of ${groups.length} groups, ${intervals}.`
      : `${condition}in each of ${groups.length} groups, ${intervals}, ${listed(alike)}.`;
  return `${capital(first)} ${widest(finding)}`;
}

/** The good whose expenditure elasticity differs most between groups. */
function widest({ goods, groups }: ElasticitiesFinding): string {
  const spans = goods.map((good, i) => {
    const ordered = groups.toSorted((a, b) => a.expenditure.values[i] - b.expenditure.values[i]);
    const [low, high] = [ordered[0], ordered[ordered.length - 1]];
    return { good, low, high, i, span: high.expenditure.values[i] - low.expenditure.values[i] };
  });
  const { good, low, high, i } = spans.toSorted((a, b) => b.span - a.span)[0];
  const value = (group: ElasticityGroup) => printQuantity(group.expenditure.values[i], "elasticity");
  return `${capital(good)} varies most, its expenditure elasticity from ${value(low)} to ${value(high)}.`;
}

function giffenGoods({ classes }: ElasticityGroup): string[] {
  const goods = classes.filter(({ giffen }) => giffen === "yes").map(({ good }) => good);
  if (goods.length === 0) return [];
  return [`${capital(listed(goods))} ${goods.length === 1 ? "is a Giffen good" : "are Giffen goods"} there.`];
}

/** Rows without predicted shares, of all groups together. */
function notDefined({ groups }: ElasticitiesFinding): string[] {
  const without = groups.reduce((sum, group) => sum + (group.notDefined?.rows ?? 0), 0);
  const rows = groups.reduce((sum, group) => sum + (group.rows ?? 0), 0);
  return undefinedSentence(without > 0 ? { rows: without } : undefined, rows);
}

function withoutAny({ without, groupedBy }: ElasticitiesFinding): string[] {
  if (without.length === 0) return [];
  const names = without.map(({ name }) => name);
  return [`${groupHead(groupedBy, listed(names))} ${names.length === 1 ? "has" : "have"} none.`];
}

/** The conventions behind the numbers, a sentence each: what parentheses are, where, which shares, which index. */
export function elasticityNotes(finding: ElasticitiesFinding): string[] {
  const { unconditional } = finding;
  const stages = unconditional !== undefined && isUnconditional(finding) ? unconditionalNotes(unconditional) : [];
  return [errorsNote(finding), ...stages, whereNote(finding), sharesNote(finding), ...cautions(finding)];
}

function errorsNote(finding: ElasticitiesFinding): string {
  const { intervals, level, standardErrors, over } = finding;
  const errors = `Estimate over (standard error) by the delta method, ${standardErrors}`;
  const isTooMany = over === "rows" && intervals === "normal" && standardErrors.startsWith("bootstrap");
  const normal = isTooMany ? ", normal as the rows are too many to go over at every replicate" : "";
  const isPercentile = intervals === "percentile" && !isUnconditional(finding);
  const percentiles = isPercentile ? " by the bootstrap's own percentiles" : normal;
  return `${errors}; intervals of ${printPercent(level, 0)}${percentiles}.`;
}

function whereNote({ over, groupedBy, groups }: ElasticitiesFinding): string {
  if (over === "rows") {
    return "Over the rows, each row's elasticity weighted by what it spends on the good: what one per cent more of expenditure, or of a price, for every row does to what they buy together (Banks, Blundell and Lewbel 1997). Compensated ones compensate every row for itself.";
  }
  if (groupedBy !== undefined) {
    return "At each group's mean point: weighted geometric means of prices and total expenditure, weighted means of demographics.";
  }
  return `Evaluated at ${withArticle(groups[0].name)}.`;
}

function sharesNote({ shares, form, index }: ElasticitiesFinding): string {
  const which =
    shares === "predicted"
      ? "The shares in the formulas are the model's predictions"
      : "The shares in the formulas are observed means, taken as known";
  if (form !== "la-aids") return `${which}.`;
  const weights =
    index === "held"
      ? "the weights of the price index are held (Chalfant 1987)"
      : "the weights of Stone's index move with the shares (Green and Alston 1990)";
  return `${which}; ${weights}.`;
}

function cautions({ groups, without, derivativeRows, groupedBy }: ElasticitiesFinding): string[] {
  const few = groups.filter(({ rows }) => rows !== undefined && rows < FEW_ROWS);
  const fewNote = `Fewer than ${FEW_ROWS} rows: ${listed(few.map(({ name, rows = 0 }) => `${name}, ${countedRows(rows)}`))}.`;
  const below = groups.flatMap(({ name, notPositive }) =>
    notPositive.map(({ good, rows }) => `${good} in ${countedRows(rows)} of ${name}`),
  );
  const nowhere = groups.flatMap(({ name, notDefined }) =>
    notDefined
      ? [
          `The system is not defined in ${countedRows(notDefined.rows)} of ${name}, which are left out: ${notDefined.reason}.`,
        ]
      : [],
  );
  const sampled = derivativeRows && [
    `The derivatives behind the standard errors are taken at ${printCount(derivativeRows.used)} of ${printCount(derivativeRows.of)} rows, evenly spread; the estimates go over all of them.`,
  ];
  return [
    ...(few.length > 0 ? [fewNote] : []),
    ...(below.length > 0 ? [`A share is not positive: ${listed(below)}.`] : []),
    ...nowhere,
    ...(sampled ?? []),
    ...without.map(({ name, undefined: reason }) => `${groupHead(groupedBy, name)}: ${reason}`),
  ];
}
