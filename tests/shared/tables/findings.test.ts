import { parse } from "csv-parse/sync";
import { describe, expect, it } from "vitest";
import { coefficientRows, coefficientTable } from "../../../shared/tables/coefficients.ts";
import { covarianceCsv } from "../../../shared/tables/covariance.ts";
import { tableCsv } from "../../../shared/tables/csv.ts";
import { dataDescriptionTable } from "../../../shared/tables/data-description.ts";
import { eigenvalueTable } from "../../../shared/tables/eigenvalues.ts";
import { tableLatex } from "../../../shared/tables/latex.ts";
import { rowAccountingTable } from "../../../shared/tables/row-accounting.ts";
import { compensatedTable, matrixInForm, printEntry, slutskyTable } from "../../../shared/tables/slutsky-matrix.ts";
import { sampleData, sampleSlutsky, sampleSystem } from "../../support/sample-findings.ts";

const slutsky = sampleSlutsky();
const system = sampleSystem();
const data = sampleData();
const { goods } = slutsky.fitted;
const read = (csv: string): string[][] => parse(csv);

describe("the Slutsky matrix as a table", () => {
  it("names form, units and point", () => {
    expect(slutskyTable(slutsky, "share").title).toBe("Slutsky matrix, share form, at the base point");
    expect(slutskyTable(slutsky, "quantity").title).toBe(
      "Slutsky matrix, quantity form in units uploaded, at the base point",
    );
    const elsewhere = { ...slutsky, pointName: "row 12" };
    expect(compensatedTable(elsewhere).title).toBe("Compensated price elasticities, at row 12");
  });

  it.each(["share", "quantity"] as const)("parses back from CSV to the same doubles, %s form", (form) => {
    const [head, ...rows] = read(tableCsv(slutskyTable(slutsky, form)));
    expect(head.slice(2)).toEqual(goods);
    const { entries, errors } = matrixInForm(slutsky, form);
    goods.forEach((good, i) => {
      expect(rows[2 * i].slice(0, 2)).toEqual([good, "estimate"]);
      expect(rows[2 * i].slice(2).map(Number)).toEqual(entries[i]);
      expect(rows[2 * i + 1].slice(0, 2)).toEqual([good, "standard error"]);
      expect(rows[2 * i + 1].slice(2).map(Number)).toEqual(errors[i]);
    });
  });

  it("prints a quantity form in small units by a power of ten in its title", () => {
    const small = {
      ...slutsky,
      at: { ...slutsky.at, quantity: slutsky.at.quantity.map((row) => row.map((s) => s / 1e6)) },
    };
    const shown = matrixInForm(small, "quantity");
    expect(shown.name).toMatch(/× 10⁻⁶$/);
    expect(printEntry(2.5e-8, shown)).toBe("0.0250");
  });
});

describe("eigenvalues as a table", () => {
  it("are largest first, each with its direction in words", () => {
    const table = eigenvalueTable(slutsky);
    expect(table.rows).toHaveLength(goods.length - 1);
    const values = read(tableCsv(table))
      .filter((row) => row[1] === "estimate")
      .map((row) => Number(row[3]));
    expect(values).toEqual(slutsky.at.eigenvalues.map(({ value }) => value));
    expect(tableLatex(table)).toContain("meat \\& fish");
  });
});

describe("coefficients as a table", () => {
  it("have a row a block and column, a cell a good", () => {
    const rows = coefficientRows(system);
    expect(rows.map(({ label }) => label).slice(0, 3)).toEqual(["Constant", "log_size", "urban"]);
    expect(rows).toHaveLength(3 + goods.length + 1);
    expect(rows.at(-1)).toMatchObject({ label: "ln x,", symbol: "β" });
    const urban = rows[2].cells.map((cell) => (cell.kind === "estimate" ? cell.value : undefined));
    expect(urban).toEqual(
      system.coefficients.filter(({ column }) => column === "urban").map(({ estimate }) => estimate),
    );
    expect(coefficientTable(system).notes[0]).toContain("900 rows");
  });

  it("come with their full covariance as CSV, square and equal to the finding's", () => {
    const [head, ...rows] = read(covarianceCsv(system));
    const { theta, covariance } = system.fitted;
    expect(rows).toHaveLength(theta.length);
    expect(head).toHaveLength(theta.length + 5);
    expect(head[5]).toBe("cov: alpha, grains");
    expect(rows.map((row) => Number(row[3]))).toEqual(theta);
    expect(rows.map((row) => row.slice(5).map(Number))).toEqual(covariance);
  });
});

describe("data as tables", () => {
  it("describe every good", () => {
    const [, ...rows] = read(tableCsv(dataDescriptionTable(data)));
    expect(rows.map(([good]) => good)).toEqual(goods);
    expect(rows.map((row) => Number(row[1]))).toEqual(data.goods.map(({ meanShare }) => meanShare));
  });

  it("account for every row: what is taken off adds up to what is left", () => {
    const [, ...rows] = read(tableCsv(rowAccountingTable(data.accounting)));
    const numbers = rows.map((row) => Number(row[1]));
    const used = numbers.pop();
    expect(numbers.reduce((sum, number) => sum + number, 0)).toBe(used);
    expect(numbers.slice(1).every((number) => number < 0)).toBe(true);
  });
});

describe("what is said of demographics and of one row", () => {
  it("shifts of committed quantities are named as such in the linear expenditure system alone", () => {
    const coefficients = [
      { block: "demographic", symbol: "c", good: goods[0], column: "size", estimate: 1, standardError: 0.1 },
    ];
    const labelIn = (form: "les" | "aids") =>
      coefficientRows({ ...system, coefficients, fitted: { ...system.fitted, form } })[0].label;
    expect(labelIn("les")).toBe("size, shifts c");
    expect(labelIn("aids")).toBe("size");
  });

  it("one row is told as one", () => {
    expect(coefficientTable({ ...system, rows: 1 }).notes?.[0]).toMatch(/ 1 row, /);
    const one = { ...data, accounting: { ...data.accounting, used: 1 } };
    expect(dataDescriptionTable(one).title).toMatch(/over 1 row used, /);
  });
});
