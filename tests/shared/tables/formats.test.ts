import { parse } from "csv-parse/sync";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { estimateCell, numberCell, textCell } from "../../../shared/tables/cells.ts";
import { csvNumber, csvText, tableCsv } from "../../../shared/tables/csv.ts";
import { tableHtml } from "../../../shared/tables/html.ts";
import { tableLatex } from "../../../shared/tables/latex.ts";
import type { LabelledTable } from "../../../shared/tables/table.ts";
import { tableText } from "../../../shared/tables/text.ts";

const table: LabelledTable = {
  name: "sample",
  title: "Entries, share form, at the base point",
  corner: "Good",
  columns: [{ label: "Meat & fish" }, { label: "Price", unit: "units uploaded" }],
  rows: [
    { label: "Grains", cells: [estimateCell(-0.07441234567890123, 0.0052, 4), numberCell(1234.5, "money")] },
    { label: "=cmd()", symbol: "α", cells: [textCell("@home"), numberCell(-3, "money")] },
  ],
  notes: ["Estimate over (standard error)."],
};

describe("a table as CSV", () => {
  it("reads back to the same doubles", () => {
    const rows: string[][] = parse(tableCsv(table));
    expect(rows[0]).toEqual([table.title, "figure", "Meat & fish", "Price, units uploaded"]);
    expect(rows[1].slice(0, 2)).toEqual(["Grains", "estimate"]);
    expect(Number(rows[1][2])).toBe(-0.07441234567890123);
    expect(Number(rows[2][2])).toBe(0.0052);
    expect(Number(rows[3][3])).toBe(-3);
  });

  it("keeps any finite double", () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(Number(csvNumber(value))).toBe(value === 0 ? 0 : value);
      }),
    );
  });

  it("makes text inert that a spreadsheet would evaluate, and keeps every other text", () => {
    for (const start of ["=", "+", "-", "@", "\t", "\r"]) {
      const [[read]]: string[][] = parse(csvText(`${start}1+1`), { relax_column_count: true });
      expect(read).toBe(`'${start}1+1`);
    }
    const plain = fc.string({ minLength: 1 }).filter((text) => !/^[=+\-@\t\r＋－＝＠\uFEFF]/.test(text));
    fc.assert(
      fc.property(plain, (text) => {
        const [[read]]: string[][] = parse(csvText(text), { skip_empty_lines: false });
        expect(read).toBe(text);
      }),
    );
  });

  it("has ASCII minus signs only", () => {
    expect(tableCsv(table)).not.toContain("\u2212");
  });
});

describe("a copied table", () => {
  it("is tab-separated, with standard errors on a row of their own and no parentheses to be read as minus", () => {
    const lines = tableText(table).split("\n");
    expect(lines[0]).toBe(table.title);
    expect(lines[2]).toBe("Grains\testimate\t-0.0744\t1234.50");
    expect(lines[3]).toBe("Grains\tstandard error\t0.0052\t");
    expect(lines.at(-2)).toBe("Estimate over (standard error).");
  });

  it("is an HTML table whose text cannot become markup", () => {
    const html = tableHtml({ ...table, title: '<b>"K"</b>' });
    expect(html.split("<tr>")).toHaveLength(5);
    expect(html).toContain("<caption>&lt;b&gt;&quot;K&quot;&lt;/b&gt;</caption>");
    expect(html).toContain('<td align="right">-0.0744</td>');
  });
});

describe("a table as LaTeX", () => {
  it("has booktabs rules, errors in parentheses below, and no character LaTeX would take for a command", () => {
    const latex = tableLatex(table);
    expect(latex).toContain("\\toprule");
    expect(latex).toContain("Good & Meat \\& fish & Price, units uploaded \\\\");
    expect(latex).toContain("Grains & $-$0.0744 & 1,234.50 \\\\\n & (0.0052) &  \\\\");
    expect(latex).toContain("=cmd() $\\alpha$ & @home & $-$3.00 \\\\");
  });

  it("sets powers of ten and specials", () => {
    const latex = tableLatex({ ...table, title: "50\u2009% of 3 × 10⁻¹⁶ for a_b^c #1 {x} ~ \\end" });
    expect(latex).toContain(
      "50\\,\\% of 3 $\\times$ $10^{-16}$ for a\\_b\\textasciicircum{}c \\#1 \\{x\\} \\textasciitilde{} \\textbackslash{}end",
    );
  });
});
