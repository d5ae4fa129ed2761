import type { RowAccounting } from "../schemas/data.ts";
import { printCount } from "./numbers.ts";
import type { LabelledTable, TableRow } from "./table.ts";

/** What row accounting needs of a finding; a sealed copy has no rows and no strip. */
export interface Accounting {
  readonly uploaded: number;
  readonly leftOut: readonly Pick<RowAccounting["leftOut"][number], "label" | "count">[];
  readonly used: number;
}

function count(label: string, value: number, total = false): TableRow {
  return { label, total, cells: [{ kind: "number", value, printed: printCount(value) }] };
}

/** Rows uploaded, what is taken off with a minus, and the rows used. */
export function rowAccountingTable(accounting: Accounting): LabelledTable {
  return {
    name: "row-accounting",
    title: "Row accounting",
    corner: "Rows",
    columns: [{ label: "Number" }],
    rows: [
      count("Rows uploaded", accounting.uploaded),
      ...accounting.leftOut.filter((reason) => reason.count > 0).map((reason) => count(reason.label, -reason.count)),
      count("Rows used", accounting.used, true),
    ],
    notes: [],
  };
}
