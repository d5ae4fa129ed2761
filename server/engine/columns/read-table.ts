import { createHash } from "node:crypto";
import type { UploadColumn } from "../../../shared/schemas/resources.ts";
import { QUIET, type RunControl } from "../run.ts";
import { findAgreements } from "./agreements.ts";
import type { FileBytes } from "./file-bytes.ts";
import { type FileFormat, fileFormat } from "./file-format.ts";
import { readParquet } from "./parquet/read-parquet.ts";
import type { UploadTable } from "./prepared-data.ts";
import { readCsv } from "./read-csv.ts";
import { readWorkbook } from "./workbook/read-workbook.ts";

/** A file as columns, with how they stood in it. */
export interface ReadTable {
  readonly table: UploadTable;
  readonly columns: UploadColumn[];
  readonly format: FileFormat;
  readonly csv?: { readonly separator: string; readonly decimalComma: boolean };
  /** Of a workbook: the sheet that was read, and the names of all. */
  readonly workbook?: { readonly sheet: string; readonly sheets: readonly string[] };
}

interface ReadOptions {
  /** Of a workbook: the sheet to read where it has one of this name; otherwise the first that is not empty. */
  readonly sheet?: string;
  readonly control?: RunControl;
}

/**
 * Read a table from CSV, Parquet or XLSX, known by its content, into the same typed columns: numbers with NaN for a
 * missing value, and text. A column is one of numbers when each of its cells reads as a number, in whatever format the
 * file is; truth is 1 and falsehood 0; days are written 2029-03-14, moments 2029-03-14T09:30:00.
 *
 * The table's SHA-256 is that of the file; of a workbook, that of the file's with the name of the sheet read, as two
 * sheets of one file are two tables.
 *
 * @throws Refusal naming the place: the row (the first under the head is 1) and the column, or the sheet and the cell.
 * @throws Cancelled once `control` says so.
 */
export async function readTable(file: FileBytes, name: string, options: ReadOptions = {}): Promise<ReadTable> {
  const read = await readColumns(file, name, options);
  const agreements = findAgreements(read.table.columns);
  if (agreements.length === 0) return read;
  const columns = read.columns.map((column) => {
    const own = agreements.filter(({ of, is }) => is === column.name || of.includes(column.name));
    return own.length === 0 ? column : { ...column, agreements: own };
  });
  return { ...read, columns };
}

async function readColumns(file: FileBytes, name: string, { sheet, control = QUIET }: ReadOptions): Promise<ReadTable> {
  const format = fileFormat(file, name);
  if (format === "csv") {
    const { table, columns, separator, decimalComma } = await readCsv(file.pieces(), name, control);
    return { table, columns, format, csv: { separator, decimalComma } };
  }
  const sha256 = await hashOf(file);
  if (format === "parquet") {
    const { rows, columns, described } = await readParquet(file, name, control);
    return { table: { name, sha256, rows, columns }, columns: described, format };
  }
  const { rows, columns, described, ...workbook } = await readWorkbook(file, name, sheet, control);
  const ofSheet = createHash("sha256").update(`${sha256} ${workbook.sheet}`).digest("hex");
  return { table: { name, sha256: ofSheet, rows, columns }, columns: described, format, workbook };
}

async function hashOf(file: FileBytes): Promise<string> {
  const hash = createHash("sha256");
  for await (const piece of file.pieces()) hash.update(piece);
  return hash.digest("hex");
}
