import type { TableColumn, UploadTable } from "../../../../server/engine/columns/prepared-data.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import type { Problem } from "../../../../shared/schemas/problem.ts";

type Values = readonly (number | null)[] | readonly (string | null)[];

const isText = (values: Values): values is readonly (string | null)[] => values.some((one) => typeof one === "string");

export function column(name: string, values: Values): TableColumn {
  if (!isText(values)) return { name, type: "number", values: Float64Array.from(values, (one) => one ?? Number.NaN) };
  const levels = [...new Set(values.filter((one) => one !== null))];
  return {
    name,
    type: "text",
    codes: Int32Array.from(values, (one) => (one === null ? -1 : levels.indexOf(one))),
    levels,
  };
}

/** A table from columns written out; null is an empty cell. */
export function tableOf(columns: Readonly<Record<string, Values>>): UploadTable {
  const [first] = Object.values(columns);
  return {
    name: "survey.csv",
    sha256: "0".repeat(64),
    rows: first.length,
    columns: Object.entries(columns).map(([name, values]) => column(name, values)),
  };
}

/** The problems of what must be refused. */
export function problemsOf(work: () => unknown): readonly Problem[] {
  try {
    work();
  } catch (error) {
    if (error instanceof Refusal) return error.problems;
    throw error;
  }
  throw new Error("not refused");
}
