import { createHash } from "node:crypto";
import type { UploadColumn } from "../../../shared/schemas/resources.ts";
import { Refusal } from "../refusal.ts";
import { QUIET, type RunControl } from "../run.ts";
import { quoteCell } from "./cell-text.ts";
import { ColumnBuilder } from "./column-builder.ts";
import { type RecordSink, readRecords } from "./csv-records.ts";
import { decideDecimalMark } from "./decimal-mark.ts";
import { describeColumn } from "./describe-column.ts";
import { FilePieces } from "./file-pieces.ts";
import { readHeader } from "./header.ts";
import { printPlace } from "./place.ts";
import type { UploadTable } from "./prepared-data.ts";
import { detectSeparator, type Separator } from "./separator.ts";

/** 100 MB, as an upload may be large. */
const LARGEST_FILE = 100 * 1024 * 1024;

export interface ReadCsv {
  readonly table: UploadTable;
  readonly separator: Separator;
  readonly decimalComma: boolean;
  readonly bytes: number;
  readonly columns: UploadColumn[];
}

/**
 * Read a CSV as its bytes arrive, into typed columns.
 *
 * UTF-8 with or without byte order mark; comma, semicolon or tab, whichever the header has; decimal commas where
 * the separator makes them certain. An empty cell is missing; so are NA, NaN and . in a column whose other cells
 * are numbers (the column's description then names the words). Thousands separators make text. Memory is bounded
 * by the columns: 8 bytes a number, 4 bytes a text cell and its different values once.
 *
 * @throws Refusal naming the row and column, both counted as a person reads the file: the first row after the
 *   header is 1.
 * @throws Cancelled once `control` says so.
 */
export async function readCsv(
  source: AsyncIterable<Uint8Array>,
  name: string,
  control: RunControl = QUIET,
  limit: number = LARGEST_FILE,
): Promise<ReadCsv> {
  const hash = createHash("sha256");
  const pieces = new FilePieces(source, limit, (bytes) => hash.update(bytes));
  try {
    const separator = detectSeparator(await pieces.header());
    const { builders, rows } = await readColumns(pieces, separator, control);
    if (rows === 0) throw new Refusal(`${name} has a header of ${builders.length} columns and 0 rows under it.`);
    const { decimalComma, asText } = decideDecimalMark(builders);
    refuseInfinite(builders);
    const finished = builders.map((builder) => builder.finish(asText.has(builder)));
    return {
      table: { name, sha256: hash.digest("hex"), rows, columns: finished.map(({ column }) => column) },
      separator,
      decimalComma,
      bytes: pieces.received,
      columns: finished.map(({ column, missingWords }) => describeColumn(column, missingWords)),
    };
  } finally {
    await pieces.close();
  }
}

async function readColumns(pieces: FilePieces, separator: Separator, control: RunControl) {
  let builders: ColumnBuilder[] = [];
  let rows = 0;
  const sink: RecordSink = (cells, record, line) => {
    if (pieces.suspect) refuseSpoiledText(cells, record, line, builders);
    if (record === 0) {
      builders = readHeader(cells).map((column) => new ColumnBuilder(column, separator !== ","));
      return;
    }
    if (cells.length !== builders.length) refuseRagged(cells.length, builders.length, record, line);
    rows = record;
    for (let at = 0; at < cells.length; at++) builders[at].add(cells[at], record, line);
  };
  await readRecords(pieces, separator, sink, control);
  return { builders, rows };
}

function refuseRagged(cells: number, header: number, row: number, line: number): never {
  throw new Refusal([
    {
      sentence: `${capital(printPlace({ row, line }))} has ${cells} ${cells === 1 ? "cell" : "cells"}, the header has ${header}.`,
      row,
    },
  ]);
}

/** Bytes that are no UTF-8 have arrived: find the cell that holds them. */
function refuseSpoiledText(cells: readonly string[], row: number, line: number, builders: readonly ColumnBuilder[]) {
  const at = cells.findIndex((cell) => cell.includes("\uFFFD") || cell.includes("\0"));
  if (at < 0) return;
  const column = builders[at]?.name;
  const where =
    row === 0 ? "the header" : `${printPlace({ row, line })}${column === undefined ? "" : `, column ${column}`}`;
  const what = cells[at].includes("\0") ? "a NUL byte, which no text has" : "bytes that are not UTF-8";
  throw new Refusal([
    {
      sentence: `${capital(where)}: ${quoteCell(cells[at].replaceAll("\0", "\uFFFD"))} holds ${what}. Save the file as CSV in UTF-8.`,
      ...(row === 0 ? {} : { row, column }),
    },
  ]);
}

function refuseInfinite(builders: readonly ColumnBuilder[]): void {
  const problems = builders.flatMap((builder) => {
    const cell = builder.first.get("infinite");
    if (cell === undefined || builder.isText) return [];
    const sentence = `${capital(printPlace(cell))}, column ${builder.name}: ${quoteCell(cell.text)} is not a finite number; the largest is about 1.8e308.`;
    return [{ sentence, row: cell.row, column: builder.name }];
  });
  if (problems.length > 0) throw new Refusal(problems);
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
