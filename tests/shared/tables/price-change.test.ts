import { beforeAll, describe, expect, it } from "vitest";
import { runPriceChange, runSystem } from "../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../server/engine/columns/prepared-data.ts";
import { priceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { QUOTABLE } from "../../../shared/study/quotable.ts";
import { plainDigits, printPercent, printQuantity } from "../../../shared/tables/numbers.ts";
import { priceChangeTables } from "../../../shared/tables/price-change.ts";
import { priceChangeNotes, priceChangeSentence, WELFARE_CAUTION } from "../../../shared/tables/price-change-words.ts";
import { quoteOf } from "../../../shared/tables/quoted/quote.ts";
import { specificationOf, tunaWeeks } from "../../support/tuna.ts";

let data: PreparedData;
let ask: (keys: string, form?: string) => ReturnType<typeof runPriceChange>;
beforeAll(async () => {
  data = await tunaWeeks("time: week\nderive: {late: 'week > 395'}");
  const les = runSystem(specificationOf("system", "data: d\nform: les\n"), data);
  const linear = runSystem(
    specificationOf("system", "data: d\nform: la-aids\nimpose: [homogeneity, symmetry]\n"),
    data,
  );
  ask = (keys, form = "les") =>
    runPriceChange(specificationOf("price change", `system: s\n${keys}\n`), form === "les" ? les : linear, data);
});

const FIFTHS = "groups: {of: total expenditure, quantiles: 5}";
const plainly = (text: string) => text.replaceAll("\u2009", " ");

describe("the sentence of a price change", () => {
  it("says what changes, what it takes to live as well as before, and of whom it takes most", () => {
    const finding = ask(`prices: {brand1: {ad valorem: 20}, brand2: {per cent: -5}, brand3: {to: 2}}\n${FIFTHS}`);
    const { at, incidence } = finding;
    const { value, error } = at.welfare!.compensating;
    const share = (of: { welfareShare?: { compensating: { value: number } } }) =>
      printPercent(of.welfareShare!.compensating.value);
    expect(priceChangeSentence(finding)).toBe(
      `With ${plainly("a 20.0 % tax on brand1, brand2 5.0 % cheaper and brand3 at 2.00").replaceAll(" %", "\u2009%")}, ${printQuantity(value, "money")} (${printQuantity(error, "money")}), ${printPercent(value / at.totalBefore)} of expenditure, more is needed at the sample mean to live as well as before. Over all rows it takes ${share(incidence!.all)} of expenditure, ${share(incidence!.groups[0])} in the lowest fifth and ${share(incidence!.groups[4])} in the highest fifth.`,
    );
  });

  it("speaks of subsidies, of less that is enough, and of money", () => {
    const cheaper = plainly(priceChangeSentence(ask("prices: {brand1: {specific: -0.1}}\nexpenditure: 3")));
    expect(cheaper).toContain("a subsidy of 0.10 on brand1 and total expenditure 3.0 % higher");
    expect(cheaper).toContain("less is enough at the sample mean");
    expect(priceChangeSentence(ask("prices: {}"))).toBe("No price changes: there is nothing to bear.");
  });

  it("says so where there is no cost function", () => {
    const finding = ask("prices: {brand1: {per cent: 10}}", "linear");
    expect(priceChangeSentence(finding)).toContain("to live as well as before, to second order.");
    expect(priceChangeNotes(finding).join(" ")).toContain(
      "No exact welfare: The linear approximate system has no cost function",
    );
  });
});

describe("the notes", () => {
  it("begin with the caution, in every case", () => {
    for (const keys of ["prices: {}", "prices: {brand1: {per cent: 10}}"]) {
      expect(priceChangeNotes(ask(keys))[0]).toBe(WELFARE_CAUTION);
    }
  });

  it("name prices nobody paid with both numbers, few rows, and shares that leave 0 to 1", () => {
    const finding = ask("prices: {brand1: {per cent: 150}}\ngroups: {of: late}");
    const told = priceChangeNotes(finding).join(" ");
    const [{ price, bound }] = finding.unseen;
    expect(told).toContain(
      `The new price of brand1, ${printQuantity(price, "money")}, is above every price in the sample, which go up to ${printQuantity(bound, "money")}: the system is not known there.`,
    );
    expect(told).toContain("Fewer than 30 rows: late = 1, ");
    expect(told).toMatch(/New prices lie outside the sample’s: of brand1 in \d+ rows, up to/);
    const { outside } = finding.incidence!.all;
    if (outside.household > 0)
      expect(told).toContain(`In ${outside.household} rows what the household would buy leaves 0 to 1`);
    expect(outside.household + outside.system).toBeGreaterThan(0);
    expect(told).toContain("stand in the means as they are");
  });
});

describe("the tables", () => {
  it("hold the finding's numbers as printed", () => {
    const finding = ask(`prices: {brand1: {ad valorem: 5}}\n${FIFTHS}`);
    expect(priceChangeFinding.parse(JSON.parse(JSON.stringify(finding)))).toEqual(finding);
    const tables = priceChangeTables(finding);
    expect(tables.map(({ name }) => name)).toEqual([
      "price-change-hicks",
      "price-change-slutsky",
      "price-change-infinitesimal",
      "price-change-welfare",
      "price-change-incidence",
    ]);
    for (const table of tables) {
      for (const row of table.rows) expect(row.cells).toHaveLength(table.columns.length);
      expect(table.notes[0]).toBe(WELFARE_CAUTION);
    }
    const [hicks, , , welfare, incidence] = tables;
    const [, , before, substitution, income, both] = hicks.rows[0].cells.map((cell) =>
      "value" in cell ? cell.value : Number.NaN,
    );
    expect(substitution + income).toBeCloseTo(both, 8);
    expect(before).toBe(finding.at.quantities.before.values[0]);
    const marginal = welfare.rows.find(({ label }) => label === "Marginal cost of funds")!.cells[0];
    if (marginal.kind !== "estimate") throw new Error("no estimate");
    expect(Number(plainDigits(marginal.printed))).toBeCloseTo(finding.at.tax!.marginalCost!.value, 4);
    expect(incidence.rows.map(({ label }) => label)).toEqual([
      ...["lowest", "second", "third", "fourth", "highest"].map((which) => `${which} fifth`),
      "all rows",
    ]);
    expect(incidence.rows[5].total).toBe(true);
  });
});

describe("numbers to quote", () => {
  it("are at the point, or of a group where one is named", () => {
    const finding = ask(`prices: {brand1: {ad valorem: 5}}\n${FIFTHS}`);
    const quoted = (...words: string[]) => {
      const answer = quoteOf(finding, words[0], words.slice(1));
      return "absent" in answer ? answer.absent : `${answer.printed} | ${answer.says}`;
    };
    const money = (value: number) => printQuantity(value, "money");
    const { at, incidence } = finding;
    expect(quoted("ev", "alone")).toBe(
      `${money(at.welfare!.equivalent.value)} | equivalent variation at the sample mean`,
    );
    expect(quoted("ev", "Lowest fifth", "alone")).toBe(
      `${money(incidence!.groups[0].welfare!.equivalent.value)} | equivalent variation of lowest fifth`,
    );
    expect(quoted("revenue", "all rows", "error")).toBe(
      `${money(incidence!.all.tax!.revenue.error)} | revenue of all rows`,
    );
    expect(quoted("cv share", "alone")).toContain(
      printQuantity(at.welfare!.compensating.value / at.totalBefore, "share"),
    );
    expect(quoted("substitution", "brand1", "alone")).toBe(
      `${printQuantity(at.hicks!.substitution.values[0], "elasticity")} | substitution effect on the quantity of brand1 at the sample mean`,
    );
    expect(quoted("rows", "lowest fifth")).toBe(`${incidence!.groups[0].rows} | rows of lowest fifth`);
    expect(quoted("cv", "richest")).toContain("It has no group richest: there are lowest fifth,");
    expect(quoted("change", "brand9")).toContain("It has no good brand9");
  });

  it("are each answered, or it is said why not", () => {
    const findings = [ask("prices: {brand1: {ad valorem: 5}}"), ask("prices: {brand1: {to: 1}}", "linear")];
    for (const finding of findings) {
      for (const { word, needs } of QUOTABLE["price change"]) {
        const answer = quoteOf(finding, word, needs === "good" ? ["brand1"] : []);
        expect("absent" in answer ? answer.absent : answer.printed, word).toMatch(/\S/);
        if (finding.fitted.form === "les") expect(answer, word).not.toHaveProperty("absent");
      }
    }
    expect(quoteOf(findings[1], "cv", [])).toEqual({ absent: expect.stringContaining("no cost function") });
    expect(quoteOf(findings[1], "revenue", [])).toHaveProperty("absent");
  });
});
