import { parquetMetadata } from "hyparquet";
import type { UploadColumn } from "../../../../shared/schemas/resources.ts";
import { printCount } from "../../../../shared/tables/numbers.ts";
import { Refusal } from "../../refusal.ts";
import { Cancelled, type RunControl } from "../../run.ts";
import { quoteCell } from "../cell-text.ts";
import { ColumnBuilder } from "../column-builder.ts";
import { describeColumn } from "../describe-column.ts";
import type { FileBytes } from "../file-bytes.ts";
import type { TableColumn } from "../prepared-data.ts";
import { cellReader } from "./column-values.ts";
import { decodePages } from "./decode-pages.ts";
import { type ParquetColumn, parquetColumns } from "./parquet-columns.ts";

/** The footer describes the file; a file of 2,000 columns and 100 groups of rows has about so much. */
const LARGEST_FOOTER = 32 * 1024 ** 2;
const TAIL = 8;

interface ReadParquet {
  readonly rows: number;
  readonly columns: TableColumn[];
  readonly described: UploadColumn[];
}

/**
 * Read a Parquet file a column at a time: beside the columns it holds one chunk of one column unpacked.
 *
 * Whole numbers beyond 2⁵³, which doubles do not hold, and infinities are refused by row and column; NaN and null are
 * missing.
 */
export async function readParquet(file: FileBytes, name: string, control: RunControl): Promise<ReadParquet> {
  const { rows, columns: declared } = declaredColumns(file);
  if (rows === 0) throw new Refusal(`${name} has ${declared.length} columns and 0 rows.`);
  const columns: TableColumn[] = [];
  const described: UploadColumn[] = [];
  for (const [at, column] of declared.entries()) {
    const step = () => {
      if (control.cancelled()) throw new Cancelled("The reading of the file was cancelled.");
      control.progress({ step: `reading column ${column.name}`, fraction: at / declared.length });
    };
    const { finished, missingWords } = readColumn(file, column, rows, step);
    columns.push(finished);
    described.push(describeColumn(finished, missingWords));
  }
  return { rows, columns, described };
}

function footer(file: FileBytes): Uint8Array {
  const tail = file.size < 2 * TAIL ? undefined : file.slice(file.size - TAIL, file.size);
  const length = tail && new DataView(tail.buffer).getUint32(0, true);
  const ends = tail && new TextDecoder().decode(tail.subarray(4));
  if (length === undefined || ends !== "PAR1") {
    throw new Refusal(`The Parquet file is cut short: its ${printCount(file.size)} bytes do not end as one does.`);
  }
  if (length > LARGEST_FOOTER || length + TAIL > file.size) {
    throw new Refusal(
      `The footer of the Parquet file would have ${printCount(length)} bytes; the file has ${printCount(file.size)}, and at most ${printCount(LARGEST_FOOTER)} are read.`,
    );
  }
  return file.slice(file.size - TAIL - length, file.size);
}

function declaredColumns(file: FileBytes): ReturnType<typeof parquetColumns> {
  const bytes = footer(file);
  try {
    return parquetColumns(parquetMetadata(bytes, { geoparquet: false }));
  } catch (error) {
    if (error instanceof Refusal) throw error;
    throw new Refusal(`The footer of the Parquet file cannot be read: ${(error as Error).message}.`);
  }
}

function readColumn(file: FileBytes, column: ParquetColumn, rows: number, step: () => void) {
  const { kind, cell } = cellReader(column.element);
  const builder = kind === "text" ? new ColumnBuilder(column.name, false) : undefined;
  const values = new Float64Array(builder ? 0 : rows);
  let row = 0;
  for (const part of column.chunks) {
    step();
    const groupStart = row;
    try {
      for (const page of decodePages(bytesOf(file, column, part), column, part)) {
        for (let at = 0; at < page.length; at++) {
          const value = page[at] ?? null;
          if (builder) builder.add(value === null ? "" : String(cell(value)), row + 1, row + 2);
          else values[row] = value === null ? Number.NaN : asNumber(cell(value), row + 1, column.name);
          row++;
        }
      }
    } catch (error) {
      if (error instanceof Refusal || error instanceof Cancelled) throw error;
      throw spoiled(column.name, groupStart, groupStart + part.rows, error as Error);
    }
  }
  if (row !== rows)
    throw new Refusal(`${column.name} has ${printCount(row)} values, the file has ${printCount(rows)} rows.`);
  if (!builder) return { finished: { name: column.name, type: "number" as const, values }, missingWords: undefined };
  const infinite = builder.isText ? undefined : builder.first.get("infinite");
  if (infinite) throw infinity(infinite.text, infinite.row, column.name);
  const { column: finished, missingWords } = builder.finish(false);
  return { finished, missingWords };
}

function asNumber(value: number | string | bigint, row: number, column: string): number {
  if (typeof value === "number") {
    if (Number.isFinite(value)) return value;
    if (Number.isNaN(value)) return Number.NaN;
    throw infinity(String(value), row, column);
  }
  const sentence = `Row ${printCount(row)}, column ${column}: ${value} is a whole number beyond 9,007,199,254,740,992 (2 to the power of 53), the largest that is kept exactly. Write it as text if it only identifies.`;
  throw new Refusal([{ sentence, row, column }]);
}

function infinity(text: string, row: number, column: string): Refusal {
  const sentence = `Row ${printCount(row)}, column ${column}: ${quoteCell(text)} is not a finite number; the largest is about 1.8e308.`;
  return new Refusal([{ sentence, row, column }]);
}

function bytesOf(file: FileBytes, column: ParquetColumn, { chunk }: ParquetColumn["chunks"][number]) {
  const first = chunk.dictionary_page_offset;
  const from = Number(
    first !== undefined && first > 0n && first < chunk.data_page_offset ? first : chunk.data_page_offset,
  );
  const length = Number(chunk.total_compressed_size);
  if (!(from >= 4) || !(length >= 0) || from + length > file.size) {
    throw new Refusal(
      `${column.name} would stand in bytes ${printCount(from)} to ${printCount(from + length)} of the file, which has ${printCount(file.size)}.`,
    );
  }
  return file.slice(from, from + length);
}

function spoiled(column: string, from: number, to: number, { message }: Error): Refusal {
  const sentence = `${column} cannot be read in rows ${printCount(from + 1)} to ${printCount(to)} of the Parquet file: ${message}.`;
  return new Refusal([{ sentence, row: from + 1, column }]);
}
