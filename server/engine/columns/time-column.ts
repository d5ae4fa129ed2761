import type { Problem } from "../../../shared/schemas/problem.ts";
import { quoteCell } from "./cell-text.ts";
import type { TableColumn } from "./prepared-data.ts";

/** 2029, 2029-03, 2029-03-14, 2029-Q1, 2029-W07, 2029-03-14T09:00: texts whose order is that of time. */
const SORTABLE_DATE = /^\d{4}(-(\d{2}(-\d{2}(T.*)?)?|Q[1-4]|W\d{2}))?$/;

/** Ways of writing the period that all dates of a column may share: its number, or undefined where one has none. */
const CALENDARS: readonly ((date: string) => number | undefined)[] = [
  countedBy(/^(\d{4})-(0[1-9]|1[0-2])$/, 12),
  countedBy(/^(\d{4})-Q([1-4])$/, 4),
  // The first of a month stands for the month.
  countedBy(/^(\d{4})-(0[1-9]|1[0-2])-01$/, 12),
  weekOf,
  dayOf,
];

/**
 * Time as numbers that put rows in order: a column of numbers as it is; quarters, months (also by their first day),
 * weeks by the standard or days, where all dates are written so, counted by the calendar, days of one weekday by the
 * week: those absent from the file leave a gap. Other dates, written year first, count by their rank among those that
 * occur, beginning with 1.
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
  for (const periodOf of CALENDARS) {
    const periods = levels.map(periodOf);
    if (!periods.every((period) => period !== undefined)) continue;
    if (periodOf !== dayOf) return periods;
    const weekday = periods[0] % 7;
    return periods.every((day) => day % 7 === weekday) ? periods.map((day) => (day - weekday) / 7) : periods;
  }
  return undefined;
}

/** Counted from year nought, so that the remainder by 12 or 4 is the season. */
function countedBy(written: RegExp, inYear: number): (date: string) => number | undefined {
  return (date) => {
    const match = written.exec(date);
    return match ? inYear * Number(match[1]) + Number(match[2]) : undefined;
  };
}

/** 2029-W07: the week of a Monday, by ISO 8601, where the week with the year's first Thursday is the first. */
function weekOf(date: string): number | undefined {
  const match = /^(\d{4})-W(0[1-9]|[1-4]\d|5[0-3])$/.exec(date);
  if (!match) return undefined;
  const fourth = dayNumber(Number(match[1]), 1, 4);
  return Math.floor((fourth - MONDAY) / 7) + Number(match[2]) - 1;
}

/** 2029-03-14, counted from 1970-01-01; undefined for a day the calendar has not. */
function dayOf(date: string): number | undefined {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(date);
  if (!match) return undefined;
  const [year, month, day] = match.slice(1).map(Number);
  const number = dayNumber(year, month, day);
  return new Date(number * DAY).toISOString().startsWith(date) ? number : undefined;
}

const DAY = 86_400_000;
/** 1970-01-05, the first Monday that is counted. */
const MONDAY = 4;

const dayNumber = (year: number, month: number, day: number) => Date.UTC(year, month - 1, day) / DAY;

function ranksOf(levels: readonly string[]): number[] {
  const rank = new Map([...levels].sort().map((level, at) => [level, at + 1]));
  return levels.map((level) => rank.get(level)!);
}
