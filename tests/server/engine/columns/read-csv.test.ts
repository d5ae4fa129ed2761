import { createHash } from "node:crypto";
import { createReadStream, readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { TableColumn } from "../../../../server/engine/columns/prepared-data.ts";
import { readCsv } from "../../../../server/engine/columns/read-csv.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import { uploadColumn } from "../../../../shared/schemas/resources.ts";
import { bytesOf } from "./bytes.ts";

const read = (content: string | Uint8Array, piece?: number) => readCsv(bytesOf(content, piece), "weeks.csv", QUIET);

async function refusal(content: string | Uint8Array): Promise<Refusal> {
  const outcome = await read(content).catch((error: unknown) => error);
  if (!(outcome instanceof Refusal)) throw new Error(`not refused: ${String(outcome)}`);
  return outcome;
}

function cells(column: TableColumn): (number | string | null)[] {
  if (column.type === "number") return Array.from(column.values, (value) => (Number.isNaN(value) ? null : value));
  return Array.from(column.codes, (code) => (code < 0 ? null : column.levels[code]));
}

const byName = async (content: string) => {
  const found = await read(content);
  return { ...found, cells: Object.fromEntries(found.table.columns.map((column) => [column.name, cells(column)])) };
};

describe("ordinary files", () => {
  test("numbers and text, whatever the pieces in which the bytes arrive", async () => {
    const text = 'week,village,p1\r\n1,"Ålund, upper",2.50\r\n2,"says ""hello""",.5\r\n\r\n3,"two\r\nlines",1e-3\r\n';
    const whole = await read(text, 1000);
    for (const piece of [1, 2, 3, 5, 11]) expect(await read(text, piece)).toEqual(whole);
    expect(whole.table.rows).toBe(3);
    expect(whole.table.columns.map(cells)).toEqual([
      [1, 2, 3],
      ["Ålund, upper", 'says "hello"', "two\r\nlines"],
      [2.5, 0.5, 0.001],
    ]);
    expect(whole.separator).toBe(",");
    expect(whole.decimalComma).toBe(false);
    expect(whole.bytes).toBe(new TextEncoder().encode(text).length);
    expect(whole.table.sha256).toBe(createHash("sha256").update(text).digest("hex"));
  });

  test("a byte order mark belongs to no name, and counts in size and hash", async () => {
    const text = "\uFEFFa;b\n1;2\n";
    const { table, bytes } = await read(text);
    expect(table.columns.map((column) => column.name)).toEqual(["a", "b"]);
    expect(bytes).toBe(11);
    expect(table.sha256).toBe(createHash("sha256").update(text).digest("hex"));
  });

  test("line ends of Unix, Windows and old machines, with or without one at the end", async () => {
    for (const end of ["\n", "\r\n", "\r"]) {
      for (const last of ["", end]) {
        const { table } = await read(`a,b${end}1,2${end}3,4${last}`);
        expect(table.columns.map(cells)).toEqual([
          [1, 3],
          [2, 4],
        ]);
      }
    }
  });

  test.each([
    ["a;b,c;d\n1;2;3\n", ";"],
    ["a\tb, c\td\n1\t2\t3\n", "\t"],
    ['"a;b;c",d\n1,2\n', ","],
    ["a,b;c\n1,2;3\n", ";"],
  ])("the separator of %j is taken from the header outside quotes", async (text, separator) => {
    expect((await read(text)).separator).toBe(separator);
  });

  test("decimal commas, certain through a semicolon", async () => {
    const found = await byName("week;p1;q1\n1;2,5;1000\n2;,75;1,234\n3;;-1e2\n4;-3,25e2;0\n");
    expect(found.decimalComma).toBe(true);
    expect(found.cells).toEqual({
      week: [1, 2, 3, 4],
      p1: [2.5, 0.75, null, -325],
      q1: [1000, 1.234, -100, 0],
    });
  });

  test("a comma that may set thousands apart is no decimal mark", async () => {
    const found = await byName("week\tq1\n1\t1,234\n2\t17\n");
    expect(found.decimalComma).toBe(false);
    expect(found.cells.q1).toEqual(["1,234", "17"]);
    expect(found.columns[1].firstText).toEqual({ row: 1, value: "1,234" });
    const mixed = await byName("p;q\n1.5;1,234\n2.5;12,345\n");
    expect(mixed.cells).toEqual({ p: [1.5, 2.5], q: ["1,234", "12,345"] });
  });

  test("a quoted decimal comma in a file of commas is text", async () => {
    const found = await byName('a,b\n"1,5",2\n');
    expect(found.cells.a).toEqual(["1,5"]);
  });

  test("empty cells are missing; NA, NaN and . are so among numbers only", async () => {
    const found = await byName("p,region,none\n1,NA,\nNA,north,\n.,,\n NaN ,  south ,\n");
    expect(found.cells).toEqual({
      p: [1, null, null, null],
      region: ["NA", "north", null, "south"],
      none: [null, null, null, null],
    });
    expect(found.columns[0]).toMatchObject({ missing: 3, distinct: 1, missingWords: [".", "NA", "NaN"] });
    expect(found.columns[1]).toMatchObject({ type: "text", missing: 1, distinct: 3 });
    expect(found.columns[1]).not.toHaveProperty("missingWords");
    expect(found.columns[2]).toMatchObject({ type: "number", missing: 4, distinct: 0 });
  });

  test.each(["0x1f", "1 000", "1_000", "5%", "12 kg", "1.2.3", "--1", "1e", "0b1", "£3"])(
    "%j among numbers makes a text column that names it",
    async (odd) => {
      const { columns } = await read(`a,b\n1,2\n2,3\n3,${odd}\n4,5\n`);
      expect(columns[1]).toMatchObject({ type: "text", firstText: { row: 3, value: odd } });
    },
  );

  test("a column of names with a few numbers among them is plainly text", async () => {
    const { columns } = await read("a,b\n1,x\n2,y\n3,4\n");
    expect(columns[1]).toEqual({ name: "b", type: "text", missing: 0, distinct: 3, firstValues: ["x", "y", "4"] });
  });

  test("descriptions keep to their schema and count exactly", async () => {
    const { columns } = await read("a,b\n0,7\n10,7\n5,7\n10,7\n,7\n");
    for (const column of columns) expect(uploadColumn.parse(column)).toEqual(column);
    expect(columns[0]).toEqual({
      name: "a",
      firstValues: ["0", "10", "5"],
      type: "number",
      missing: 1,
      distinct: 3,
      minimum: 0,
      maximum: 10,
      mean: 6.25,
      zeros: 1,
      histogram: [1, 0, 0, 0, 0, 0, 1, 0, 0, 0, 0, 2],
    });
    expect(columns[1]).toMatchObject({ minimum: 7, maximum: 7, mean: 7, histogram: [5] });
    const wide = await read("a,b\n-1.7e308,1\n1.7e308,1\n1.7e308,1\n");
    expect(uploadColumn.parse(wide.columns[0])).toMatchObject({ histogram: [1, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 2] });
  });

  test("a column of very many different numbers stays exact, and may still turn out to be text", async () => {
    const rows = 12_000;
    const lines = Array.from({ length: rows }, (_, row) => `${row + 1},${((row * 7919) % rows) / 8}`);
    const numbers = await read(`row,value\n${lines.join("\n")}\n`, 4096);
    expect(cells(numbers.table.columns[1])).toEqual(lines.map((line) => Number(line.split(",")[1])));
    expect(numbers.columns[1].distinct).toBe(rows);
    const spoiled = await read(`row,value\n${lines.join("\n")}\n0,n.a.\n`, 4096);
    expect(cells(spoiled.table.columns[1])).toEqual([...lines.map((line) => line.split(",")[1]), "n.a."]);
    expect(spoiled.columns[1]).toMatchObject({ firstText: { row: rows + 1, value: "n.a." }, distinct: rows + 1 });
  });

  test("the tuna file reads back to the same doubles", async () => {
    const path = new URL("../../../reference/fixtures/tuna-weekly.csv", import.meta.url);
    const { table, separator, columns } = await readCsv(createReadStream(path), "tuna-weekly.csv", QUIET);
    const [header, ...lines] = readFileSync(path, "utf8").trim().split("\n");
    expect(separator).toBe(",");
    expect(table.rows).toBe(338);
    expect(table.columns.map((column) => column.name)).toEqual(header.split(","));
    const expected = lines.map((line) => line.split(",").map(Number));
    table.columns.forEach((column, at) => {
      expect(cells(column)).toEqual(expected.map((row) => row[at]));
    });
    expect(columns.every((column) => column.type === "number" && column.missing === 0)).toBe(true);
  });
});

describe("refusals name the row and the column", () => {
  test.each([
    ["", /empty: it has 0 bytes/],
    ["week\n1\n2\n", /header, "week", has no comma, semicolon or tab/],
    ["just a sentence", /1 column/],
    ["a,b\n", /header of 2 columns and 0 rows/],
    ["a,b", /header of 2 columns and 0 rows/],
    ["a,b,a\n1,2,3\n", /Columns 1 and 3 of the header are both named a/],
    ["a,,c\n1,2,3\n", /Column 2 of 3 has no name/],
    ["a,b,\n1,2,\n", /Column 3 of 3 has no name/],
  ])("%j", async (text, sentence) => {
    expect((await refusal(text)).message).toMatch(sentence);
  });

  test("every fault of the header at once", async () => {
    const { problems } = await refusal("a,,a,,b,b\n");
    expect(problems).toHaveLength(4);
  });

  test("a ragged row, with its line where quoted breaks and blank lines have shifted it", async () => {
    const plain = await refusal("a,b,c\n1,2,3\n1,2\n");
    expect(plain.problems).toEqual([{ sentence: "Row 2 has 2 cells, the header has 3.", row: 2 }]);
    const shifted = await refusal('a,b,c\n1,"x\ny",3\n\n1,2,3\n"p\nq",2,3,4\n');
    expect(shifted.problems).toEqual([
      { sentence: "Row 3 (line 6 of the file) has 4 cells, the header has 3.", row: 3 },
    ]);
  });

  test.each([
    ["a,b\n1,2\n3,1e999\n", 2, "b", /Row 2, column b: "1e999" is not a finite number/],
    ["a,b\n1,2\n-Inf,4\n", 2, "a", /Row 2, column a: "-Inf" is not a finite number/],
    ["a,b\n1,Infinity\n2,3\n", 1, "b", /Row 1/],
  ])("%j", async (text, row, column, sentence) => {
    const { problems } = await refusal(text);
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ row, column });
    expect(problems[0].sentence).toMatch(sentence);
  });

  test("Infinity among words is a word", async () => {
    const found = await byName("film,seen\nInfinity,1\nBrazil,2\n");
    expect(found.cells.film).toEqual(["Infinity", "Brazil"]);
  });

  test("bytes that are not UTF-8", async () => {
    const latin = Buffer.from("week,village\n1,Alund\n2,\u00C5lund\n", "latin1");
    const { problems } = await refusal(latin);
    expect(problems[0]).toMatchObject({ row: 2, column: "village" });
    expect(problems[0].sentence).toMatch(/not UTF-8/);
    const cut = Buffer.concat([Buffer.from("a,b\n1,x"), Buffer.from([0xc3])]);
    expect((await refusal(cut)).problems[0]).toMatchObject({ row: 1, column: "b" });
    const header = await refusal(Buffer.from("week,v\u00E4rde\n1,2\n", "latin1"));
    expect(header.message).toMatch(/^The header: /);
  });

  test("files that are no text", async () => {
    expect((await refusal(Buffer.from([0x50, 0x4b, 3, 4, 20, 0]))).message).toMatch(/workbook/);
    expect((await refusal(Buffer.from("\uFEFFa,b\n1,2\n", "utf16le"))).message).toMatch(/UTF-16/);
    expect((await refusal(Buffer.from([1, 2, 0, 44, 10]))).message).toMatch(/byte 3 of it is NUL/);
    const late = await refusal("a,b\n1,2\n3,\0\n");
    expect(late.problems[0]).toMatchObject({ row: 2, column: "b" });
    expect(late.message).toMatch(/NUL/);
  });

  test("quotes that do not close, or close early", async () => {
    const open = await refusal('a,b\n1,2\n"3,4\n5,6\n');
    expect(open.problems[0].row).toBe(2);
    expect(open.message).toMatch(/quote opened in row 2 is never closed/);
    expect((await refusal('a,b\n1,2\n3,"4"5\n')).message).toMatch(/In row 2 a quoted cell goes on/);
    expect((await refusal('a,b\n1,2\n3,4"5"\n')).message).toMatch(/In row 2 a quote stands inside a cell/);
    expect((await refusal(`a,b\n1,2\n"${"9,\n".repeat(400_000)}`)).message).toMatch(/row 2 is longer than/);
    expect((await refusal('"a,b\n1,2\n')).message).toMatch(/quote|no comma/);
  });

  test("two ways of writing decimals, with a cell of each", async () => {
    const { message } = await refusal("a;b\n1;1.5\n2,5;3\n");
    expect(message).toMatch(/"2,5" in a, row 2, and "1.5" in b, row 1/);
  });

  test("a file over the limit, with both numbers, before the rest is read", async () => {
    let sent = 0;
    async function* endless() {
      yield new TextEncoder().encode("a,b\n");
      for (;;) {
        sent += 4000;
        yield new TextEncoder().encode("1,2\n".repeat(1000));
      }
    }
    await expect(readCsv(endless(), "big.csv", QUIET, 20_000)).rejects.toThrow(/limit of 20,000 bytes: 20,004 had/);
    expect(sent).toBe(20_000);
  });

  test("a header that never ends", async () => {
    const { message } = await refusal(new TextEncoder().encode("a,".repeat(600_000)));
    expect(message).toMatch(/header has not ended after 1,048,57\d bytes; the limit is 1,048,576/);
  });
});

describe("a long file", () => {
  test("speaks while it is read and stops when told", async () => {
    const steps: string[] = [];
    const control = {
      progress: ({ step }: { step: string }) => void steps.push(step),
      cancelled: () => steps.length >= 3,
    };
    const source = bytesOf(`a,b\n${"1,2\n".repeat(10_000)}`, 5000);
    await expect(readCsv(source, "long.csv", control)).rejects.toThrow(Cancelled);
    expect(steps).toHaveLength(3);
    expect(steps[2]).toMatch(/^reading rows, 3,7\d\d so far$/);
  });
});

test("whatever the bytes, a table or a refusal, and the same in pieces of any size", async () => {
  const parts = [
    "a",
    "b",
    ",",
    ";",
    "\t",
    "\n",
    "\r\n",
    '"',
    '""',
    "1",
    "2.5",
    "1,5",
    "é",
    "\uFEFF",
    "\0",
    "NA",
    ".",
    "-",
    " ",
  ];
  const text = fc.tuple(
    fc.constantFrom("a,b\n", "a;b\n", "a\tb\r\n", ""),
    fc.array(fc.oneof(fc.constantFrom(...parts), fc.constantFrom("1,2\n", "3;4\n", "5\t6\r\n")), { maxLength: 14 }),
  );
  const outcome = (bytes: Uint8Array, piece: number) =>
    read(bytes, piece).catch((error: unknown) => {
      if (error instanceof Refusal) return error.problems;
      throw error;
    });
  await fc.assert(
    fc.asyncProperty(text, fc.integer({ min: 1, max: 5 }), async ([header, body], piece) => {
      const bytes = new TextEncoder().encode(header + body.join(""));
      expect(await outcome(bytes, piece)).toEqual(await outcome(bytes, 1000));
    }),
    { numRuns: 500, seed: 3 },
  );
});
