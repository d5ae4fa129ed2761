import type { UploadColumn } from "../../../../shared/schemas/resources.ts";
import { counted } from "../../../../shared/study/words.ts";
import { printCount } from "../../../../shared/tables/numbers.ts";
import { Refusal } from "../../refusal.ts";
import { Cancelled, type RunControl } from "../../run.ts";
import { quoteCell } from "../cell-text.ts";
import { ColumnBuilder } from "../column-builder.ts";
import { describeColumn } from "../describe-column.ts";
import type { FileBytes } from "../file-bytes.ts";
import { readHeader } from "../header.ts";
import type { TableColumn } from "../prepared-data.ts";
import { type Area, letters, readSheet, type SheetRow } from "./sheet-cells.ts";
import { readParts, type WorkbookParts, type WorkbookSheet } from "./workbook-parts.ts";
import { ENOUGH } from "./xml-tags.ts";
import { ZipEntries } from "./zip-entries.ts";

/** Fifty million numbers are 400 MB of columns. */
const MOST_CELLS = 50_000_000;
const ROWS_BETWEEN_LOOKS = 500;

interface ReadWorkbook {
  readonly rows: number;
  readonly columns: TableColumn[];
  readonly described: UploadColumn[];
  readonly sheet: string;
  readonly sheets: string[];
}

/**
 * Read one sheet of a workbook as its bytes are unpacked: the one named, if there is one of that name, otherwise the
 * first that is shown and not empty. The first row with anything in it is the head; rows without anything are none.
 * What a cell shows as an error stays as its word, so that a column with one is text and is refused by the row where it
 * is used, as in a CSV. Merged cells are refused by their place: all but the first would be missing.
 */
export async function readWorkbook(
  file: FileBytes,
  name: string,
  wanted: string | undefined,
  control: RunControl,
): Promise<ReadWorkbook> {
  control.progress({ step: "unpacking the workbook" });
  const zip = new ZipEntries(file);
  const parts = await readParts(zip);
  const sheet = parts.sheets.find((one) => one.name === wanted) ?? (await firstWithCells(zip, parts));
  const table = new SheetTable(sheet.name, control);
  const merged: Area[] = [];
  await readSheet(zip.read(sheet.part), sheet.part, parts, {
    row: (row) => table.add(row),
    merged: (area) => merged.push(area),
  });
  table.refuseShape(merged);
  if (table.rows === 0) {
    throw new Refusal(
      `Sheet ${sheet.name} of ${name} has ${table.width === 0 ? "no cells" : `a head of ${counted(table.width, "column")} and 0 rows under it`}.`,
    );
  }
  return { ...table.finish(), sheet: sheet.name, sheets: parts.sheets.map((one) => one.name) };
}

async function firstWithCells(zip: ZipEntries, parts: WorkbookParts): Promise<WorkbookSheet> {
  const shown = parts.sheets.filter(({ hidden }) => !hidden);
  for (const sheet of shown) {
    let hasCells = false;
    await readSheet(zip.read(sheet.part), sheet.part, parts, {
      row() {
        hasCells = true;
        throw ENOUGH;
      },
    });
    if (hasCells) return sheet;
  }
  throw new Refusal(`The workbook has ${counted(shown.length, "sheet")} to be seen, and none with a cell in it.`);
}

/** The rows of a sheet on their way into columns. */
class SheetTable {
  rows = 0;
  private readonly sheet: string;
  private readonly control: RunControl;
  private builders: ColumnBuilder[] = [];
  private first = 0;
  private head = 0;
  /** What is wrong with its shape; told after the merged cells, which may be why. */
  private fault: Refusal | undefined;
  private lastRow = 0;

  constructor(sheet: string, control: RunControl) {
    this.sheet = sheet;
    this.control = control;
  }

  get width(): number {
    return this.builders.length;
  }

  add({ row, cells }: SheetRow): void {
    if (row <= this.lastRow) throw new Refusal(`Sheet ${this.sheet} has row ${row} after row ${this.lastRow}.`);
    this.lastRow = row;
    if (this.head === 0) {
      this.begin(row, cells);
      return;
    }
    this.rows++;
    if (this.rows % ROWS_BETWEEN_LOOKS === 0) this.look();
    if (this.fault !== undefined) return;
    let found = 0;
    for (let at = 0; at < this.builders.length; at++) {
      const text = cells.get(this.first + at);
      if (text !== undefined) found++;
      this.builders[at].add(text ?? "", this.rows, row);
    }
    if (found < cells.size) this.fault = this.outside(row, cells);
  }

  private begin(row: number, cells: ReadonlyMap<number, string>): void {
    const places = [...cells.keys()].sort((a, b) => a - b);
    const last = places[places.length - 1];
    this.first = places[0];
    this.head = row;
    const names = Array.from({ length: last - this.first + 1 }, (_, at) => cells.get(this.first + at) ?? "");
    try {
      this.builders = readHeader(names).map((name) => new ColumnBuilder(name, false));
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      this.fault = error;
    }
  }

  private look(): void {
    if (this.control.cancelled()) throw new Cancelled("The reading of the file was cancelled.");
    this.control.progress({ step: `reading rows of sheet ${this.sheet}, ${printCount(this.rows)} so far` });
    if (this.rows * this.width > MOST_CELLS) {
      throw new Refusal(`Sheet ${this.sheet} has more than ${printCount(MOST_CELLS)} cells; no more are read.`);
    }
  }

  private outside(row: number, cells: ReadonlyMap<number, string>): Refusal {
    const outside = [...cells.keys()].find((at) => at < this.first || at >= this.first + this.width)!;
    const cell = `${letters(outside)}${row}`;
    const range = `${letters(this.first)} to ${letters(this.first + this.width - 1)}`;
    return new Refusal([
      {
        sentence: `Cell ${cell} of sheet ${this.sheet} has ${quoteCell(cells.get(outside) ?? "")}, and the head, row ${this.head}, names columns ${range} only.`,
        row: this.rows,
      },
    ]);
  }

  /** Merged cells within the table, and otherwise what else is wrong with its shape. */
  refuseShape(areas: readonly Area[]): void {
    const last = this.first + this.width - 1;
    const within = areas.filter(
      ({ rows, columns }) =>
        rows[1] >= this.head &&
        rows[0] <= this.lastRow &&
        (this.fault !== undefined || (columns[1] >= this.first && columns[0] <= last)),
    );
    if (within.length === 0) {
      if (this.fault !== undefined) throw this.fault;
      return;
    }
    throw new Refusal(
      within.slice(0, 20).map(({ written, rows }) => ({
        sentence:
          rows[0] <= this.head
            ? `The head of sheet ${this.sheet} is merged over ${written}; give each column a name of its own, in one row.`
            : `Cells ${written} of sheet ${this.sheet} are merged, so that all but the first would be missing; part them and fill each.`,
      })),
    );
  }

  finish(): Pick<ReadWorkbook, "rows" | "columns" | "described"> {
    const columns: TableColumn[] = [];
    const described: UploadColumn[] = [];
    for (const [at, builder] of this.builders.entries()) {
      const infinite = builder.isText ? undefined : builder.first.get("infinite");
      if (infinite) {
        const cell = `${letters(this.first + at)}${infinite.line}`;
        const sentence = `Cell ${cell} of sheet ${this.sheet}, row ${infinite.row} of column ${builder.name}: ${quoteCell(infinite.text)} is not a finite number; the largest is about 1.8e308.`;
        throw new Refusal([{ sentence, row: infinite.row, column: builder.name }]);
      }
      const { column, missingWords } = builder.finish(false);
      columns.push(column);
      described.push(describeColumn(column, missingWords));
    }
    return { rows: this.rows, columns, described };
  }
}
