import type { ElasticitiesFinding } from "../schemas/elasticities.ts";
import type { UnconditionalFinding } from "../schemas/two-stage.ts";
import { estimateCell, numberCell, textCell } from "./cells.ts";
import { unconditionalOf } from "./conditional.ts";
import { byGood, CLASS_WORDS, entryOf, goodsTable, type OneEstimate, priceTable } from "./elasticities.ts";
import { whereOf } from "./elasticity-words.ts";
import { DECIMALS } from "./numbers.ts";
import { capital } from "./phrases.ts";
import type { LabelledTable, TableCell } from "./table.ts";
import { unconditionalNotes } from "./two-stage-words.ts";

const cellOf = ({ value, error }: OneEstimate): TableCell => estimateCell(value, error, DECIMALS.elasticity);

/** A finding with unconditional elasticities. */
export type TwoStageFinding = ElasticitiesFinding & { readonly unconditional: UnconditionalFinding };

export function isTwoStage(finding: ElasticitiesFinding): finding is TwoStageFinding {
  return finding.unconditional !== undefined;
}

/** Given what is spent on the group and given the whole budget, side by side, a row for each good. */
export function stagesTable(finding: TwoStageFinding): LabelledTable {
  const { goods, groups, unconditional } = finding;
  const { group } = unconditional;
  const [conditional] = groups;
  const whole = { ...conditional, ...unconditional };
  return {
    name: "two-stage-elasticities",
    title: `Elasticities conditional on ${group} expenditure and unconditional, ${whereOf(finding, conditional.name)}, ${finding.form} within ${unconditional.form}`,
    corner: "Good",
    columns: [
      { label: `Share of ${group}` },
      { label: "Expenditure, conditional" },
      { label: "Expenditure, unconditional" },
      { label: "Own price, conditional" },
      { label: "Own price, unconditional" },
      { label: "Class, unconditional" },
    ],
    rows: goods.map((label, i) => ({
      label,
      cells: [
        numberCell(conditional.shares[i], "share"),
        cellOf(byGood(conditional, "expenditure", i)),
        cellOf(byGood(whole, "expenditure", i)),
        cellOf(byGood(conditional, "own price", i)),
        cellOf(byGood(whole, "own price", i)),
        textCell(CLASS_WORDS[unconditional.classes[i].kind]),
      ],
    })),
    notes: unconditionalNotes(unconditional),
  };
}

/** The group as one good of the broader system. */
export function groupTable({ unconditional }: TwoStageFinding): LabelledTable {
  const { asGood, group, form } = unconditional;
  return {
    name: "group-in-broader-system",
    title: `${capital(group)} as one good of the broader system, ${form}`,
    corner: "Group",
    columns: [
      { label: "Share" },
      { label: "Expenditure" },
      { label: "Own price" },
      { label: "Own price, compensated" },
    ],
    rows: [
      {
        label: group,
        cells: [
          numberCell(asGood.share, "share"),
          cellOf(asGood.expenditure),
          cellOf(asGood.uncompensated),
          cellOf(asGood.compensated),
        ],
      },
    ],
    notes: [`Estimate over (standard error) by the delta method, ${unconditional.standardErrors}.`],
  };
}

/** Elasticities of the group's goods with respect to the prices of the broader system's other goods. */
export function othersTable(finding: TwoStageFinding, which: "uncompensated" | "compensated"): LabelledTable {
  const { others } = finding.unconditional;
  return {
    name: `unconditional-elasticities-others-${which}`,
    title: `Unconditional ${which} elasticities with respect to other prices ${whereOf(finding, finding.groups[0].name)}, ${finding.form} within ${finding.unconditional.form}`,
    corner: "Good by price of",
    columns: others.goods.map((label) => ({ label })),
    rows: finding.goods.map((label, i) => ({
      label,
      cells: others.goods.map((_, s) => cellOf(entryOf(others[which], i, s))),
    })),
    notes: unconditionalNotes(finding.unconditional),
  };
}

/** Every table of a finding of two stages: both side by side, then the unconditional and the conditional ones in full. */
export function twoStageTables(finding: TwoStageFinding): LabelledTable[] {
  const each = [unconditionalOf(finding) ?? finding, finding].flatMap((one) => [
    goodsTable(one, one.groups[0]),
    priceTable(one, one.groups[0], "uncompensated"),
    priceTable(one, one.groups[0], "compensated"),
  ]);
  return [
    stagesTable(finding),
    ...each,
    othersTable(finding, "uncompensated"),
    othersTable(finding, "compensated"),
    groupTable(finding),
  ];
}
