import type { SystemFinding } from "../schemas/system.ts";
import { EMPTY, estimateCell } from "./cells.ts";
import { conditionally } from "./conditional.ts";
import { equationsNotes } from "./equations-sentence.ts";
import { fewRowsNotes } from "./few-rows.ts";
import { DECIMALS, printFixed } from "./numbers.ts";
import { countedRows } from "./phrases.ts";
import { standardErrorsNotes, standardErrorsPhrase } from "./standard-errors.ts";
import type { LabelledTable, TableCell, TableRow } from "./table.ts";

type Coefficient = SystemFinding["coefficients"][number];

/** What a paper calls the rows of each block. Demographic and price rows are named by their column. */
const ROW_NAMES: Record<string, { label: string; symbol?: string }> = {
  alpha: { label: "Constant", symbol: "α" },
  constant: { label: "Constant", symbol: "b₀" },
  beta: { label: "ln x,", symbol: "β" },
  lambda: { label: "(ln x)²,", symbol: "λ" },
  committed: { label: "Committed quantity", symbol: "c" },
  marginal: { label: "Marginal share" },
};

export interface CoefficientRow extends TableRow {
  readonly block: string;
}

/** Blocks with a row for each price, alone or times something else, and the matrix each of them is. */
const PRICE_BLOCKS: Readonly<Record<string, string>> = {
  gamma: "Γ",
  slutsky: "Π",
  price: "A",
  "price demographic": "A",
  "price expenditure": "B",
};

export function isPriceBlock(block: string): boolean {
  return block in PRICE_BLOCKS;
}

/** The matrices of price effects among the rows: "Γ", "A, B". */
export function priceMatrices(rows: readonly CoefficientRow[]): string {
  return [...new Set(rows.filter((row) => isPriceBlock(row.block)).map((row) => PRICE_BLOCKS[row.block]))].join(", ");
}

/** In the linear expenditure system demographics shift committed quantities, not shares. */
function headOf(coefficient: Coefficient, form: SystemFinding["fitted"]["form"]): { label: string; symbol?: string } {
  const { block, symbol, column } = coefficient;
  if (column === undefined) return { symbol, ...(ROW_NAMES[block] ?? { label: block }) };
  if (form === "les" && block === "demographic") return { label: `${column}, shifts c` };
  return isPriceBlock(block) ? { label: `ln p, ${column}` } : { label: column };
}

/** One row for each block and column, one cell for each good, in the order the blocks come. */
export function coefficientRows(
  finding: Pick<SystemFinding, "coefficients" | "fitted" | "bootstrap">,
): CoefficientRow[] {
  const intervals = new Map(finding.coefficients.map((one, index) => [one, finding.bootstrap?.intervals[index]]));
  const rows = new Map<string, Coefficient[]>();
  for (const coefficient of finding.coefficients) {
    const key = JSON.stringify([coefficient.block, coefficient.column]);
    rows.set(key, [...(rows.get(key) ?? []), coefficient]);
  }
  return [...rows.values()].map((coefficients) => ({
    ...headOf(coefficients[0], finding.fitted.form),
    block: coefficients[0].block,
    cells: finding.fitted.goods.map((good) => {
      const found = coefficients.find((coefficient) => coefficient.good === good);
      return found ? coefficientCell(found, intervals.get(found)) : EMPTY;
    }),
  }));
}

function coefficientCell({ estimate, standardError }: Coefficient, interval?: readonly [number, number]): TableCell {
  const cell = estimateCell(estimate, standardError, DECIMALS.coefficient);
  if (interval === undefined || cell.kind !== "estimate") return cell;
  return { ...cell, printedInterval: interval.map((end) => printFixed(end, DECIMALS.coefficient)).join(" to ") };
}

/** Coefficients of all share equations, a column each, as a paper prints them. */
export function coefficientTable(finding: SystemFinding): LabelledTable {
  return {
    name: "coefficients",
    title: `Coefficients of the share equations, ${finding.fitted.form}${conditionally(finding)}`,
    corner: "Share equation",
    columns: finding.fitted.goods.map((label) => ({ label })),
    rows: coefficientRows(finding),
    notes: [
      `Estimate over (standard error), ${standardErrorsPhrase(finding)}. ${countedRows(finding.rows)}, ${finding.estimator}, prices and total in units of estimation.`,
      ...equationsNotes(finding),
      ...fewRowsNotes(finding),
      ...standardErrorsNotes(finding),
    ],
  };
}
