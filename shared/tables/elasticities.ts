import type { ClassOfGood, ElasticitiesFinding, ElasticityGroup, EstimatesByPrice } from "../schemas/elasticities.ts";
import { estimateCell, numberCell, textCell } from "./cells.ts";
import { conditionally, filePrefix, titled } from "./conditional.ts";
import { elasticityNotes, whereOf } from "./elasticity-words.ts";
import { DECIMALS } from "./numbers.ts";
import type { LabelledTable, TableCell } from "./table.ts";

/** What a group is compared by, one number a good. */
export const BY_GOOD = ["expenditure", "own price", "own price, compensated"] as const;
export type ByGood = (typeof BY_GOOD)[number];

/** A number with its error and interval, for one good of a group. */
export interface OneEstimate {
  readonly value: number;
  readonly error: number;
  readonly low: number;
  readonly high: number;
}

export function entryOf({ values, errors, low, high }: EstimatesByPrice, i: number, j: number): OneEstimate {
  return { value: values[i][j], error: errors[i][j], low: low[i][j], high: high[i][j] };
}

export function byGood(group: ElasticityGroup, which: ByGood, i: number): OneEstimate {
  if (which === "own price") return entryOf(group.uncompensated, i, i);
  if (which === "own price, compensated") return entryOf(group.compensated, i, i);
  const { values, errors, low, high } = group.expenditure;
  return { value: values[i], error: errors[i], low: low[i], high: high[i] };
}

export const CLASS_WORDS: Readonly<Record<ClassOfGood["kind"], string>> = {
  luxury: "luxury",
  necessity: "necessity",
  inferior: "inferior",
  undecided: "undecided",
};

const cellOf = ({ value, error }: OneEstimate): TableCell => estimateCell(value, error, DECIMALS.elasticity);

/** One group: a row for each good, with its share, its elasticities and what it is. */
export function goodsTable(finding: ElasticitiesFinding, group: ElasticityGroup): LabelledTable {
  return {
    name: `${filePrefix(finding)}elasticities`,
    title: `${titled(finding, "elasticities")} ${whereOf(finding, group.name)}${conditionally(finding)}, ${finding.form}`,
    corner: "Good",
    columns: [
      { label: "Share" },
      { label: "Expenditure" },
      { label: "Own price" },
      { label: "Own price, compensated" },
      { label: "Class" },
    ],
    rows: finding.goods.map((label, i) => ({
      label,
      cells: [
        numberCell(group.shares[i], "share"),
        ...BY_GOOD.map((which) => cellOf(byGood(group, which, i))),
        textCell(CLASS_WORDS[group.classes[i].kind]),
      ],
    })),
    notes: elasticityNotes(finding),
  };
}

const TITLES: Readonly<Record<ByGood, string>> = {
  expenditure: "Expenditure elasticities",
  "own price": "Own-price elasticities",
  "own price, compensated": "Compensated own-price elasticities",
};

/** Several groups: a row for each, a column for each good. */
export function groupsTable(finding: ElasticitiesFinding, which: ByGood): LabelledTable {
  const { groupedBy } = finding;
  const by = groupedBy === undefined ? "" : ` by ${groupedBy.of}`;
  return {
    name: `elasticities-${which.replace(/[^a-z]+/g, "-")}`,
    title: `${TITLES[which]}${by}${conditionally(finding)}, ${finding.form}`,
    corner: "Group",
    columns: finding.goods.map((label) => ({ label })),
    rows: finding.groups.map((group) => ({
      label: group.name,
      cells: finding.goods.map((_, i) => cellOf(byGood(group, which, i))),
    })),
    notes: elasticityNotes(finding),
  };
}

/** All price elasticities of a group: rows are goods demanded, columns the prices that change. */
export function priceTable(
  finding: ElasticitiesFinding,
  group: ElasticityGroup,
  which: "uncompensated" | "compensated",
): LabelledTable {
  return {
    name: `${filePrefix(finding)}elasticities-${which}`,
    title: `${titled(finding, `${which} price elasticities`)} ${whereOf(finding, group.name)}${conditionally(finding)}, ${finding.form}`,
    corner: "Good by price of",
    columns: finding.goods.map((label) => ({ label })),
    rows: finding.goods.map((label, i) => ({
      label,
      cells: finding.goods.map((_, j) => cellOf(entryOf(group[which], i, j))),
    })),
    notes: elasticityNotes(finding),
  };
}

/** The tables of one stage, the one to copy first. */
export function oneStageTables(finding: ElasticitiesFinding): LabelledTable[] {
  const [first] = finding.groups;
  if (finding.groups.length > 1) return BY_GOOD.map((which) => groupsTable(finding, which));
  return [
    goodsTable(finding, first),
    priceTable(finding, first, "uncompensated"),
    priceTable(finding, first, "compensated"),
  ];
}
