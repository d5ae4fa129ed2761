/** What one cell of a CSV says, before its column is known to be numbers or text. */
export type CellClass = "empty" | "missing word" | "whole" | "dot" | "comma" | "infinite" | "text";

export interface CellReading {
  readonly class: CellClass;
  /** The number of a whole, dot or comma cell; NaN otherwise. */
  readonly value: number;
}

/** Words that stand for a missing value in a column whose other cells are numbers. */
const MISSING_WORDS: ReadonlySet<string> = new Set(["NA", "NaN", "nan", "."]);

const COMMA_NUMBER = /^[+-]?(\d+,\d*|,\d+)([eE][+-]?\d+)?$/;
/** One to three digits, then a comma and three: a decimal, or thousands; the cell alone does not say. */
const PERHAPS_THOUSANDS = /^[+-]?[1-9]\d{0,2},\d{3}$/;
const INFINITE_WORD = /^[+-]?(inf|infinity)$/i;

const EMPTY: CellReading = { class: "empty", value: Number.NaN };
const MISSING_WORD: CellReading = { class: "missing word", value: Number.NaN };
const TEXT: CellReading = { class: "text", value: Number.NaN };
const INFINITE: CellReading = { class: "infinite", value: Number.NaN };

const ZERO = 48;
const NINE = 57;

/** 0x1f, 0b1 and 0o7 read as numbers in JavaScript and are none in a table. */
function hasPrefix(text: string): boolean {
  const second = text.charCodeAt(1);
  return text.charCodeAt(0) === ZERO && second > NINE && second !== 101 && second !== 69;
}

/**
 * Read a trimmed cell. A comma counts as a decimal mark only where it cannot separate cells; thousands
 * separators, units and per cent signs make text.
 */
export function readCell(text: string, commaMayBeDecimal: boolean): CellReading {
  if (text === "") return EMPTY;
  const value = Number(text);
  if (Number.isFinite(value)) {
    if (hasPrefix(text)) return TEXT;
    return { class: text.includes(".") ? "dot" : "whole", value };
  }
  if (MISSING_WORDS.has(text)) return MISSING_WORD;
  // Number() gives an infinity both for the word and for digits beyond the largest double.
  if (!Number.isNaN(value) || INFINITE_WORD.test(text)) return INFINITE;
  if (commaMayBeDecimal && COMMA_NUMBER.test(text)) {
    const decimal = Number(text.replace(",", "."));
    return Number.isFinite(decimal) ? { class: "comma", value: decimal } : INFINITE;
  }
  return TEXT;
}

/** True where a comma cell could not be a number with thousands set apart. */
export function isCertainlyDecimal(text: string): boolean {
  return !PERHAPS_THOUSANDS.test(text);
}

/** A cell quoted in a sentence, cut where it is long. */
export function quoteCell(text: string): string {
  return `"${text.length > 40 ? `${text.slice(0, 40)}…` : text}"`;
}
