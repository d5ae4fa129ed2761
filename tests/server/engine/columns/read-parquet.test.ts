import fc from "fast-check";
import { ByteWriter, parquetWriteBuffer } from "hyparquet-writer";
import { writePageHeader } from "hyparquet-writer/src/datapage.js";
import { deltaByteArray } from "hyparquet-writer/src/delta.js";
import { describe, expect, test } from "vitest";
import { checkRuns } from "../../../../server/engine/columns/parquet/check-runs.ts";
import { checkTexts } from "../../../../server/engine/columns/parquet/check-texts.ts";
import { decodePages } from "../../../../server/engine/columns/parquet/decode-pages.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { cellsByName, readBytes, refusalOf } from "./cells-of.ts";

type Source = Parameters<typeof parquetWriteBuffer>[0];
const written = (source: Source) => new Uint8Array(parquetWriteBuffer(source));
const one = (element: object, data: unknown[]) =>
  written({
    schema: [
      { name: "root", num_children: 1 },
      { name: "c", repetition_type: "OPTIONAL", ...element },
    ],
    columnData: [{ name: "c", data: data as number[] }],
  });

describe("what a Parquet column holds", () => {
  test.each([
    ["truth", { type: "BOOLEAN" }, [true, null, false], [1, null, 0]],
    ["whole numbers", { type: "INT32" }, [1, null, -7], [1, null, -7]],
    ["long whole numbers", { type: "INT64" }, [1n, null, -(2n ** 53n)], [1, null, -(2 ** 53)]],
    ["short fractions", { type: "FLOAT" }, [0.5, null, Number.NaN], [0.5, null, null]],
    [
      "decimals",
      { type: "INT32", converted_type: "DECIMAL", precision: 9, scale: 2 },
      [1235n, 30n, null],
      [12.35, 0.3, null],
    ],
    [
      "long decimals",
      { type: "INT64", converted_type: "DECIMAL", precision: 18, scale: 3 },
      [-1n, 900719925474099312n],
      [-0.001, 900719925474099.312],
    ],
    ["days", { type: "INT32", converted_type: "DATE" }, [new Date("2029-03-14"), null], ["2029-03-14", null]],
    [
      "moments",
      { type: "INT64", converted_type: "TIMESTAMP_MICROS" },
      [new Date("2029-03-14T09:30:00.25Z"), new Date("1899-12-31")],
      ["2029-03-14T09:30:00.25", "1899-12-31"],
    ],
    [
      "texts",
      { type: "BYTE_ARRAY", converted_type: "UTF8" },
      ["Ålund", "", null, "Ålund"],
      ["Ålund", null, null, "Ålund"],
    ],
    ["texts that are numbers", { type: "BYTE_ARRAY", converted_type: "UTF8" }, ["12.5", "NA", "3"], [12.5, null, 3]],
    ["nothing", { type: "DOUBLE" }, [null, null], [null, null]],
  ])("%s", async (_what, element, given, expected) => {
    expect((await cellsByName(one(element, given), "x.parquet")).c).toEqual(expected);
  });

  test("whole numbers beyond 2 to the power of 53, and infinities, are refused by row and column", async () => {
    const large = await refusalOf(one({ type: "INT64" }, [1n, 2n ** 53n + 2n]), "x.parquet");
    expect(large.problems).toEqual([
      {
        sentence: expect.stringMatching(/^Row 2, column c: 9007199254740994 is a whole number beyond 9,007,199/),
        row: 2,
        column: "c",
      },
    ]);
    const infinite = await refusalOf(one({ type: "DOUBLE" }, [1, Number.NEGATIVE_INFINITY]), "x.parquet");
    expect(infinite.problems[0]).toMatchObject({ row: 2, column: "c", sentence: expect.stringContaining("-Infinity") });
  });

  test("lists, records and documents are refused by column, all at once", async () => {
    const file = written({
      columnData: [
        { name: "a", data: [{ x: 1 }, { x: 2 }], type: "JSON" },
        { name: "b", data: [1, 2], type: "DOUBLE" },
        { name: "d", data: [{ x: 1 }, { x: 2 }], type: "JSON" },
      ],
    });
    expect((await refusalOf(file, "x.parquet")).problems.map(({ column }) => column)).toEqual(["a", "d"]);
  });

  test("texts written as differences from the one before, in groups of rows and pages", async () => {
    const data = Array.from({ length: 2_000 }, (_, row) =>
      row % 7 === 0 ? null : `village ${row >> 3}, house Å${row}`,
    );
    for (const nullable of [true, false]) {
      const values = nullable ? data : data.map((text, row) => text ?? `none ${row}`);
      const file = written({
        columnData: [{ name: "c", data: values, type: "STRING", nullable, encoding: "DELTA_BYTE_ARRAY" }],
        rowGroupSize: 900,
        pageSize: 4_000,
      });
      expect((await cellsByName(file, "x.parquet")).c).toEqual(values);
    }
  });

  test("texts written as differences in a page of the first kind, which does not say how many are missing", () => {
    const levels = [2, 0, 0, 0, 0b11, 0b1011];
    const texts = ["house 1", "house 2", "home"].map((text) => new TextEncoder().encode(text));
    const values = new ByteWriter();
    deltaByteArray(values, texts);
    const size = levels.length + values.offset;
    const file = new ByteWriter();
    writePageHeader(file, {
      type: "DATA_PAGE",
      uncompressed_page_size: size,
      compressed_page_size: size,
      data_page_header: {
        num_values: 4,
        encoding: "DELTA_BYTE_ARRAY",
        definition_level_encoding: "RLE",
        repetition_level_encoding: "RLE",
      },
    });
    file.appendBytes(Uint8Array.from(levels));
    file.appendBytes(values.getBytes());
    const element = { name: "c", type: "BYTE_ARRAY", repetition_type: "OPTIONAL" } as const;
    const root = { element: { name: "root" }, path: [], count: 4, children: [] };
    const path = [root, { element, path: ["c"], count: 4, children: [] }];
    const chunk = { codec: "UNCOMPRESSED" };
    const [page] = decodePages(
      Uint8Array.from(file.getBytes()),
      { element, path } as unknown as Parameters<typeof decodePages>[1],
      { rows: 4, chunk } as unknown as Parameters<typeof decodePages>[2],
    );
    const words = Array.from(page, (text) => text && new TextDecoder().decode(text as Uint8Array));
    expect(words).toEqual(["house 1", "house 2", null, "home"]);
  });

  test("many groups of rows and pages, packed or not", async () => {
    const data = Array.from({ length: 5_000 }, (_, row) => (row % 11 === 0 ? null : Math.sqrt(row)));
    for (const codec of ["SNAPPY", "UNCOMPRESSED"] as const) {
      const file = written({
        columnData: [{ name: "c", data, type: "DOUBLE", nullable: true }],
        codec,
        rowGroupSize: 900,
        pageSize: 2_000,
      });
      expect((await cellsByName(file, "x.parquet")).c).toEqual(data);
    }
  });
});

describe("a hostile Parquet file", () => {
  const sound = written({
    columnData: [
      { name: "p1", data: Float64Array.from({ length: 400 }, (_, row) => row / 7), type: "DOUBLE" },
      { name: "place", data: Array.from({ length: 400 }, (_, row) => `place ${row % 9}`), type: "STRING" },
      {
        name: "house",
        data: Array.from({ length: 400 }, (_, row) => `house ${row}`),
        type: "STRING",
        encoding: "DELTA_BYTE_ARRAY",
      },
    ],
  });

  test("cut short at any byte is refused", async () => {
    for (const length of [4, 12, sound.length >> 1, sound.length - 9, sound.length - 1]) {
      expect((await refusalOf(sound.slice(0, length), "x.parquet")).message).toMatch(/Parquet file/);
    }
  });

  test("that declares more cells than are read is refused before memory is taken by them", async () => {
    // The footer's number of rows, a variable-length count after the schema: 400 is written E4 06 in zigzag.
    const footer = sound.length - 8 - new DataView(sound.buffer).getUint32(sound.length - 8, true);
    const at = sound.findIndex(
      (_, i) => i > footer && sound[i] === 0xa0 && sound[i + 1] === 0x06 && sound[i - 1] === 0x16,
    );
    expect(at).toBeGreaterThan(footer);
    const wide = new Uint8Array(sound.length + 4);
    wide.set(sound.subarray(0, at));
    wide.set([0xa0, 0xe6, 0xff, 0xff, 0xff, 0x0f], at);
    wide.set(sound.subarray(at + 2), at + 6);
    new DataView(wide.buffer).setUint32(wide.length - 8, sound.length - 8 - footer + 4, true);
    expect((await refusalOf(wide, "x.parquet")).message).toMatch(
      /declares [\d,]+ rows of 3 columns; at most 50,000,000 cells/,
    );
  });

  test("with any byte changed is read or refused, and never takes more than a moment", async () => {
    await fc.assert(
      fc.asyncProperty(fc.nat(sound.length - 1), fc.nat(255), async (at, byte) => {
        const spoiled = sound.slice();
        spoiled[at] = byte;
        const before = performance.now();
        const outcome = await readBytes(spoiled, "x.parquet").catch((error: unknown) => error);
        expect(outcome instanceof Error ? outcome : undefined).toSatisfy(
          (error: unknown) => error === undefined || error instanceof Refusal,
        );
        expect(performance.now() - before).toBeLessThan(3_000);
      }),
      { numRuns: 300, seed: 5 },
    );
  });

  test("with texts that would be longer than the page they come from is refused before they are put together", async () => {
    /** Lengths as differences in blocks of 128: first, then the same step each time (zigzag, no bits left over). */
    const lengths = (count: number, first: number, step: number) => [
      ...[128, 1, 4, count, first * 2],
      ...[step * 2, 0, 0, 0, 0],
    ];
    // Each takes up the whole of the text before and adds a byte: 1 + 2 + … + 100 bytes out of 100.
    const growing = Uint8Array.from([...lengths(100, 0, 1), ...lengths(100, 1, 0), ...new Array(100).fill(65)]);
    expect(() => checkTexts(growing, 100, 5_050)).not.toThrow();
    expect(() => checkTexts(growing, 100, 5_049)).toThrow("the texts of a page would have more than 5049 bytes");
    const early = Uint8Array.from([...lengths(2, 3, 0), ...lengths(2, 1, 0), 65, 65]);
    expect(() => checkTexts(early, 2, 100)).toThrow("a text takes up 3 bytes of one that has 0");
    const long = Uint8Array.from([...lengths(2, 0, 0), ...lengths(2, 1, 1), 65, 65]);
    expect(() => checkTexts(long, 2, 100)).toThrow("a text of 2 bytes stands where 1 are left");
  });

  test("with runs of more values than its page has is refused before they are written out", () => {
    expect(() => checkRuns(new Uint8Array([0xfe, 0xff, 0xff, 0xff, 0x0f, 1]), 1, 400)).toThrow("where 400 are left");
    expect(() => checkRuns(new Uint8Array([0xff, 0xff]), 1, 400)).toThrow("a run has no end");
    // Eight values packed where five are left: the last three fill the byte.
    expect(() => checkRuns(new Uint8Array([0x03, 0b10101]), 1, 5)).not.toThrow();
  });
});
