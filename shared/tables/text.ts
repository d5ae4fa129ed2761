import { plainDigits } from "./numbers.ts";
import { type SpreadCell, spreadTable } from "./spread.ts";
import type { LabelledTable } from "./table.ts";

/** A cell of a copied table: digits as shown, written so that a spreadsheet takes them for the number they are. */
export function copiedCell(cell: SpreadCell): string {
  return "number" in cell ? plainDigits(cell.printed) : cell.text.replace(/[\t\r\n]+/g, " ");
}

/** A table as tab-separated text: title, heads, rows, notes. */
export function tableText(table: LabelledTable): string {
  const { head, body } = spreadTable(table);
  const lines = [[table.title], head, ...body.map((row) => row.map(copiedCell)), ...table.notes.map((note) => [note])];
  return `${lines.map((line) => line.join("\t")).join("\n")}\n`;
}
