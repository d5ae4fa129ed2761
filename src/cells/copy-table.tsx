import { useState } from "react";
import { tableCsv } from "../../shared/tables/csv.ts";
import { tableHtml } from "../../shared/tables/html.ts";
import { tableLatex } from "../../shared/tables/latex.ts";
import type { LabelledTable } from "../../shared/tables/table.ts";
import { tableText } from "../../shared/tables/text.ts";
import { saveFile } from "../lib/save-file.ts";

export type Way = "table" | "LaTeX" | "CSV";

/** Puts a table on the clipboard: as a table (HTML beside tab-separated text), as LaTeX or as CSV. */
export async function copyTable(table: LabelledTable, way: Way): Promise<void> {
  if (way === "LaTeX") return navigator.clipboard.writeText(tableLatex(table));
  if (way === "CSV") return navigator.clipboard.writeText(tableCsv(table));
  const text = tableText(table);
  if (typeof ClipboardItem === "undefined") return navigator.clipboard.writeText(text);
  const item = new ClipboardItem({
    "text/plain": new Blob([text], { type: "text/plain" }),
    "text/html": new Blob([tableHtml(table)], { type: "text/html" }),
  });
  return navigator.clipboard.write([item]);
}

const WAYS: readonly Way[] = ["table", "LaTeX", "CSV"];

/** The three ways of copying a table and the file of it, as words; what was copied, or why not, is said beside them. */
export function CopyTable({ table }: { table: LabelledTable }) {
  const [said, setSaid] = useState("");
  const copy = async (way: Way) => {
    try {
      await copyTable(table, way);
      setSaid(`Copied as ${way}`);
    } catch {
      setSaid("The browser does not let this page write to the clipboard");
    }
  };
  return (
    <div className="flex flex-wrap items-baseline gap-x-4 text-[0.8125rem]/[1.5rem] text-ink2 print:hidden">
      <span>Copy as</span>
      {WAYS.map((way) => (
        <button
          key={way}
          type="button"
          aria-label={`Copy as ${way}: ${table.title}`}
          onClick={() => void copy(way)}
          className="word"
        >
          {way}
        </button>
      ))}
      <button
        type="button"
        aria-label={`Download as CSV: ${table.title}`}
        onClick={() => saveFile(`${table.name}.csv`, new Blob([tableCsv(table)], { type: "text/csv;charset=utf-8" }))}
        className="word"
      >
        Download CSV
      </button>
      <span role="status" className="empty:-ml-4">
        {said}
      </span>
    </div>
  );
}
