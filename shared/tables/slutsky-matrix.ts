import type { SlutskyFinding } from "../schemas/slutsky.ts";
import { estimateCell } from "./cells.ts";
import { conditionally } from "./conditional.ts";
import { DECIMALS, digitsForAll, printFixed, printPowerOfTen } from "./numbers.ts";
import type { LabelledTable, TableCell } from "./table.ts";

export type MatrixForm = SlutskyFinding["form"];
/** What the matrix's tables need; a sealed copy's finding has it too. */
export type MatrixFinding = Pick<SlutskyFinding, "at" | "fitted" | "pointName" | "conditionalOn">;

/** The matrix and its standard errors in one form, with how many digits it takes. */
export interface MatrixInForm {
  readonly entries: number[][];
  readonly errors: number[][];
  /** Ends of the bootstrap's 95 % percentile intervals, where there was one. */
  readonly intervals?: { readonly low: number[][]; readonly high: number[][] };
  readonly decimals: number;
  /** Entries print divided by ten to this. */
  readonly exponent: number;
  /** "share form", "quantity form in units uploaded, × 10⁻³". */
  readonly name: string;
}

/** The share form has four decimals; the quantity form as many as its units ask for. */
export function matrixInForm(finding: MatrixFinding, form: MatrixForm): MatrixInForm {
  const { at } = finding;
  if (form === "share") {
    const intervals = at.intervals?.share;
    return {
      entries: at.share,
      errors: at.shareErrors,
      ...(intervals && { intervals }),
      decimals: DECIMALS.entry,
      exponent: 0,
      name: "share form",
    };
  }
  const digits = digitsForAll(at.quantity.flat());
  const power = digits.exponent === 0 ? "" : `, × ${printPowerOfTen(digits.exponent)}`;
  const name = `quantity form in units uploaded${power}`;
  const intervals = at.intervals?.quantity;
  return { entries: at.quantity, errors: at.quantityErrors, ...(intervals && { intervals }), ...digits, name };
}

/** An entry as printed in its matrix. */
export function printEntry(value: number, { decimals, exponent }: Pick<MatrixInForm, "decimals" | "exponent">): string {
  return printFixed(value / 10 ** exponent, decimals);
}

function cellOf(value: number, error: number, digits: MatrixInForm): TableCell {
  return {
    kind: "estimate",
    value,
    printed: printEntry(value, digits),
    standardError: error,
    printedError: printEntry(error, digits),
  };
}

/** The Slutsky matrix with standard errors: rows are goods demanded, columns the prices that change. */
export function slutskyTable(finding: MatrixFinding, form: MatrixForm): LabelledTable {
  const { goods } = finding.fitted;
  const shown = matrixInForm(finding, form);
  return {
    name: `slutsky-${form}`,
    title: `Slutsky matrix, ${shown.name}, at ${withArticle(finding.pointName)}${conditionally(finding)}`,
    corner: "Good by price of",
    columns: goods.map((label) => ({ label })),
    rows: goods.map((label, i) => ({
      label,
      cells: goods.map((_, j) => cellOf(shown.entries[i][j], shown.errors[i][j], shown)),
    })),
    notes: ["Estimate over (standard error) by the delta method. Row: good; column: price."],
  };
}

/** Compensated price elasticities ε*, same rows and columns. */
export function compensatedTable(finding: MatrixFinding): LabelledTable {
  const { goods } = finding.fitted;
  const { compensated, compensatedErrors } = finding.at;
  return {
    name: "compensated-elasticities",
    title: `Compensated price elasticities, at ${withArticle(finding.pointName)}${conditionally(finding)}`,
    corner: "Good by price of",
    columns: goods.map((label) => ({ label })),
    rows: goods.map((label, i) => ({
      label,
      cells: goods.map((_, j) => estimateCell(compensated[i][j], compensatedErrors[i][j], DECIMALS.elasticity)),
    })),
    notes: ["Estimate over (standard error) by the delta method. Row: good; column: price."],
  };
}

/** A point's name as it stands after "at": "the base point", "the sample mean", "row 12". */
export function withArticle(pointName: string): string {
  if (pointName === "mean") return "the sample mean";
  return pointName === "base point" ? "the base point" : pointName;
}
