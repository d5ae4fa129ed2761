import { type SpreadCell, spreadTable } from "./spread.ts";
import type { LabelledTable } from "./table.ts";

/** What a spreadsheet would take for the beginning of a formula when a text cell begins with it. */
const FORMULA_START = /^[=+\-@\t\r\uFF0B\uFF0D\uFF1D\uFF20]/;

/** One CSV field of text (RFC 4180), with anything a spreadsheet would evaluate made inert by an apostrophe. */
export function csvText(text: string): string {
  const inert = FORMULA_START.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(inert) ? `"${inert.replaceAll('"', '""')}"` : inert;
}

/** One CSV field of a number: the shortest digits that read back as the same double, ASCII minus. */
export function csvNumber(value: number): string {
  return Object.is(value, -0) ? "0" : String(value);
}

function csvCell(cell: SpreadCell): string {
  return "number" in cell ? csvNumber(cell.number) : csvText(cell.text);
}

/** Rows of fields as one CSV text, lines ended by CR LF. */
export function csvLines(rows: readonly (readonly string[])[]): string {
  return rows.map((row) => `${row.join(",")}\r\n`).join("");
}

/**
 * A table as CSV at full double precision. The first head names what the table is, in which units and at which
 * point, so that the file says so itself and still is nothing but one head and its rows.
 */
export function tableCsv(table: LabelledTable): string {
  const { head, body } = spreadTable(table);
  const named = [table.title, ...head.slice(1)].map(csvText);
  return csvLines([named, ...body.map((row) => row.map(csvCell))]);
}
