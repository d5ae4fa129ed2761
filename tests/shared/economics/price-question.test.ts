import { describe, expect, it } from "vitest";
import { changedPrice, isTax, newPricesOf, otherChanges } from "../../../shared/economics/price-change/question.ts";
import { unseenPrices } from "../../../shared/economics/price-change/unseen-prices.ts";
import { priceChangeSpecification } from "../../../shared/schemas/price-change.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";

describe("a new price", () => {
  it.each([
    [undefined, 4, 0],
    [{ "per cent": 25 }, 5, 0],
    [{ to: 7 }, 7, 0],
    [{ "per cent": 25, tax: true }, 5, 1],
    [{ "per cent": 25, tax: true, "pass-through": 0.5 }, 5, 2],
    [{ specific: 0.5 }, 4.5, 0.5],
    [{ specific: 0.5, "pass-through": 0.4 }, 4.2, 0.5],
    [{ specific: -0.5 }, 3.5, -0.5],
    [{ specific: 0.5, tax: false }, 4.5, 0],
    [{ "ad valorem": 20 }, 4.8, 0.8],
    // t = τ p/(1 + τ(1 − ρ)) = 0.2 · 4/1.1
    [{ "ad valorem": 20, "pass-through": 0.5 }, 4 + 0.4 / 1.1, 0.8 / 1.1],
  ] as const)("by %j is the buyer's, with the tax in it", (change, price, tax) => {
    const found = changedPrice(change, 4);
    expect(found.price).toBeCloseTo(price, 14);
    expect(found.tax).toBeCloseTo(tax, 14);
  });

  it("holds an ad valorem rate on what the seller receives, and passes on the share it says", () => {
    const { price, tax } = changedPrice({ "ad valorem": 30, "pass-through": 0.7 }, 5);
    expect(tax / (price - tax)).toBeCloseTo(0.3, 14);
    expect((price - 5) / tax).toBeCloseTo(0.7, 14);
  });

  it("reads amounts in the units uploaded", () => {
    expect(changedPrice({ to: 8 }, 1, 4)).toEqual({ price: 2, tax: 0 });
    expect(changedPrice({ specific: 2 }, 1, 4)).toEqual({ price: 1.5, tax: 0.5 });
    const { prices, taxes } = newPricesOf({ prices: { b: { specific: 2 } } }, ["a", "b"], [1, 1], [2, 4]);
    expect([prices, taxes]).toEqual([
      [1, 1.5],
      [0, 0.5],
    ]);
  });

  it("is a tax by its name or where it says so", () => {
    expect([{ specific: 1 }, { "ad valorem": 1 }, { to: 1, tax: true }].every(isTax)).toBe(true);
    expect([{ specific: 1, tax: false }, { to: 1 }, { "per cent": 1 }].some(isTax)).toBe(false);
    expect(otherChanges({ prices: { a: { to: 1 }, b: { specific: 1 } }, expenditure: 2 })).toEqual([
      "the price of a",
      "total expenditure",
    ]);
  });

  it("outside the sample is named with both numbers", () => {
    const range = { low: [1, 1, 1], high: [2, 2, 2] };
    expect(unseenPrices(["a", "b", "c"], [2.5, 2, 0.5], range)).toEqual([
      { good: "a", price: 2.5, bound: 2, side: "above" },
      { good: "c", price: 0.5, bound: 1, side: "below" },
    ]);
  });
});

describe("a specification", () => {
  const parsed = (more: object) =>
    priceChangeSpecification.safeParse({ kind: "price change", system: "base", ...more });
  const told = (more: object) => parsed(more).error?.issues.map(({ path, message }) => `${path.join(".")}: ${message}`);

  it("stands at the mean and changes nothing unless it says otherwise", () => {
    expect(parsed({}).data).toMatchObject({ at: "mean", prices: {}, expenditure: 0, level: 0.95 });
  });

  it("refuses a price that changes in two ways or in none, and pass-through of what is no tax", () => {
    expect(told({ prices: { a: { "per cent": 1, to: 2 } } })).toEqual([
      "prices.a: a price changes by one of per cent, to, ad valorem, specific; per cent and to are given",
    ]);
    expect(told({ prices: { a: { tax: true } } })?.[0]).toContain("none is given");
    expect(told({ prices: { a: { to: 2, "pass-through": 0.5 } } })?.[0]).toContain("add tax: true");
    expect(told({ prices: { a: { "per cent": -100 } } })).toHaveLength(1);
    const { problems } = parseCell("price change", "system: base\nprices: {a: {too: 2}}");
    expect(problems.map(({ sentence }) => sentence)).toEqual(["too is not a key of a: the nearest is to."]);
  });

  it("asks for an equivalence scale where rows are parted by expenditure per equivalent adult", () => {
    const groups = { of: "expenditure per equivalent adult", quantiles: 5 };
    expect(told({ groups })?.[0]).toContain("needs equivalence scale");
    expect(parsed({ groups, "equivalence scale": "adults" }).success).toBe(true);
    expect(parsed({ groups, "equivalence scale": { "square root of": "members" } }).success).toBe(true);
  });
});
