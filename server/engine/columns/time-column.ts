import type { Problem } from "../../../shared/schemas/problem.ts";
import { quoteCell } from "./cell-text.ts";
import type { TableColumn } from "./prepared-data.ts";

/** 2029, 2029-03, 2029-03-14, 2029-Q1, 2029-W07, 2029-03-14T09:00: texts whose order is that of time. */
const SORTABLE_DATE = /^\d{4}(-(\d{2}(-\d{2}(T.*)?)?|Q[1-4]|W\d{2}))?$/;

/**
 * Time as numbers that put rows in order: a column of numbers as it is, dates written year first by their rank
 * among those that occur, beginning with 1.
 */
export function timeValues(
  column: TableColumn,
  problems: Problem[],
): { readonly name: string; readonly values: Float64Array } | undefined {
  if (column.type === "number") return column;
  const odd = column.levels.find((level) => !SORTABLE_DATE.test(level));
  if (odd !== undefined) {
    const row = column.codes.indexOf(column.levels.indexOf(odd)) + 1;
    problems.push({
      sentence: `${column.name} is to be the time, numbers or dates such as 2029-03, and row ${row} has ${quoteCell(odd)}.`,
      key: ["time"],
      row,
      column: column.name,
    });
    return undefined;
  }
  const rank = new Map([...column.levels].sort().map((level, at) => [level, at + 1]));
  const ranks = column.levels.map((level) => rank.get(level)!);
  return {
    name: column.name,
    values: Float64Array.from(column.codes, (code) => (code < 0 ? Number.NaN : ranks[code])),
  };
}
