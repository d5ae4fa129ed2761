import ExcelJS from "exceljs";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { showsDate } from "../../../../server/engine/columns/workbook/workbook-parts.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { workbookParts, zipOf } from "../../../support/zip.ts";
import { cellsByName, readBytes, refusalOf } from "./cells-of.ts";

async function written(fill: (book: ExcelJS.Workbook) => void): Promise<Uint8Array> {
  const book = new ExcelJS.Workbook();
  fill(book);
  return new Uint8Array((await book.xlsx.writeBuffer()) as ArrayBuffer);
}

const sheetOf = (rows: string, after = "") => zipOf(workbookParts([{ xml: `<sheetData>${rows}</sheetData>${after}` }]));
const HEAD =
  '<row r="1"><c r="A1" t="inlineStr"><is><t>a</t></is></c><c r="B1" t="inlineStr"><is><t>b</t></is></c></row>';

describe("the cells of a workbook", () => {
  test("of every kind become what a CSV of the sheet would have", async () => {
    const file = await written((book) => {
      const sheet = book.addWorksheet("Rows");
      sheet.addRow(["number", "text", "day", "moment", "truth", "formula", "rich", "error", "day by formula"]);
      sheet.addRow([
        0.1 + 0.2,
        "a & b",
        new Date("2029-03-14"),
        new Date("2029-03-14T09:30:00Z"),
        true,
        { formula: "1+1", result: 2 },
        { richText: [{ text: "two " }, { text: "runs" }] },
        { error: "#DIV/0!" },
        { formula: "C2+1", result: new Date("2029-03-15") },
      ]);
      sheet.addRow([
        null,
        null,
        new Date("1999-12-31"),
        null,
        false,
        { formula: "A1&A2", result: "x" },
        "plain",
        3,
        null,
      ]);
      sheet.getCell("I2").numFmt = "yyyy-mm-dd";
    });
    expect(await cellsByName(file, "x.xlsx")).toEqual({
      number: [0.1 + 0.2, null],
      text: ["a & b", null],
      day: ["2029-03-14", "1999-12-31"],
      moment: ["2029-03-14T09:30:00", null],
      truth: [1, 0],
      formula: ["2", "x"],
      rich: ["two runs", "plain"],
      error: ["#DIV/0!", "3"],
      "day by formula": ["2029-03-15", null],
    });
    // Where a column of numbers has an error, its row is named when it is used, as of any text.
    const { columns } = await readBytes(file, "x.xlsx");
    expect(columns.find(({ name }) => name === "error")).toMatchObject({ type: "text" });
  });

  test("the first days are those a spreadsheet shows, with the one that never was between them", async () => {
    const styles = { name: "xl/styles.xml", bytes: '<styleSheet><cellXfs><xf numFmtId="14"/></cellXfs></styleSheet>' };
    const row = (at: number, day: number) => `<row r="${at}"><c r="A${at}" s="0"><v>${day}</v></c></row>`;
    const xml = `<sheetData>${HEAD}${row(2, 1)}${row(3, 59)}${row(4, 61)}${row(5, 47_191)}</sheetData>`;
    const { a } = await cellsByName(zipOf(workbookParts([{ xml }], [styles])), "x.xlsx");
    expect(a).toEqual(["1900-01-01", "1900-02-28", "1900-03-01", "2029-03-14"]);
  });

  test("days are counted from 1904 where the workbook says so", async () => {
    const file = await written((book) => {
      book.properties.date1904 = true;
      const sheet = book.addWorksheet("Rows");
      sheet.addRow(["day", "n"]);
      sheet.addRow([new Date("2029-03-14"), 1]);
    });
    expect((await cellsByName(file, "x.xlsx")).day).toEqual(["2029-03-14"]);
  });

  test("empty rows are none, and the table may stand anywhere in the sheet", async () => {
    const file = await written((book) => {
      const sheet = book.addWorksheet("Rows");
      sheet.getCell("C4").value = "a";
      sheet.getCell("D4").value = "b";
      sheet.getCell("C7").value = 1;
      sheet.getCell("D9").value = 2;
    });
    expect(await cellsByName(file, "x.xlsx")).toEqual({ a: [1, null], b: [null, 2] });
  });

  test("rows and cells without their numbers follow one another", async () => {
    const rows =
      '<row><c t="inlineStr"><is><t>a</t></is></c><c t="inlineStr"><is><t>b</t></is></c></row><row><c><v>1</v></c><c><v>2.5</v></c></row>';
    expect(await cellsByName(sheetOf(rows), "x.xlsx")).toEqual({ a: [1], b: [2.5] });
  });

  test("a sheet may be named; without a name it is the first that is seen and not empty", async () => {
    const file = await written((book) => {
      book.addWorksheet("Hidden", { state: "hidden" }).addRows([["a"], [1]]);
      book.addWorksheet("Empty");
      book.addWorksheet("First").addRows([["b"], [2]]);
      book.addWorksheet("Second").addRows([["c"], [3]]);
    });
    expect(await cellsByName(file, "x.xlsx")).toEqual({ b: [2] });
    expect(await cellsByName(file, "x.xlsx", "Second")).toEqual({ c: [3] });
    expect(await cellsByName(file, "x.xlsx", "Hidden")).toEqual({ a: [1] });
    expect(await cellsByName(file, "x.xlsx", "No such")).toEqual({ b: [2] });
    const [first, second] = [await readBytes(file, "x.xlsx"), await readBytes(file, "x.xlsx", "Second")];
    expect(first.table.sha256).not.toBe(second.table.sha256);
  });
});

describe("a sheet that is no table", () => {
  const refused = async (fill: (sheet: ExcelJS.Worksheet) => void) =>
    (await refusalOf(await written((book) => fill(book.addWorksheet("Prices"))), "x.xlsx")).message;

  test("with merged heads or cells is refused by their place", async () => {
    expect(
      await refused((sheet) => {
        sheet.addRows([
          ["bread", "", "milk"],
          ["p", "q", "p"],
          [1, 2, 3],
        ]);
        sheet.mergeCells("A1:B1");
      }),
    ).toBe("The head of sheet Prices is merged over A1:B1; give each column a name of its own, in one row.");
    expect(
      await refused((sheet) => {
        sheet.addRows([
          ["village", "p"],
          ["north", 1],
          ["", 2],
        ]);
        sheet.mergeCells("A2:A3");
      }),
    ).toMatch(/^Cells A2:A3 of sheet Prices are merged/);
  });

  test("names the cell that stands outside its head, and columns without a name", async () => {
    expect(await refused((sheet) => sheet.addRows([["Household survey"], ["a", "b"], [1, 2]]))).toBe(
      'Cell B2 of sheet Prices has "b", and the head, row 1, names columns A to A only.',
    );
    expect(
      await refused((sheet) =>
        sheet.addRows([
          ["a", null, "b"],
          [1, 2, 3],
        ]),
      ),
    ).toContain("Column 2 of 3 has no name");
    expect(await refused((sheet) => sheet.addRow(["a", "b"]))).toContain("a head of 2 columns and 0 rows");
    expect(await refused(() => {})).toContain("none with a cell in it");
    expect(
      await refused((sheet) =>
        sheet.addRows([
          ["a", "b"],
          [1, "inf"],
        ]),
      ),
    ).toContain("Cell B2");
  });
});

describe("a hostile workbook", () => {
  test("that unpacks without bound is stopped, whatever size it claims", async () => {
    const bomb = `<row r="2">${'<c r="A2"><v>1</v></c>'.repeat(800_000)}</row>`;
    for (const claimed of [undefined, 1_000]) {
      const parts = workbookParts([{ xml: `<sheetData>${HEAD}${bomb}</sheetData>` }]);
      const sheet = parts.findIndex(({ name }) => name.includes("sheet1"));
      parts[sheet] = { ...parts[sheet], ...(claimed && { claimed }) };
      expect((await refusalOf(zipOf(parts), "x.xlsx")).message).toMatch(
        /sheet1\.xml unpacks from [\d,]+ bytes to more than 200 times/,
      );
    }
  });

  test("whose XML has entities, no end or no text in UTF-8 is refused by its part", async () => {
    const strings = (bytes: string | Uint8Array) =>
      refusalOf(
        zipOf(workbookParts([{ xml: `<sheetData>${HEAD}</sheetData>` }], [{ name: "xl/sharedStrings.xml", bytes }])),
        "x.xlsx",
      );
    const laughs = '<!DOCTYPE sst [<!ENTITY a "ha"><!ENTITY b "&a;&a;">]><sst><si><t>&b;</t></si></sst>';
    expect((await strings(laughs)).message).toMatch(/sharedStrings\.xml cannot be read: undefined entity/);
    expect((await strings(`<sst><si><t>${"x".repeat(3_000_000)}`)).message).toMatch(/without a tag/);
    expect((await strings("<sst><si>")).message).toMatch(/sharedStrings\.xml cannot be read/);
    expect((await strings(new Uint8Array([0x3c, 0xff, 0xfe]))).message).toContain("not text in UTF-8");
  });

  test("whose references lead nowhere is refused by the cell", async () => {
    const cell = (xml: string) => refusalOf(sheetOf(`${HEAD}<row r="2">${xml}</row>`), "x.xlsx");
    expect((await cell('<c r="A2" t="s"><v>7</v></c>')).message).toBe(
      "Cell A2 takes text 7 of the workbook, which has 0.",
    );
    expect((await cell('<c r="ZZZZ2"><v>7</v></c>')).message).toContain("a cell called ZZZZ2");
    expect(
      (
        await refusalOf(
          sheetOf(`${HEAD}<row r="9"><c r="A9"><v>1</v></c></row><row r="3"><c r="A3"><v>1</v></c></row>`),
          "x.xlsx",
        )
      ).message,
    ).toContain("row 3 after row 9");
    expect((await refusalOf(sheetOf('<row r="99999999"/>'), "x.xlsx")).message).toContain("row numbered 99999999");
  });

  test("another archive is told apart from a workbook", async () => {
    expect((await refusalOf(zipOf([{ name: "content.xml", bytes: "<a/>" }]), "x.ods")).message).toContain(
      "OpenDocument",
    );
    expect((await refusalOf(zipOf([{ name: "purchases.csv", bytes: "a,b" }]), "x.zip")).message).toContain(
      "it holds purchases.csv",
    );
  });

  test("with any byte changed, or cut short, is read or refused", async () => {
    const sound = sheetOf(
      `${HEAD}${Array.from({ length: 40 }, (_, row) => `<row r="${row + 2}"><c r="A${row + 2}"><v>${row}</v></c></row>`).join("")}`,
    );
    await fc.assert(
      fc.asyncProperty(fc.nat(sound.length - 1), fc.nat(255), fc.boolean(), async (at, byte, cut) => {
        const spoiled = cut ? sound.slice(0, at) : sound.slice();
        if (!cut) spoiled[at] = byte;
        const outcome = await readBytes(spoiled, "x.xlsx").catch((error: unknown) => error);
        if (outcome instanceof Error) expect(outcome).toBeInstanceOf(Refusal);
      }),
      { numRuns: 250, seed: 11 },
    );
  });
});

test.each([
  ["yyyy-mm-dd", true],
  ["mmm", true],
  ["[$-409]d-mmm-yy;@", true],
  ["0.00", false],
  ['#,##0 "days"', false],
  ["h:mm:ss", false],
  ["[Red]0;-0", false],
  ["General", false],
])("the format %s shows a day: %s", (format, expected) => {
  expect(showsDate(format)).toBe(expected);
});
