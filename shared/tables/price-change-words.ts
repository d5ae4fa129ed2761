import type { GoodPriceSpecification, Incidence, IncidenceGroup, PriceChangeFinding } from "../schemas/price-change.ts";
import { caveatSentences } from "./caveat-words.ts";
import { FEW_ROWS } from "./elasticity-words.ts";
import { printCount, printPercent, printQuantity } from "./numbers.ts";
import { capital, countedRows, listed } from "./phrases.ts";
import { withArticle } from "./slutsky-matrix.ts";

/** Beside every figure of welfare and tax. */
export const WELFARE_CAUTION =
  "These are model estimates for the population that the rows stand for, with their uncertainty; they are no substitute for the responsible office’s own assessment.";

/** "With meat 40 % dearer and a tax on sweet drinks, 18.32 more is needed at the sample mean to live as well as before." */
export function priceChangeSentence(finding: PriceChangeFinding): string {
  const { at, pointName } = finding;
  const change = changesInWords(finding);
  if (change === undefined) return "No price changes: there is nothing to bear.";
  const where = withArticle(pointName);
  const loss = at.welfare?.compensating ?? at.secondOrder;
  const part = printPercent(Math.abs(loss.value) / at.totalBefore);
  const amount = `${printQuantity(Math.abs(loss.value), "money")} (${printQuantity(loss.error, "money")}), ${part} of expenditure,`;
  const way = loss.value < 0 ? "less is enough" : "more is needed";
  const kind = at.welfare ? "" : ", to second order";
  const told = `With ${change}, ${amount} ${way} at ${where} to live as well as before${kind}.`;
  return [told, ...whoBearsIt(finding)].join(" ");
}

/** "Over all rows it takes 9.6 % of expenditure, 7.7 % in the lowest fifth and 10.9 % in the highest fifth." */
function whoBearsIt({ incidence }: PriceChangeFinding): string[] {
  if (incidence === undefined) return [];
  const { groups, groupedBy, all } = incidence;
  const shareOf = ({ welfareShare, secondOrderShare }: IncidenceGroup) =>
    printPercent((welfareShare?.compensating ?? secondOrderShare).value);
  const ends = groupedBy?.quantiles !== undefined && groups.length > 1 ? [groups[0], groups[groups.length - 1]] : [];
  const parts = ends.map((group) => `${shareOf(group)} in the ${group.name}`);
  return [
    `Over all rows it takes ${[`${shareOf(all)} of expenditure`, ...(parts.length > 0 ? [listed(parts)] : [])].join(", ")}.`,
  ];
}

/** "meat & fish 40.0 % dearer and a 25 % tax on sweet drinks"; undefined where nothing changes. */
function changesInWords({ question, at, fitted }: PriceChangeFinding): string | undefined {
  const moves = ([good]: readonly [string, GoodPriceSpecification]) => {
    const i = fitted.goods.indexOf(good);
    return at.pricesAfter[i] !== at.pricesBefore[i] || at.taxes[i] !== 0;
  };
  const goods = Object.entries(question.prices)
    .filter(moves)
    .map(([good, change]) => changeInWords(good, change));
  const { expenditure } = question;
  const more = expenditure > 0 ? "higher" : "lower";
  const money = expenditure === 0 ? [] : [`total expenditure ${printPercent(Math.abs(expenditure) / 100)} ${more}`];
  const all = [...goods, ...money];
  return all.length === 0 ? undefined : listed(all);
}

function changeInWords(good: string, change: GoodPriceSpecification): string {
  const { "per cent": percent, to, "ad valorem": rate, specific } = change;
  const levied = (amount: number) => (amount < 0 ? "subsidy" : "tax");
  if (rate !== undefined) return `a ${printPercent(Math.abs(rate) / 100)} ${levied(rate)} on ${good}`;
  if (specific !== undefined)
    return `a ${levied(specific)} of ${printQuantity(Math.abs(specific), "money")} on ${good}`;
  if (to !== undefined) return `${good} at ${printQuantity(to, "money")}`;
  return `${good} ${printPercent(Math.abs(percent ?? 0) / 100)} ${(percent ?? 0) < 0 ? "cheaper" : "dearer"}`;
}

/** What has to be known beside the figures: cautions first, then conventions. */
export function priceChangeNotes(finding: PriceChangeFinding): string[] {
  return [WELFARE_CAUTION, ...warningsOf(finding), ...conventionsOf(finding), ...caveatSentences(finding)];
}

/** Prices nobody in the sample paid, shares that leave [0, 1], and what is absent. */
export function warningsOf({ unseen, at, incidence, noIncidence }: PriceChangeFinding): string[] {
  return [
    ...unseen.map(
      ({ good, price, bound, side, rows }) =>
        `The new price of ${good}, ${printQuantity(price, "money")}, is ${side} every price in the sample, which ${side === "above" ? "go up" : "go down"} to ${printQuantity(bound, "money")}${rows === undefined ? "" : ` (${countedRows(rows)})`}: the system is not known there.`,
    ),
    ...at.outside.map(
      ({ good, where, share }) =>
        `The predicted share of ${good} ${where === "compensated" ? "at the compensated bundle" : `${where} the change`} is ${printQuantity(share, "share")}, outside 0 to 1.`,
    ),
    ...(at.absent === undefined ? [] : [`No exact welfare: ${at.absent}`]),
    ...(at.tax?.noExcessBurden === undefined ? [] : [`No excess burden is given: ${at.tax.noExcessBurden}`]),
    ...(at.tax?.noMarginalCost === undefined ? [] : [`No marginal cost of funds is given: ${at.tax.noMarginalCost}`]),
    ...(noIncidence === undefined ? [] : [`Who bears it is not told: ${noIncidence}`]),
    ...(incidence ? incidenceWarnings(incidence) : []),
  ];
}

/** What the means over rows rest on: few rows, rows without an answer, shares and prices out of bounds. */
function incidenceWarnings({ groups, all, without, unseen, derivativeRows }: Incidence): string[] {
  const few = groups.filter(({ rows }) => rows < FEW_ROWS);
  const { notDefined, outside } = all;
  const beyond = unseen.map(
    ({ good, price, bound, side, rows = 0 }) =>
      `of ${good} in ${countedRows(rows)}, ${side === "above" ? "up" : "down"} to ${printQuantity(price, "money")} where the sample ends at ${printQuantity(bound, "money")}`,
  );
  return [
    ...(few.length > 0
      ? [`Fewer than ${FEW_ROWS} rows: ${listed(few.map(({ name, rows }) => `${name}, ${countedRows(rows)}`))}.`]
      : []),
    ...(notDefined
      ? [
          `The answer is not defined in ${printCount(notDefined.rows)} of ${countedRows(all.rows)}, which are named and in none of the means: ${notDefined.reason}.`,
        ]
      : []),
    ...(outside.system > 0 ? [`In ${countedRows(outside.system)} a predicted share leaves 0 to 1.`] : []),
    ...(outside.household > 0
      ? [`In ${countedRows(outside.household)} what the household would buy leaves 0 to 1 of its budget.`]
      : []),
    ...(outside.system + outside.household > 0 ? ["Such rows are named, and stand in the means as they are."] : []),
    ...(beyond.length > 0 ? [`New prices lie outside the sample’s: ${listed(beyond)}.`] : []),
    ...without.map(({ name, undefined: reason }) => `${capital(name)} has no answer: ${reason}`),
    ...(derivativeRows
      ? [
          `The derivatives behind the standard errors are taken at ${printCount(derivativeRows.used)} of ${printCount(derivativeRows.of)} rows, evenly spread; the estimates go over all of them.`,
        ]
      : []),
  ];
}

function conventionsOf({ standardErrors, intervals, at }: PriceChangeFinding): string[] {
  const how =
    intervals === "percentile" ? "intervals are percentiles of the bootstrap’s draws" : "intervals are normal";
  return [
    `Estimate over (standard error), by the delta method with exact derivatives; standard errors ${standardErrors}; ${how}.`,
    "Both variations are losses where positive, from the system without the row’s own residual; what households buy, and pay in tax, keeps it.",
    ...(at.marshallian
      ? ["Marshallian surplus is integrated along the straight path of prices and expenditure; it depends on the path."]
      : []),
    ...(at.tax
      ? [
          "Revenue is of the taxes asked about alone, not of those that prices already hold. The excess burden is the equivalent variation less what buyers pay of it; the marginal cost of funds is what buyers lose by a further unit of revenue, every tax raised in proportion.",
        ]
      : []),
  ];
}
