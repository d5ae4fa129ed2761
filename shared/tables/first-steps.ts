import type { Endogeneity, ZerosFinding } from "../schemas/first-steps.ts";
import type { SystemFinding } from "../schemas/system.ts";
import { EMPTY, estimateCell, numberCell, percentCell } from "./cells.ts";
import { endogeneitySentences, zerosSentences } from "./first-steps-words.ts";
import { DECIMALS, printCount } from "./numbers.ts";
import type { LabelledTable } from "./table.ts";

/** The regression of ln x: a row for each regressor, the instruments last. */
export function firstStageTable(endogeneity: Endogeneity): LabelledTable {
  return {
    name: "first-stage",
    title: "First stage of ln total expenditure",
    corner: "Regressor",
    columns: [{ label: "ln total expenditure" }],
    rows: endogeneity.firstStage.coefficients.map(({ name, estimate, standardError }) => ({
      label: endogeneity.instruments.includes(name) ? `${name}, instrument` : name,
      cells: [estimateCell(estimate, standardError, DECIMALS.coefficient)],
    })),
    notes: ["Estimate over (standard error).", ...endogeneitySentences(endogeneity)],
  };
}

/** The probits, a column for each good with zeros: coefficients, then how many rows buy none and the correction. */
export function probitTable(zeros: ZerosFinding): LabelledTable {
  const goods = zeros.goods.filter(({ probit }) => probit !== undefined);
  const names = goods[0]?.probit?.coefficients.map(({ name }) => name) ?? [];
  return {
    name: "probits",
    title: "Whether a good is bought: probits",
    corner: "Regressor",
    columns: goods.map(({ good }) => ({ label: good })),
    rows: [
      ...names.map((label, a) => ({
        label,
        cells: goods.map(({ probit }) => {
          const one = probit?.coefficients[a];
          return one ? estimateCell(one.estimate, one.standardError, DECIMALS.coefficient) : EMPTY;
        }),
      })),
      { label: "Rows that buy none", cells: goods.map(({ rowsWithout }) => count(rowsWithout)) },
      { label: "Share that buys none", cells: goods.map(({ boughtNone }) => percentCell(boughtNone)) },
      {
        label: "Log-likelihood",
        cells: goods.map(({ probit }) => (probit ? numberCell(probit.logLikelihood, "statistic") : EMPTY)),
      },
      {
        label: "Correction in the share equation,",
        symbol: "δ",
        cells: goods.map(({ good }) => {
          const one = zeros.corrections.find((correction) => correction.good === good);
          return one ? estimateCell(one.estimate, one.standardError, DECIMALS.coefficient) : EMPTY;
        }),
      },
    ],
    notes: ["Estimate over (standard error).", ...boughtByAll(zeros), ...zerosSentences(zeros)],
  };
}

const count = (value: number) => ({ kind: "number" as const, value, printed: printCount(value) });

/** Goods that need no first step. */
export function boughtByAll({ goods }: ZerosFinding): string[] {
  const all = goods.filter(({ probit }) => probit === undefined).map(({ good }) => good);
  if (all.length === 0) return [];
  return [`Bought in every row, so without a first step: ${all.join(", ")}.`];
}

/** The tables of what came before the share equations, where something did. */
export function firstStepTables({ endogeneity, zeros }: Pick<SystemFinding, "endogeneity" | "zeros">): LabelledTable[] {
  return [...(endogeneity ? [firstStageTable(endogeneity)] : []), ...(zeros ? [probitTable(zeros)] : [])];
}
