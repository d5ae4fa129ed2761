import { type RowsPage, rowsPage } from "../../shared/schemas/rows.ts";

export function presentRows({ total, from, columns, rows, keep }: RowsPage): RowsPage {
  return rowsPage.parse({ total, from, columns, rows, ...(keep && { keep }) });
}
