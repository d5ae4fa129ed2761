import { spreadTable } from "./spread.ts";
import type { LabelledTable } from "./table.ts";
import { copiedCell } from "./text.ts";

const ENTITIES: Record<string, string> = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;" };

function escapeHtml(text: string): string {
  return text.replace(/[&<>"]/g, (character) => ENTITIES[character]);
}

/** A table as an HTML table for the clipboard: word processors and spreadsheets prefer it to text. */
export function tableHtml(table: LabelledTable): string {
  const { head, body } = spreadTable(table);
  const cells = (tag: string, texts: readonly string[]) =>
    texts.map((text) => `<${tag}>${escapeHtml(text)}</${tag}>`).join("");
  const rows = body.map((row) => {
    const [label, ...rest] = row;
    const figures = rest.map((cell) => {
      const align = "number" in cell ? ' align="right"' : "";
      return `<td${align}>${escapeHtml(copiedCell(cell))}</td>`;
    });
    return `<tr><th align="left">${escapeHtml(copiedCell(label))}</th>${figures.join("")}</tr>`;
  });
  const notes = table.notes.map((note) => `<p>${escapeHtml(note)}</p>`).join("");
  const caption = `<caption>${escapeHtml(table.title)}</caption>`;
  return `<table>${caption}<thead><tr>${cells("th", head)}</tr></thead><tbody>${rows.join("")}</tbody></table>${notes}`;
}
