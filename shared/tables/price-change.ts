import type {
  ChangeAtPoint,
  Effects,
  Estimate,
  Estimates,
  IncidenceGroup,
  PriceChangeFinding,
} from "../schemas/price-change.ts";
import { EMPTY, estimateCell, numberCell } from "./cells.ts";
import { DECIMALS, digitsForAll } from "./numbers.ts";
import { priceChangeNotes } from "./price-change-words.ts";
import { withArticle } from "./slutsky-matrix.ts";
import type { LabelledTable, TableCell, TableRow } from "./table.ts";

export const EFFECT_NAMES = ["hicks", "slutsky", "infinitesimal"] as const;
export type EffectName = (typeof EFFECT_NAMES)[number];

const EFFECT_TITLES: Readonly<Record<EffectName, string>> = {
  hicks: "at the utility before (Hicks)",
  slutsky: "where the bundle before stays affordable (Slutsky)",
  infinitesimal: "by the slopes before the change",
};

/** "at the sample mean". */
const whereOf = ({ pointName }: PriceChangeFinding): string => `at ${withArticle(pointName)}`;

function byGood(estimates: Estimates | undefined, i: number, decimals: number): TableCell {
  return estimates ? estimateCell(estimates.values[i], estimates.errors[i], decimals) : EMPTY;
}

/** A row for each good: what is bought before and after, and the two parts of the change. */
export function effectsTable(finding: PriceChangeFinding, which: EffectName): LabelledTable {
  const { at, fitted } = finding;
  const effects: Effects | undefined = at[which];
  const { decimals } = digitsForAll(at.quantities.before.values);
  return {
    name: `price-change-${which}`,
    title: `Substitution and income ${EFFECT_TITLES[which]}, ${whereOf(finding)}, quantities in the units uploaded`,
    corner: "Good",
    columns: [
      { label: "Price before" },
      { label: "Price after" },
      { label: "Before" },
      { label: "Substitution" },
      { label: "Income" },
      { label: "Both" },
      { label: "Share before" },
      { label: "Share after" },
    ],
    rows: fitted.goods.map((label, i) => ({
      label,
      cells: [
        numberCell(at.pricesBefore[i], "money"),
        numberCell(at.pricesAfter[i], "money"),
        byGood(at.quantities.before, i, decimals),
        byGood(effects?.substitution, i, decimals),
        byGood(effects?.income, i, decimals),
        which === "infinitesimal" ? EMPTY : byGood(at.total, i, decimals),
        byGood(at.shares.before, i, DECIMALS.share),
        byGood(at.shares.after, i, DECIMALS.share),
      ],
    })),
    notes: priceChangeNotes(finding),
  };
}

const one = (estimate: Estimate | undefined, decimals: number): TableCell =>
  estimate ? estimateCell(estimate.value, estimate.error, decimals) : EMPTY;

/** A row for each measure of what the change costs at the point, where there is one. */
export function welfareTable(finding: PriceChangeFinding): LabelledTable {
  const { at } = finding;
  return {
    name: "price-change-welfare",
    title: `What the change costs ${whereOf(finding)}, losses positive, money in the units uploaded`,
    corner: "Measure",
    columns: [{ label: "Estimate" }],
    rows: measures(at).map(([label, estimate, decimals]): TableRow => ({ label, cells: [one(estimate, decimals)] })),
    notes: priceChangeNotes(finding),
  };
}

type Measure = readonly [label: string, estimate: Estimate | undefined, decimals: number];

function measures({ welfare, secondOrder, marshallian, costOfLiving, tax }: ChangeAtPoint): Measure[] {
  const { money, entry } = DECIMALS;
  const all: Measure[] = [
    ["Compensating variation", welfare?.compensating, money],
    ["Equivalent variation", welfare?.equivalent, money],
    ["Loss of Marshallian surplus, straight path", marshallian, money],
    ["Compensating variation to second order", secondOrder, money],
    ["Cost of living at the utility before", costOfLiving.atUtilityBefore, entry],
    ["Laspeyres index", costOfLiving.laspeyres, entry],
    ["Paasche index", costOfLiving.paasche, entry],
    ["Revenue", tax?.revenue, money],
    ["Revenue that buyers bear", tax?.paidByBuyers, money],
    ["Excess burden", tax?.excessBurden, money],
    ["Marginal cost of funds", tax?.marginalCost, entry],
  ];
  return all.filter(([, estimate]) => estimate !== undefined);
}

/** A row for each group and one for all: what the change costs them, and what of it is revenue. */
export function incidenceTable(finding: PriceChangeFinding): LabelledTable {
  const { incidence } = finding;
  const groups = incidence ? incidence.groups : [];
  return {
    name: "price-change-incidence",
    title: `Who bears it${incidence?.groupedBy ? `, by ${incidence.groupedBy.of}` : ""}: means over rows, losses positive, money in the units uploaded`,
    corner: "Rows",
    columns: [
      { label: "Rows" },
      { label: "Expenditure" },
      { label: "Compensating variation" },
      { label: "Equivalent variation" },
      { label: "Compensating variation, of expenditure" },
      { label: "To second order" },
      { label: "Revenue" },
      { label: "Excess burden" },
    ],
    rows: [...groups.map((group) => groupRow(group, false)), ...(incidence ? [groupRow(incidence.all, true)] : [])],
    notes: priceChangeNotes(finding),
  };
}

function groupRow(group: IncidenceGroup, total: boolean): TableRow {
  const { name, rows, expenditure, welfare, welfareShare, secondOrder, tax } = group;
  return {
    label: name,
    cells: [
      { kind: "number", value: rows, printed: String(rows) },
      numberCell(expenditure, "money"),
      one(welfare?.compensating, DECIMALS.money),
      one(welfare?.equivalent, DECIMALS.money),
      one(welfareShare?.compensating, DECIMALS.share),
      one(secondOrder, DECIMALS.money),
      one(tax?.revenue, DECIMALS.money),
      one(tax?.excessBurden, DECIMALS.money),
    ],
    ...(total && { total: true }),
  };
}

/** The finding's tables, the one to copy first. */
export function priceChangeTables(finding: PriceChangeFinding): LabelledTable[] {
  const { at, incidence } = finding;
  return [
    ...EFFECT_NAMES.filter((which) => at[which] !== undefined).map((which) => effectsTable(finding, which)),
    welfareTable(finding),
    ...(incidence ? [incidenceTable(finding)] : []),
  ];
}
