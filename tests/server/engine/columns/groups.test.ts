import { describe, expect, test } from "vitest";
import { groupsOf } from "../../../../server/engine/columns/groups.ts";
import { prepareData } from "../../../../server/engine/columns/prepare.ts";
import { dataSpecification } from "../../../../shared/schemas/data.ts";
import { problemsOf, tableOf } from "./tables.ts";

const ROWS = 8;
const filled = (value: number) => Array.from({ length: ROWS }, () => value);

function prepared(village: (string | null)[], specification: object = {}) {
  const table = tableOf({
    p_grains: filled(2),
    q_grains: filled(5),
    p_meat: filled(4),
    e_meat: filled(10),
    region: [3, 1, 3, 2, 1, 1, 2, 3],
    age: [30, null, 3, 2, 1, 1, 2, 3],
    note: ["a", "b", "c", "d", "e", "f", "g", "h"],
    village,
  });
  const goods = {
    Grains: { price: "p_grains", quantity: "q_grains" },
    Meat: { price: "p_meat", expenditure: "e_meat" },
  };
  return prepareData(dataSpecification.parse({ kind: "data", upload: "survey.csv", goods, ...specification }), table);
}

const VILLAGES = ["Vosk", "Anrel", "Vosk", "Bel", "Anrel", "Anrel", "Bel", "Vosk"];
const KEY = ["groups"];

describe("rows grouped by a column", () => {
  test("a text by its labels, a number by its values, in ascending order", () => {
    const data = prepared(VILLAGES);
    const text = groupsOf(data, "village", KEY);
    expect(text.labels).toEqual(["Anrel", "Bel", "Vosk"]);
    expect([...text.codes].map((code) => text.labels[code])).toEqual(VILLAGES);
    const numbers = groupsOf(data, "region", KEY);
    expect(numbers.labels).toEqual(["1", "2", "3"]);
    expect([...numbers.codes]).toEqual([2, 0, 2, 1, 0, 0, 1, 2]);
  });

  test("labels of rows left out are gone", () => {
    const data = prepared(VILLAGES, { keep: "region < 3" });
    expect(groupsOf(data, "village", KEY).labels).toEqual(["Anrel", "Bel"]);
  });

  test("an empty cell is refused with how many and the first row, under its key", () => {
    const data = prepared(["Vosk", null, "Vosk", "Bel", "Anrel", "Anrel", null, "Vosk"], { keep: "region < 3" });
    expect(problemsOf(() => groupsOf(data, "village", KEY))).toMatchObject([
      { key: KEY, column: "village", row: 2, sentence: expect.stringContaining("no value in 2 of the 5 rows used") },
    ]);
    expect(problemsOf(() => groupsOf(data, "age", KEY))).toMatchObject([
      { row: 2, sentence: expect.stringContaining("no value in 1 of the 5 rows") },
    ]);
  });

  test("a text of the row's own is kept as the cluster of the data only", () => {
    expect(problemsOf(() => groupsOf(prepared(VILLAGES), "note", KEY))).toMatchObject([
      { sentence: expect.stringContaining("8 different values in 8 rows") },
    ]);
    expect(groupsOf(prepared(VILLAGES, { cluster: "note" }), "note", KEY).labels).toHaveLength(8);
  });

  test("an unknown name is refused with the nearest", () => {
    expect(problemsOf(() => groupsOf(prepared(VILLAGES), "vilage", KEY))).toMatchObject([{ nearest: "village" }]);
    expect(problemsOf(() => groupsOf(prepared(VILLAGES), "p_meat", KEY))).toHaveLength(1);
  });

  test("the labels enter the fingerprint of the data", () => {
    const other = VILLAGES.map((name) => (name === "Bel" ? "Cor" : name));
    expect(prepared(other).fingerprint).not.toBe(prepared(VILLAGES).fingerprint);
    expect(prepared([...VILLAGES]).fingerprint).toBe(prepared(VILLAGES).fingerprint);
  });
});
