import type { UploadColumn } from "../../../shared/schemas/resources.ts";
import { type CellClass, isCertainlyDecimal, quoteCell, readCell } from "./cell-text.ts";
import { GrowingCodes, GrowingNumbers } from "./growing.ts";
import type { RowPlace } from "./place.ts";
import type { TableColumn } from "./prepared-data.ts";

/** Where a column first met a cell of some class, and what it said. */
export interface FirstCell extends RowPlace {
  readonly text: string;
}

/** Different cells a column may have before it keeps numbers instead of a dictionary. */
const DICTIONARY_BOUND = 10_000;

const isNumber = (kind: CellClass) => kind === "whole" || kind === "dot" || kind === "comma";

/**
 * One column while the file is read. It begins as a dictionary (each different cell read once), so that
 * nothing of a text is lost; a column of numbers with very many different values goes over to the numbers
 * alone. Should such a column meet a text after all, its earlier levels are the numbers printed shortest.
 */
export class ColumnBuilder {
  readonly name: string;
  readonly first = new Map<CellClass, FirstCell>();
  /** A comma cell that cannot be thousands has been met here. */
  certainlyDecimal = false;
  private readonly commaMayBeDecimal: boolean;
  private readonly missingWords = new Set<string>();
  private readonly codeOf = new Map<string, number>();
  private levels: string[] = [];
  private classes: CellClass[] = [];
  private readings: number[] = [];
  private codes: GrowingCodes | null = new GrowingCodes();
  private values: GrowingNumbers | null = null;

  constructor(name: string, commaMayBeDecimal: boolean) {
    this.name = name;
    this.commaMayBeDecimal = commaMayBeDecimal;
  }

  add(raw: string, row: number, line: number): void {
    if (this.values !== null) {
      this.addNumber(this.values, raw, row, line);
      return;
    }
    this.codes?.push(this.codeOf.get(raw) ?? this.addLevel(raw, row, line));
    if (this.levels.length > DICTIONARY_BOUND) this.keepNumbersOnly();
  }

  /** The settled way: the number alone is kept. */
  private addNumber(values: GrowingNumbers, raw: string, row: number, line: number): void {
    const text = raw.trim();
    const reading = readCell(text, this.commaMayBeDecimal);
    if (reading.class === "text") {
      this.returnToDictionary(values);
      this.add(raw, row, line);
      return;
    }
    this.note(reading.class, text, row, line);
    values.push(reading.value);
  }

  private note(kind: CellClass, text: string, row: number, line: number): void {
    if (!this.first.has(kind)) this.first.set(kind, { row, line, text });
    if (kind === "missing word") this.missingWords.add(text);
    if (kind === "comma" && isCertainlyDecimal(text)) this.certainlyDecimal = true;
  }

  private addLevel(raw: string, row: number, line: number): number {
    const text = raw.trim();
    let code = this.codeOf.get(text);
    if (code === undefined) {
      const reading = readCell(text, this.commaMayBeDecimal);
      this.note(reading.class, text, row, line);
      code = this.levels.length;
      this.levels.push(text);
      this.classes.push(reading.class);
      this.readings.push(reading.value);
      this.codeOf.set(text, code);
    }
    this.codeOf.set(raw, code);
    return code;
  }

  private keepNumbersOnly(): void {
    // A comma that may yet turn out to set thousands apart needs its text kept.
    if (this.isText || this.codes === null || (this.first.has("comma") && !this.certainlyDecimal)) return;
    this.values = new GrowingNumbers();
    for (const code of this.codes.view()) this.values.push(this.readings[code]);
    this.codes = null;
    this.forgetLevels();
  }

  private returnToDictionary(values: GrowingNumbers): void {
    this.values = null;
    this.codes = new GrowingCodes();
    for (const value of values.view()) {
      const text = Number.isNaN(value) ? "" : String(value);
      // The places of first cells were noted as they were read; those of this pass do not count.
      this.codes.push(this.codeOf.get(text) ?? this.addLevel(text, 0, 0));
    }
  }

  private forgetLevels(): void {
    this.levels = [];
    this.classes = [];
    this.readings = [];
    this.codeOf.clear();
  }

  /** A cell that is no number has been met. */
  get isText(): boolean {
    return this.first.has("text");
  }

  /** The column as the table keeps it; `asText` where its commas turned out not to be decimal marks. */
  finish(asText: boolean): { column: TableColumn; missingWords: UploadColumn["missingWords"] } {
    if (this.isText || asText) return { column: this.finishText(), missingWords: undefined };
    const values = this.values?.view() ?? Float64Array.from(this.codes?.view() ?? [], (code) => this.readings[code]);
    return {
      column: { name: this.name, type: "number", values },
      missingWords: this.missingWords.size > 0 ? [...this.missingWords].sort() : undefined,
    };
  }

  private finishText(): TableColumn {
    const kept = this.classes.map((kind) => kind !== "empty");
    const levels = this.levels.filter((_, code) => kept[code]);
    let next = 0;
    const renumbered = kept.map((keep) => (keep ? next++ : -1));
    let numbers = 0;
    let filled = 0;
    const codes = Int32Array.from(this.codes?.view() ?? [], (code) => {
      if (kept[code]) filled++;
      if (isNumber(this.classes[code])) numbers++;
      return renumbered[code];
    });
    const odd = this.first.get("text") ?? this.first.get("comma");
    const mostlyNumbers = 2 * numbers > filled && odd !== undefined;
    return {
      name: this.name,
      type: "text",
      codes,
      levels,
      ...(mostlyNumbers ? { firstText: { row: odd.row, value: odd.text } } : {}),
    };
  }

  /** "12,5 in p_dairy, row 3", for a sentence. */
  printFirst(kind: CellClass): string {
    const cell = this.first.get(kind);
    return cell === undefined ? this.name : `${quoteCell(cell.text)} in ${this.name}, row ${cell.row}`;
  }
}
