import { describe, expect, it } from "vitest";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { columnsRecognised, suggestData, suggestGoods } from "../../../shared/study/suggest.ts";

const columns = (...names: string[]) => names.map((name) => ({ name, type: "number" as const }));

describe("suggestGoods", () => {
  it.each([
    [
      "p_grains e_grains p_dairy e_dairy",
      { grains: { price: "p_grains", expenditure: "e_grains" }, dairy: { price: "p_dairy", expenditure: "e_dairy" } },
    ],
    ["p1 q1 p2 q2", { good1: { price: "p1", quantity: "q1" }, good2: { price: "p2", quantity: "q2" } }],
    ["price_x quantity_x", { x: { price: "price_x", quantity: "quantity_x" } }],
    ["x_price x_expenditure", { x: { price: "x_price", expenditure: "x_expenditure" } }],
    ["quantity_x expenditure_x", { x: { quantity: "quantity_x", expenditure: "expenditure_x" } }],
    ["PriceMeat ExpenditureMeat", { meat: { price: "PriceMeat", expenditure: "ExpenditureMeat" } }],
    [
      "p_sweet_drinks q_sweet_drinks e_sweet_drinks",
      { "sweet drinks": { price: "p_sweet_drinks", expenditure: "e_sweet_drinks" } },
    ],
    ["members urban p_alone", {}],
  ])("reads %s", (names, goods) => {
    expect(suggestGoods(columns(...names.split(" "))).goods).toEqual(goods);
  });

  it("guesses weight, cluster and time", () => {
    const { weight, cluster, time } = suggestGoods([
      ...columns("survey_weight", "month"),
      { name: "village", type: "text" },
    ]);
    expect({ weight, cluster, time }).toEqual({ weight: "survey_weight", cluster: "village", time: "month" });
  });

  it("writes a data cell that parses", () => {
    const source = suggestData("tuna weekly.csv", columns("week", "p1", "q1", "p2", "q2"));
    const { specification, problems } = parseCell("data", source);
    expect(problems).toEqual([]);
    expect(specification).toMatchObject({ upload: "tuna weekly.csv", time: "week" });
  });
});

describe("what is recognised", () => {
  it.each([
    ["price_bread qty_bread price_milk qty_milk", ["bread", "milk"]],
    ["bread.price bread.spend milk.price milk.spend", ["bread", "milk"]],
    ["food_price_bread food_qty_bread food_price_milk food_qty_milk", ["food bread", "food milk"]],
    ["p01 q1 p02 q2", ["good1", "good2"]],
    ["uv_bread exp_bread", ["bread"]],
    ["Price (bread) Expenditure (bread)".replace(/ \((\w+)\)/g, "_$1"), ["bread"]],
    // A column that only begins with a letter of the trade is none.
    ["people eggs quality pension", []],
    // Prices alone, or stems that do not meet, make no good.
    ["p_bread q_milk", []],
  ])("in %s", (names, goods) => {
    expect(Object.keys(suggestGoods(columns(...names.split(" "))).goods)).toEqual(goods);
  });

  it("of shares with a total: expenditures to derive", () => {
    const found = suggestGoods(columns("p_bread", "w_bread", "p_milk", "w_milk", "total"));
    expect(found).toMatchObject({
      goods: {
        bread: { price: "p_bread", expenditure: "spent_bread" },
        milk: { price: "p_milk", expenditure: "spent_milk" },
      },
      derive: { spent_bread: "w_bread * total", spent_milk: "w_milk * total" },
      total: "total",
    });
    expect(columnsRecognised(found)).toBe(4);
    expect(
      parseCell("data", suggestData("a.csv", columns("p_bread", "w_bread", "p_milk", "w_milk", "total"))).problems,
    ).toEqual([]);
    expect(suggestGoods(columns("p_bread", "w_bread")).goods).toEqual({});
  });

  it("as guesses: the total, and who buys", () => {
    const { total, demographics } = suggestGoods(
      columns("p1", "q1", "e_total", "members", "head_age", "urban", "plot"),
    );
    expect([total, demographics]).toEqual(["e_total", ["members", "head_age", "urban"]]);
  });

  it("counts the columns it rests on", () => {
    expect(columnsRecognised(suggestGoods(columns("p1", "q1", "p2", "q2", "p3", "q3", "week")))).toBe(6);
  });
});
