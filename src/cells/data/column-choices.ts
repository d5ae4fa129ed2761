import type { Upload } from "../../../shared/schemas/resources.ts";
import { printPercent } from "../../../shared/tables/numbers.ts";
import type { Choice } from "../form/fields.tsx";

type Column = Upload["columns"][number];

/** A column with what helps to choose it: how often it is nought, how often missing. */
function describe(column: Column, rows: number): string {
  const notes = [
    column.type === "text" ? "text" : "",
    column.zeros ? `${printPercent(column.zeros / rows)} zero` : "",
    column.missing ? `${printPercent(column.missing / rows)} missing` : "",
  ].filter(Boolean);
  return notes.length === 0 ? column.name : `${column.name} (${notes.join(", ")})`;
}

/** The columns a key may name, in the order of the file, then the derived ones. */
export function columnChoices(upload: Upload | undefined, derived: readonly string[], numbersOnly: boolean): Choice[] {
  const columns = upload?.columns.filter((column) => !numbersOnly || column.type === "number") ?? [];
  return [
    ...columns.map((column) => ({
      value: column.name,
      label: describe(column, upload?.rows || 1),
      chosen: column.name,
    })),
    ...derived.map((name) => ({ value: name, label: `${name} (derived)`, chosen: name })),
  ];
}
