import type { RowsAsked, RowsPage } from "../../../shared/schemas/rows.ts";
import type { TableColumn, UploadTable } from "./prepared-data.ts";

/** A list of rows of an upload with the columns that matter to it. */
export interface RowList {
  /** Rows of the upload, the first being 0; all of them in order when absent. */
  readonly rows?: Int32Array;
  readonly count: number;
  readonly columns: readonly ShownColumn[];
  readonly keep?: RowsPage["keep"];
}

export interface ShownColumn {
  readonly column: TableColumn;
  readonly says?: string;
}

/** Of very wide uploads the first columns are shown; the others are one choice of columns away. */
const MOST_COLUMNS = 200;
const LONGEST_CELL = 200;

export function wholeTable({ rows, columns }: UploadTable): RowList {
  return { count: rows, columns: columns.slice(0, MOST_COLUMNS).map((column) => ({ column })) };
}

export function pageOf({ rows, count: total, columns, keep }: RowList, { from, count }: RowsAsked): RowsPage {
  const page: RowsPage["rows"] = [];
  for (let at = from; at < Math.min(total, from + count); at++) {
    const row = rows ? rows[at] : at;
    page.push({ row: row + 1, cells: columns.map(({ column }) => cellOf(column, row)) });
  }
  return {
    total,
    from,
    columns: columns.map(({ column: { name, type }, says }) => ({ name, type, ...(says && { says }) })),
    rows: page,
    ...(keep && { keep }),
  };
}

function cellOf(column: TableColumn, row: number): number | string | null {
  if (column.type === "number") {
    const value = column.values[row];
    return Number.isFinite(value) ? value : null;
  }
  const code = column.codes[row];
  if (code < 0) return null;
  const text = column.levels[code];
  return text.length > LONGEST_CELL ? `${text.slice(0, LONGEST_CELL)}…` : text;
}
