import { describe, expect, test } from "vitest";
import { findAgreements } from "../../../../server/engine/columns/agreements.ts";

const columns = (named: Record<string, number[]>) =>
  Object.entries(named).map(([name, values]) => ({ name, type: "number" as const, values: Float64Array.from(values) }));

describe("where an upload says one thing twice", () => {
  test("price times quantity is held against expenditure, row by row, within 2 %", () => {
    const found = findAgreements(
      columns({
        p_bread: [2, 2, 2, 2, 2, Number.NaN],
        q_bread: [1, 3, 5, 0, 0, 1],
        // Off by nothing, by 1.7 %, by 2.4 %; both nought; spent without buying; no price.
        e_bread: [2, 5.9, 10.25, 0, 1, 2],
        e_total: [9, 9, 9, 9, 9, 9],
      }),
    );
    expect(found).toEqual([{ of: ["p_bread", "q_bread"], times: 1, is: "e_bread", agree: 2, compared: 4 }]);
  });

  test("a difference of units is found where it explains most rows", () => {
    const [found] = findAgreements(
      columns({ price_milk: [120, 130, 110, 90], quantity_milk: [1, 2, 3, 4], milk_expenditure: [1.2, 2.6, 3.3, 3.6] }),
    );
    expect(found).toMatchObject({ is: "milk_expenditure", agree: 4, compared: 4 });
    expect(found.times).toBeCloseTo(0.01, 12);
  });

  test("two quantities of one good are held against one another times the median of their ratio", () => {
    const found = findAgreements(columns({ q_sweet: [2, 4, 6, 1], q_sweet_l: [3, 6, 9, 7], p_sweet: [1, 1, 1, 1] }));
    expect(found).toEqual([{ of: ["q_sweet"], times: 1.5, is: "q_sweet_l", agree: 3, compared: 4 }]);
  });

  test("columns that have nothing to do with one another are left alone, and an empty one agrees in no row", () => {
    expect(findAgreements(columns({ p_bread: [1], q_milk: [1], e_tea: [1], w_bread: [1] }))).toEqual([]);
    const nothing = findAgreements(columns({ p1: [Number.NaN], q1: [1], x1: [1] }));
    expect(nothing).toEqual([{ of: ["p1", "q1"], times: 1, is: "x1", agree: 0, compared: 0 }]);
  });
});
