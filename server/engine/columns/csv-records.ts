import { CsvError, parse } from "csv-parse";
import { printCount } from "../../../shared/tables/numbers.ts";
import { Refusal } from "../refusal.ts";
import { Cancelled, type RunControl } from "../run.ts";
import { printPlace } from "./place.ts";
import type { Separator } from "./separator.ts";

/** A record longer than this has most likely swallowed the rest of the file after a stray quote. */
const LONGEST_RECORD = 1_000_000;
const SLICE = 256 * 1024;

/** Told of each record: its cells, its number (the header is 0) and the line on which it begins. */
export type RecordSink = (cells: string[], record: number, line: number) => void;

/**
 * Read the records of a CSV as its bytes arrive. Quoted cells may hold separators, line breaks and doubled
 * quotes; blank lines are no records. What `sink` throws ends the reading.
 */
export async function readRecords(
  pieces: AsyncIterable<Uint8Array>,
  separator: Separator,
  sink: RecordSink,
  control: RunControl,
): Promise<void> {
  let records = 0;
  let nextLine = 1;
  const parser = parse({
    delimiter: separator,
    record_delimiter: ["\r\n", "\n", "\r"],
    relax_column_count: true,
    skip_empty_lines: true,
    max_record_size: LONGEST_RECORD,
    on_record: (cells: string[], { lines }) => {
      sink(cells, records++, lines - breaksWithin(cells));
      nextLine = lines + 1;
      return null;
    },
  });
  const ended = new Promise<void>((resolve, reject) => {
    parser.on("error", reject);
    parser.on("end", resolve);
  });
  // Awaited below; an error in between must not count as unhandled.
  ended.catch(() => undefined);
  parser.resume();
  try {
    for await (const piece of pieces) {
      for (let from = 0; from < piece.length; from += SLICE) {
        if (control.cancelled()) throw new Cancelled("The reading of the file was cancelled.");
        await write(parser, piece.subarray(from, from + SLICE));
        control.progress({ step: `reading rows, ${printCount(Math.max(0, records - 1))} so far` });
      }
    }
    parser.end();
    await ended;
  } catch (error) {
    parser.destroy();
    throw error instanceof CsvError ? refusalOf(error, records, nextLine) : error;
  }
}

function write(parser: ReturnType<typeof parse>, bytes: Uint8Array): Promise<void> {
  return new Promise((resolve, reject) => {
    parser.write(bytes, (error) => (error ? reject(error) : resolve()));
  });
}

function breaksWithin(cells: readonly string[]): number {
  let breaks = 0;
  for (const cell of cells) {
    if (cell.includes("\n") || cell.includes("\r")) breaks += (cell.match(/\r\n|\n|\r/g) ?? []).length;
  }
  return breaks;
}

function refusalOf(error: CsvError, records: number, line: number): Refusal {
  const place = records === 0 ? "the header" : printPlace({ row: records, line });
  const row = records === 0 ? {} : { row: records };
  const told: Partial<Record<CsvError["code"], string>> = {
    CSV_QUOTE_NOT_CLOSED: `A quote opened in ${place} is never closed: the file ends inside it.`,
    CSV_INVALID_CLOSING_QUOTE: `In ${place} a quoted cell goes on after its closing quote; a quote inside a quoted cell is written twice.`,
    INVALID_OPENING_QUOTE: `In ${place} a quote stands inside a cell that does not begin with one; quote the whole cell and write the inner quote twice.`,
    CSV_MAX_RECORD_SIZE: `The record of ${place} is longer than ${LONGEST_RECORD} characters; a quote opened there is probably not closed.`,
  };
  return new Refusal([
    { sentence: told[error.code] ?? `In ${place} the file stops being a CSV: ${error.message}`, ...row },
  ]);
}
