import { describe, expect, it } from "vitest";
import { elasticitiesAt } from "../../../shared/economics/elasticities.ts";
import {
  comparedCoefficients,
  comparedElasticities,
  comparedTable,
  differenceOf,
  largestDifference,
  onlySide,
  rowsApart,
} from "../../../shared/tables/compared.ts";
import { comparedFit } from "../../../shared/tables/compared-fit.ts";
import { tableCsv } from "../../../shared/tables/csv.ts";
import { tableLatex } from "../../../shared/tables/latex.ts";
import { sampleFitted, sampleSystem } from "../../support/sample-findings.ts";

const base = sampleSystem();
/** The same system without its last good's name and its second demographic. */
const other = {
  ...base,
  fitted: { ...base.fitted, goods: base.fitted.goods.map((good) => (good === "other food" ? "the rest" : good)) },
  coefficients: base.coefficients
    .filter(({ column }) => column !== base.fitted.demographics[1])
    .map((one) => ({
      ...one,
      good: one.good === "other food" ? "the rest" : one.good,
      estimate: one.estimate + 0.001,
    })),
};
const words = { name: "c", title: "C", corner: "", names: ["one", "two"] as const, decimals: 4, notes: [] };

describe("coefficients side by side", () => {
  const compared = comparedCoefficients(base, other);

  it("are matched by name and good, goods of either one among them", () => {
    expect(compared.goods).toEqual([...base.fitted.goods, "the rest"]);
    const constant = compared.rows[0];
    expect(differenceOf(constant.pairs[0])).toBeCloseTo(0.001, 12);
    expect(Object.keys(constant.pairs[5])).toEqual(["left"]);
    expect(Object.keys(constant.pairs[6])).toEqual(["right"]);
    expect(differenceOf(constant.pairs[6])).toBeUndefined();
  });

  it("say which one system alone has", () => {
    const alone = compared.rows.filter((row) => onlySide(row) === "left").map(({ label }) => label);
    expect(alone).toEqual([base.fitted.demographics[1]]);
    expect(compared.rows.some((row) => onlySide(row) === "right")).toBe(false);
    expect(compared.rows.filter(({ isPrice }) => isPrice)).not.toHaveLength(0);
  });

  it("copy as lines of both and their difference", () => {
    const table = comparedTable(compared, words);
    const [first, second, third] = table.rows;
    expect([first, second, third].map(({ label }) => label)).toEqual([
      "Constant, one",
      "Constant, two",
      "Constant, difference",
    ]);
    expect(third.cells[5]).toEqual({ kind: "empty" });
    expect(tableCsv(table)).toContain("Constant, difference");
    expect(tableLatex(table)).toContain("\\toprule");
  });
});

describe("elasticities side by side", () => {
  const point = base.points.base;
  const free = sampleFitted(["homogeneity"]);
  const [ours, theirs] = [base.fitted, free].map((fitted) => ({
    goods: fitted.goods,
    ...elasticitiesAt(fitted, point),
  }));
  const compared = comparedElasticities(ours, theirs);

  it("have expenditure, own price, and every compensated one", () => {
    expect(compared.rows).toHaveLength(3 + base.fitted.goods.length);
    expect(compared.rows[0].pairs[2].left).toEqual({ value: ours.expenditure[2], error: ours.expenditureErrors[2] });
    expect(compared.rows[1].pairs[4].right?.value).toBe(theirs.uncompensated[4][4]);
    expect(compared.rows[3 + 1].pairs[4].left?.value).toBe(ours.compensated[1][4]);
  });

  it("name the good that differs most with both numbers", () => {
    const moved = { ...theirs, expenditure: ours.expenditure.map((one, i) => one + (i === 1 ? 0.2 : 0.01)) };
    const said = largestDifference(comparedElasticities(ours, moved), "Expenditure", ["base", "free"], 3);
    expect(said).toMatch(
      /^The expenditure elasticities differ by 0\.200 at most: dairy, \d\.\d{3} in base and \d\.\d{3} in free\.$/,
    );
    expect(largestDifference(comparedElasticities(ours, ours), "Own price", ["base", "same"], 3)).toBe(
      "The own-price elasticities agree to 3 decimals for every good.",
    );
    expect(largestDifference({ goods: [], rows: [] }, "Expenditure", ["base", "free"], 3)).toBeUndefined();
  });
});

describe("what two systems rest on", () => {
  const named = (name: string, finding: typeof base) => ({ name, finding });

  it("is warned of where the rows or the data differ, and only there", () => {
    expect(rowsApart(named("base", base), named("other", base))).toBeUndefined();
    const fewer = named("other", { ...base, rows: base.rows - 1 });
    expect(rowsApart(named("base", base), fewer)).toMatch(/base rests on 900 rows and other on 899 rows/);
    const elsewhere = named("other", { ...base, dataFingerprint: "f".repeat(64) });
    expect(rowsApart(named("base", base), elsewhere)).toMatch(/different data/);
  });

  it("is in the table of their fit, nothing in the place of what is not stated", () => {
    const { aic: _, ...short } = base;
    const { rows } = comparedFit(base, short, ["base", "short"], []);
    const aic = rows.find(({ label }) => label === "AIC");
    expect(aic?.cells[0].kind === "number" && aic.cells[1]).toEqual(base.aic === undefined ? false : { kind: "empty" });
    expect(rows.filter(({ label }) => label.startsWith("R², "))).toHaveLength(base.fitted.goods.length);
  });
});
