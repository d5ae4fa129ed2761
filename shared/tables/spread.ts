import { columnHead, hasEstimates, type LabelledTable, rowHead, type TableCell } from "./table.ts";

/** A table as rows of plain strings, standard errors on a row of their own. */
export interface SpreadTable {
  readonly head: readonly string[];
  readonly body: readonly (readonly SpreadCell[])[];
}

export type SpreadCell = { readonly text: string } | { readonly number: number; readonly printed: string };

const NOTHING: SpreadCell = { text: "" };

function estimateOf(cell: TableCell): SpreadCell {
  if (cell.kind === "text") return { text: cell.text };
  if (cell.kind === "empty") return NOTHING;
  return { number: cell.value, printed: cell.printed };
}

function errorOf(cell: TableCell): SpreadCell {
  return cell.kind === "estimate" ? { number: cell.standardError, printed: cell.printedError } : NOTHING;
}

/**
 * Lays a table out for a spreadsheet. Standard errors get a row each and a column that names the figure:
 * in parentheses below their estimates a spreadsheet would read them as negative numbers.
 */
export function spreadTable(table: LabelledTable): SpreadTable {
  const withErrors = table.rows.some(hasEstimates);
  const figure = (name: string): SpreadCell[] => (withErrors ? [{ text: name }] : []);
  const body = table.rows.flatMap((row) => {
    const label = { text: rowHead(row) };
    const estimates = [label, ...figure(hasEstimates(row) ? "estimate" : ""), ...row.cells.map(estimateOf)];
    return hasEstimates(row)
      ? [estimates, [label, ...figure("standard error"), ...row.cells.map(errorOf)]]
      : [estimates];
  });
  const head = [table.corner, ...(withErrors ? ["figure"] : []), ...table.columns.map(columnHead)];
  return { head, body };
}
