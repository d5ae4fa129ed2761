import type { Problem } from "../../../shared/schemas/problem.ts";
import { quoteCell } from "./cell-text.ts";
import type { TableColumn } from "./prepared-data.ts";

/** 2029, 2029-03, 2029-03-14, 2029-Q1, 2029-W07, 2029-03-14T09:00: texts whose order is that of time. */
const SORTABLE_DATE = /^\d{4}(-(\d{2}(-\d{2}(T.*)?)?|Q[1-4]|W\d{2}))?$/;

/** Months and quarters counted from year nought, so that the remainder by 12 or 4 is the season. */
const CALENDARS: readonly { readonly written: RegExp; readonly inYear: number }[] = [
  { written: /^(\d{4})-(0[1-9]|1[0-2])$/, inYear: 12 },
  { written: /^(\d{4})-Q([1-4])$/, inYear: 4 },
];

/**
 * Time as numbers that put rows in order: a column of numbers as it is; months and quarters, where all are, counted
 * 12 or 4 a year, so that those absent from the file leave a gap; other dates written year first by their rank among
 * those that occur, beginning with 1.
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
  const ranks = periodsOf(column.levels) ?? ranksOf(column.levels);
  return {
    name: column.name,
    values: Float64Array.from(column.codes, (code) => (code < 0 ? Number.NaN : ranks[code])),
  };
}

function periodsOf(levels: readonly string[]): number[] | undefined {
  const calendar = CALENDARS.find(({ written }) => levels.every((level) => written.test(level)));
  return (
    calendar &&
    levels.map((level) => {
      const [, year, part] = calendar.written.exec(level)!;
      return calendar.inYear * Number(year) + Number(part);
    })
  );
}

function ranksOf(levels: readonly string[]): number[] {
  const rank = new Map([...levels].sort().map((level, at) => [level, at + 1]));
  return levels.map((level) => rank.get(level)!);
}
