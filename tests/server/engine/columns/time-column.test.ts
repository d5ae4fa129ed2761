import { describe, expect, test } from "vitest";
import type { TableColumn } from "../../../../server/engine/columns/prepared-data.ts";
import { timeValues } from "../../../../server/engine/columns/time-column.ts";
import type { Problem } from "../../../../shared/schemas/problem.ts";

function column(...dates: string[]): TableColumn {
  const levels = [...new Set(dates)];
  return { name: "when", type: "text", levels, codes: Int32Array.from(dates, (date) => levels.indexOf(date)) };
}

const periods = (...dates: string[]) => {
  const problems: Problem[] = [];
  const values = timeValues(column(...dates), problems)?.values;
  expect(problems).toEqual([]);
  return Array.from(values!);
};
/** Each period less the first. */
const since = (...dates: string[]) => periods(...dates).map((period, _, all) => period - all[0]);

describe("time from dates", () => {
  test("quarters and months count by the calendar, absent ones leaving gaps", () => {
    expect(periods("2029-Q4", "2030-Q1", "2030-Q4").map((period) => period % 4)).toEqual([0, 1, 0]);
    expect(since("2029-11", "2030-02", "2031-02")).toEqual([0, 3, 15]);
    expect(since("2029-11-01", "2029-12-01", "2030-02-01")).toEqual([0, 1, 3]);
  });

  test("weeks follow one another over the end of a year, with 52 or 53 in it", () => {
    // By ISO 8601, 2026 has 53 weeks and 2029 has 52.
    expect(since("2026-W52", "2026-W53", "2027-W01")).toEqual([0, 1, 2]);
    expect(since("2029-W52", "2030-W01", "2030-W03")).toEqual([0, 1, 3]);
  });

  test("days count by the calendar, those of one weekday by the week", () => {
    expect(since("2028-02-28", "2028-02-29", "2028-03-01", "2028-03-05")).toEqual([0, 1, 2, 6]);
    expect(since("2029-01-03", "2029-01-10", "2029-01-24")).toEqual([0, 1, 3]);
    // Monday, 1 January 2029, is the first day of the first week.
    expect(periods("2029-W01", "2029-W02")).toEqual(periods("2029-01-01", "2029-01-08"));
  });

  test("dates written in several ways, or that no calendar has, count by their rank", () => {
    expect(periods("2029", "2029-03", "2029-03-14T09:00")).toEqual([1, 2, 3]);
    expect(periods("2029-02-30", "2029-02-28")).toEqual([2, 1]);
  });

  test("what is no date is refused with its row", () => {
    const problems: Problem[] = [];
    expect(timeValues(column("2029-03", "spring"), problems)).toBeUndefined();
    expect(problems[0]).toMatchObject({ key: ["time"], row: 2, column: "when" });
  });
});
