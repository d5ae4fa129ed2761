import { describe, expect, test } from "vitest";
import { prepareData } from "../../../../server/engine/columns/prepare.ts";
import { rowsAbout } from "../../../../server/engine/columns/rows-about.ts";
import { pageOf, wholeTable } from "../../../../server/engine/columns/rows-page.ts";
import type { DataSpecification } from "../../../../shared/schemas/data.ts";
import { rowsPage } from "../../../../shared/schemas/rows.ts";
import { problemsOf, tableOf } from "./tables.ts";

const ROWS = 200;
const each = <T>(value: (row: number) => T) => Array.from({ length: ROWS }, (_, row) => value(row));
const wave = (row: number, period: number) => 1 + 0.1 * Math.sin((2 * Math.PI * row) / period);

/** Two goods in ten villages; row 44 has a price nine times its village's, row 8 one of a wrong unit, rows 1 to 4 no grains. */
const table = tableOf({
  household: each((row) => `h${row + 1}`),
  p_grains: each((row) => (row === 43 ? 9 : row === 7 ? 0.01 : wave(row, 7))),
  q_grains: each((row) => (row < 4 ? 0 : 10)),
  "p meat": each((row) => (row === 60 ? null : wave(row, 11))),
  e_meat: each((row) => (row === 70 ? -1 : 10)),
  village: each((row) => row % 10),
  members: each((row) => 1 + (row % 14)),
});
const specification: DataSpecification = {
  kind: "data",
  upload: "survey.csv",
  goods: { grains: { price: "p_grains", quantity: "q_grains" }, meat: { price: "p meat", expenditure: "e_meat" } },
  cluster: "village",
  keep: "members <= 12",
  normalise: "mean",
};
const data = prepareData(specification, table);
const look = (key: string, asked = { from: 0, count: 200 }) =>
  rowsPage.parse(
    pageOf(
      rowsAbout(key, specification, table, () => data),
      asked,
    ),
  );
const rowsOf = (key: string) => look(key).rows.map(({ row }) => row);

describe("every list that a flag offers", () => {
  test("has as many rows as the flag says, and all of them used", () => {
    const parts = data.finding.flags.flatMap(({ parts: all }) => all ?? []);
    expect(parts.map(({ words }) => words)).toEqual(["grains", "grains", "grains"]);
    const used = new Set(data.rowNumbers);
    for (const { key, count } of parts) {
      const { total, rows } = look(key);
      expect([total, rows.length]).toEqual([count, count]);
      expect(rows.every(({ row }) => used.has(row))).toBe(true);
    }
  });

  test("comes a page at a time, with the columns that matter", () => {
    const page = look('["zeros","grains"]', { from: 1, count: 2 });
    expect(page).toMatchObject({ total: 4, from: 1 });
    expect(page.columns).toEqual([
      { name: "household", type: "text" },
      { name: "p_grains", type: "number", says: "price of grains" },
      { name: "q_grains", type: "number", says: "quantity of grains" },
      { name: "village", type: "number", says: "cluster" },
    ]);
    expect(page.rows.map(({ row, cells }) => [row, cells[0], cells[2]])).toEqual([
      [2, "h2", 0],
      [3, "h3", 0],
    ]);
    expect(page.keep).toEqual({ expression: "q_grains > 0", leavesOut: 4 });
  });

  test("of outliers has the furthest first, with a condition that leaves out just them", () => {
    const { rows, columns, keep } = look('["outliers","grains"]');
    expect(rows.map(({ row }) => row)).toEqual([8, 44]);
    expect(columns.at(-1)).toMatchObject({ name: "price ÷ median", says: "over the median of its village" });
    expect(rows[1].cells.at(-1)).toBeCloseTo(9, 0);
    expect(keep?.leavesOut).toBe(2);
    const kept = prepareData({ ...specification, keep: `members <= 12 and ${keep?.expression}` }, table);
    expect(kept.finding.accounting.used).toBe(data.finding.accounting.used - 2);
    expect(rowsOf('["unit values","grains"]')).toEqual([8]);
  });

  test("of two prices that move together begins where they part", () => {
    const together = tableOf({
      p1: each((row) => wave(row, 7)),
      q1: each(() => 1),
      p2: each((row) => wave(row, 7) ** 2 * (row === 30 ? 1.2 : 1)),
      q2: each(() => 1),
    });
    const pair: DataSpecification = {
      kind: "data",
      upload: "x",
      goods: { a: { price: "p1", quantity: "q1" }, b: { price: "p2", quantity: "q2" } },
      normalise: "mean",
    };
    const prepared = prepareData(pair, together);
    const flag = prepared.finding.flags.find(({ about }) => about === "collinearity");
    expect(flag?.sentence).toMatch(/^Log prices of a and b correlate by 0\.9\d\d: .* The condition number .* is \d/);
    const [{ key }] = flag?.parts ?? [];
    expect(
      pageOf(
        rowsAbout(key, pair, together, () => prepared),
        { from: 0, count: 1 },
      ),
    ).toMatchObject({ total: ROWS, rows: [{ row: 31 }] });
  });

  test("of few different prices has those at the commonest", () => {
    const tariffs = tableOf({
      p1: each((row) => (row % 4 === 0 ? 2 : 3)),
      q1: each(() => 1),
      p2: each((row) => wave(row, 9)),
      q2: each(() => 1),
    });
    const two: DataSpecification = {
      kind: "data",
      upload: "x",
      goods: { a: { price: "p1", quantity: "q1" }, b: { price: "p2", quantity: "q2" } },
      normalise: "mean",
    };
    const prepared = prepareData(two, tariffs);
    const flag = prepared.finding.flags.find(({ about }) => about === "price variation");
    expect(flag?.sentence).toMatch(/Different prices: a only 2\.$/);
    expect(flag?.parts).toEqual([{ key: '["price variation","a"]', words: "a at its commonest price", count: 150 }]);
  });
});

describe("rows left out", () => {
  test("are all there, reason by reason, with every column named", () => {
    for (const { reason, count } of data.finding.accounting.leftOut) {
      expect(look(JSON.stringify(["left out", reason])).total).toBe(count);
    }
    const page = look('["left out","missing value"]');
    expect(page.rows).toMatchObject([{ row: 61 }]);
    const at = page.columns.findIndex(({ name }) => name === "p meat");
    expect(page.rows[0].cells[at]).toBeNull();
    expect(page.columns.map(({ name }) => name)).toContain("members");
  });
});

test("an upload is looked at from any row on", () => {
  const page = pageOf(wholeTable(table), { from: 198, count: 50 });
  expect(page).toMatchObject({
    total: ROWS,
    rows: [{ row: 199, cells: ["h199", expect.any(Number), 10, expect.any(Number), 10, 8, 3] }, { row: 200 }],
  });
  expect(pageOf(wholeTable(table), { from: 500, count: 50 }).rows).toEqual([]);
});

test.each(["nonsense", "[]", '["zeros"]', '["zeros","wine"]', '["left out","a whim"]', '["zeros",1]', "{}"])(
  "nothing is found under %s, and that is said",
  (key) => {
    expect(problemsOf(() => look(key))).toHaveLength(1);
  },
);
