import ExcelJS from "exceljs";
import { parquetWriteBuffer } from "hyparquet-writer";
import { describe, expect, test } from "vitest";
import { runData } from "../../../../server/engine/cells/index.ts";
import { bytesInMemory } from "../../../../server/engine/columns/file-bytes.ts";
import { readTable } from "../../../../server/engine/columns/read-table.ts";
import { Cancelled } from "../../../../server/engine/run.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import { parseCell } from "../../../../shared/study/parse-cell.ts";
import { readBytes, refusalOf } from "./cells-of.ts";

const ROWS = 60;
const random = seededRandom(7);
const numbers = ["p_bread", "e_bread", "p_milk", "e_milk", "members"].map((name) => ({
  name,
  values: Array.from({ length: ROWS }, (_, row) =>
    name === "members" && row === 4 ? null : Number(Math.exp(random.normal()).toFixed(3)),
  ),
}));
const villages = Array.from({ length: ROWS }, (_, row) => (row === 9 ? null : `Village ${row % 7}, upper`));
const days = Array.from({ length: ROWS }, (_, row) => new Date(Date.UTC(2029, 2, 1 + (row % 28))));

const csv = () =>
  new TextEncoder().encode(
    [
      [...numbers.map(({ name }) => name), "village", "day"].join(","),
      ...days.map((day, row) =>
        [
          ...numbers.map(({ values }) => values[row] ?? ""),
          villages[row] === null ? "" : `"${villages[row]}"`,
          day.toISOString().slice(0, 10),
        ].join(","),
      ),
    ].join("\n"),
  );

const parquet = () =>
  new Uint8Array(
    parquetWriteBuffer({
      rowGroupSize: 25,
      schema: [
        { name: "root", num_children: numbers.length + 2 },
        ...numbers.map(({ name }) => ({ name, type: "DOUBLE" as const, repetition_type: "OPTIONAL" as const })),
        { name: "village", type: "BYTE_ARRAY", converted_type: "UTF8", repetition_type: "OPTIONAL" },
        { name: "day", type: "INT32", converted_type: "DATE", repetition_type: "REQUIRED" },
      ],
      columnData: [
        ...numbers.map(({ name, values }) => ({ name, data: values })),
        { name: "village", data: villages },
        { name: "day", data: days },
      ],
    }),
  );

async function workbook() {
  const book = new ExcelJS.Workbook();
  book.addWorksheet("Notes");
  const sheet = book.addWorksheet("Households");
  sheet.addRow([...numbers.map(({ name }) => name), "village", "day"]);
  days.forEach((day, row) => {
    sheet.addRow([...numbers.map(({ values }) => values[row]), villages[row], day]);
  });
  book.addWorksheet("Codes").addRow(["code", "meaning"]);
  return new Uint8Array((await book.xlsx.writeBuffer()) as ArrayBuffer);
}

const SOURCE =
  "upload: x\ngoods: {bread: {price: p_bread, expenditure: e_bread}, milk: {price: p_milk, expenditure: e_milk}}\ncluster: village\ntime: day\n";

describe("one table in three formats", () => {
  test("gives the same columns to the last bit, and the same data to estimate on", async () => {
    const read = await Promise.all([
      readBytes(csv(), "x.csv"),
      readBytes(parquet(), "x.parquet"),
      readBytes(await workbook(), "x.xlsx"),
    ]);
    const [first, ...others] = read;
    expect(first.table.columns.map(({ type }) => type)).toEqual([...numbers.map(() => "number"), "text", "text"]);
    for (const { table, columns } of others) {
      expect(table.columns).toEqual(first.table.columns);
      expect(columns).toEqual(first.columns);
      table.columns.forEach((column, at) => {
        const same = first.table.columns[at];
        if (column.type !== "number" || same.type !== "number") return;
        expect(Buffer.from(column.values.buffer)).toEqual(Buffer.from(same.values.buffer));
      });
    }
    const { specification } = parseCell("data", SOURCE);
    if (specification?.kind !== "data") throw new Error("the source is not sound");
    const found = read.map(({ table }) => runData(specification, table).finding);
    expect(found[0].accounting.used).toBeGreaterThan(50);
    expect(new Set(found.map(({ dataFingerprint }) => dataFingerprint)).size).toBe(1);
    expect(read.map(({ format }) => format)).toEqual(["csv", "parquet", "xlsx"]);
    expect(read[2].workbook).toEqual({ sheet: "Households", sheets: ["Notes", "Households", "Codes"] });
    expect(new Set(read.map(({ table }) => table.sha256)).size).toBe(3);
  });

  test("is known by its content, whatever its name says", async () => {
    expect((await readBytes(parquet(), "x.csv")).format).toBe("parquet");
    expect((await readBytes(await workbook(), "x.parquet")).format).toBe("xlsx");
    expect((await refusalOf(csv(), "x.parquet")).message).toBe(
      "The name x.parquet promises a Parquet file, and the file is none: its first bytes are not.",
    );
    expect((await refusalOf(csv(), "x.XLSX")).message).toContain("promises a workbook");
    expect((await refusalOf(new Uint8Array([0xd0, 0xcf, 0x11, 0xe0, 1, 2]), "x.xls")).message).toContain(
      "save it as XLSX",
    );
    expect((await refusalOf(new Uint8Array(), "x.csv")).message).toContain("0 bytes");
  });

  test("stops when cancelled, whichever it is", async () => {
    for (const [bytes, name] of [
      [parquet(), "x.parquet"],
      [csv(), "x.csv"],
    ] as const) {
      const control = { progress() {}, cancelled: () => true };
      await expect(readTable(bytesInMemory(bytes), name, { control })).rejects.toBeInstanceOf(Cancelled);
    }
  });
});
