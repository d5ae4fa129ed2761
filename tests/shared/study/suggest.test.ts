import { describe, expect, it } from "vitest";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { suggestData, suggestGoods } from "../../../shared/study/suggest.ts";

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
