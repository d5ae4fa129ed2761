import { Refusal } from "../../refusal.ts";
import { dayText, momentText } from "../calendar-text.ts";
import { TextOfRuns, type WorkbookParts } from "./workbook-parts.ts";
import { readTags } from "./xml-tags.ts";

/** A row of a sheet that has something: its number in the sheet, and its texts by the number of their column, from 1. */
export interface SheetRow {
  readonly row: number;
  readonly cells: ReadonlyMap<number, string>;
}

export interface Area {
  /** As the sheet writes it: "A1:C1". */
  readonly written: string;
  readonly rows: readonly [first: number, last: number];
  readonly columns: readonly [first: number, last: number];
}

interface Heard {
  /** Each row that is not empty, in order; ENOUGH ends the reading. */
  row(row: SheetRow): void;
  /** Areas whose cells are merged into one: told after the rows. */
  merged?(area: Area): void;
}

const MOST_COLUMNS = 16_384;
const MOST_ROWS = 1_048_576;
const MILLISECONDS = 86_400_000;

/**
 * The cells of a sheet as the texts a CSV of it would have: numbers in full, days as 2029-03-14, truth as 1 and 0, of
 * a formula its last result, of an error its word (#DIV/0!).
 */
export async function readSheet(
  bytes: AsyncIterable<Uint8Array>,
  part: string,
  parts: WorkbookParts,
  heard: Heard,
): Promise<void> {
  let row = 0;
  let column = 0;
  let cells = new Map<number, string>();
  let type = "n";
  let style = 0;
  let value = "";
  let inValue = false;
  const inline = new TextOfRuns();
  await readTags(bytes, part, {
    open(name, attributes) {
      if (name === "v") inValue = true;
      else if (name === "c") {
        column = attributes.r === undefined ? column + 1 : columnOf(attributes.r);
        type = attributes.t ?? "n";
        style = Number(attributes.s ?? 0);
        value = "";
      } else if (name === "row") {
        row = attributes.r === undefined ? row + 1 : Number(attributes.r);
        if (!(row >= 1 && row <= MOST_ROWS)) throw new Refusal(`The sheet has a row numbered ${attributes.r}.`);
        column = 0;
        cells = new Map();
      } else if (name === "mergeCell") heard.merged?.(areaOf(attributes.ref ?? ""));
      else inline.open(name);
    },
    text(words) {
      if (inValue) value += words;
      else inline.add(words);
    },
    close(name) {
      if (name === "v") inValue = false;
      else if (name === "c") {
        const text =
          type === "inlineStr" ? inline.take() : textOf(value, type, style, parts, `${letters(column)}${row}`);
        if (text !== "") cells.set(column, text);
      } else if (name === "row" && cells.size > 0) heard.row({ row, cells });
      else inline.close(name);
    },
  });
}

function textOf(value: string, type: string, style: number, { texts, isDate, from1904 }: WorkbookParts, cell: string) {
  if (type === "s") {
    const text = texts[Number(value)];
    if (text === undefined)
      throw new Refusal(`Cell ${cell} takes text ${value} of the workbook, which has ${texts.length}.`);
    return text;
  }
  if (value === "" || type === "str" || type === "e" || type === "b") return value;
  // A day written as such, by programs that keep no count of days.
  if (type === "d") return value.replace(/T00:00:00(\.0+)?Z?$/, "");
  return isDate[style] ? dateOf(Number(value), from1904, cell) : value;
}

/** Days since the end of 1899, or since 1904, the time of day behind the point. The 29th of February 1900, which never was, has a number. */
function dateOf(count: number, from1904: boolean, cell: string): string {
  const days = from1904 ? count - 24_107 : count - (count < 60 ? 25_568 : 25_569);
  const ticks = Math.round(days * MILLISECONDS);
  try {
    // To the second: a fraction of a day holds no more for sure.
    if (ticks % MILLISECONDS === 0) return dayText(ticks / MILLISECONDS);
    return momentText(BigInt(Math.round(ticks / 1000)), 1n);
  } catch {
    throw new Refusal(`Cell ${cell} is shown as a day, and its number, ${count}, is outside the years 0 to 9999.`);
  }
}

const LETTERS = /^\$?([A-Z]{1,3})\$?(\d*)$/;

function columnOf(reference: string): number {
  const match = LETTERS.exec(reference);
  const number = match ? [...match[1]].reduce((sum, letter) => sum * 26 + letter.charCodeAt(0) - 64, 0) : 0;
  if (number < 1 || number > MOST_COLUMNS) throw new Refusal(`The sheet has a cell called ${reference.slice(0, 20)}.`);
  return number;
}

/** 1 is A, 27 is AA. */
export function letters(column: number): string {
  const rest = column - 1;
  return rest < 26 ? String.fromCharCode(65 + rest) : letters(Math.floor(rest / 26)) + letters((rest % 26) + 1);
}

function areaOf(written: string): Area {
  const [from, to = from] = written.split(":");
  const rowOf = (reference: string) => Number(LETTERS.exec(reference)?.[2]);
  return { written, rows: [rowOf(from), rowOf(to)], columns: [columnOf(from), columnOf(to)] };
}
