/** A finding's table, once, as labelled rows: every way of showing or copying it reads this. */

export type TableCell =
  | { readonly kind: "empty" }
  | { readonly kind: "text"; readonly text: string }
  | { readonly kind: "number"; readonly value: number; readonly printed: string; readonly unit?: string }
  | {
      readonly kind: "estimate";
      readonly value: number;
      readonly printed: string;
      readonly standardError: number;
      readonly printedError: string;
      /** "−0.014 to 0.002", where a bootstrap gives one. */
      readonly printedInterval?: string;
    };

export interface TableColumn {
  readonly label: string;
  readonly unit?: string;
}

export interface TableRow {
  readonly label: string;
  /** Mathematics beside the label: "α", "ln x". */
  readonly symbol?: string;
  readonly cells: readonly TableCell[];
  readonly total?: boolean;
}

export interface LabelledTable {
  /** Stem of a file's name: letters, digits and hyphens. */
  readonly name: string;
  /** What it is, in which units, at which point. */
  readonly title: string;
  /** Head of the column of row heads. */
  readonly corner: string;
  readonly columns: readonly TableColumn[];
  readonly rows: readonly TableRow[];
  /** Sentences that belong under it: what the parentheses are, units, where evaluated. */
  readonly notes: readonly string[];
}

/** The head of a column in one line, unit included. */
export function columnHead(column: TableColumn): string {
  return column.unit === undefined ? column.label : `${column.label}, ${column.unit}`;
}

/** The head of a row in one line, symbol included. */
export function rowHead(row: TableRow): string {
  return row.symbol === undefined ? row.label : `${row.label} ${row.symbol}`;
}

export function hasEstimates(row: TableRow): boolean {
  return row.cells.some((cell) => cell.kind === "estimate");
}
