import { proseSpans, type Span } from "./prose-spans.ts";
import { remembering } from "./remembering.ts";

/** A word at its place in a text, without the spaces around it. */
export interface PlacedWord extends Span {
  readonly word: string;
}

/** A finding quoted in prose, as written: {base: eta, meat & fish}. */
export interface Quotation extends Span {
  readonly cell: PlacedWord;
  /** What is asked of the cell, then of what: eta, meat & fish. */
  readonly words: readonly PlacedWord[];
}

/** The quotations of a Markdown text, in its order, and those that stand where none is read. */
export interface Quotations {
  readonly quotations: readonly Quotation[];
  /** Between dollar signs, where a number could not be marked. */
  readonly inMathematics: readonly Quotation[];
}

/** A brace that no backslash escapes, a cell's name, a colon, words without braces; over line ends, not over empty lines. */
const QUOTATION = /\{(\s*)(\p{L}[\p{L}\p{N} _-]{0,59}?)(\s*):((?:"[^"\n]{0,200}"|[^{}"]){0,300}?)\}/gu;

/**
 * What a Markdown text quotes. A quotation is a pair of braces with a cell's name, a colon and words parted by commas;
 * a name that has commas or braces itself stands in double quotes. None is read in code, after a backslash, or between
 * dollar signs.
 */
export const quotationsOf = remembering(readQuotations, 512 * 1024);

function readQuotations(text: string): Quotations {
  const { code, mathematics } = proseSpans(text);
  const quotations: Quotation[] = [];
  const inMathematics: Quotation[] = [];
  for (const match of text.matchAll(QUOTATION)) {
    const [whole, before, name, , words] = match;
    const from = match.index;
    if (text[from - 1] === "\\" || /\n[ \t]*\n/.test(whole) || isWithin(code, from)) continue;
    const start = from + 1 + before.length;
    const quotation = {
      from,
      to: from + whole.length,
      cell: { word: name, from: start, to: start + name.length },
      words: wordsOf(words, from + whole.length - 1 - words.length),
    };
    (isWithin(mathematics, from) ? inMathematics : quotations).push(quotation);
  }
  return { quotations, inMathematics };
}

function isWithin(spans: readonly Span[], at: number): boolean {
  return spans.some(({ from, to }) => from <= at && at < to);
}

/** Words parted by commas outside double quotes; within, line ends and several spaces are one space. */
function wordsOf(text: string, offset: number): PlacedWord[] {
  return [...text.matchAll(/(?:"[^"]*"|[^,"])+/g)].flatMap(({ 0: part, index }) => {
    const trimmed = part.trim();
    if (trimmed === "") return [];
    const from = offset + index + part.indexOf(trimmed);
    const word = trimmed.replace(/^"(.*)"$/s, "$1").replace(/\s+/g, " ");
    return [{ word, from, to: from + trimmed.length }];
  });
}

/** The names of the cells a text quotes, once each, in its order. */
export function quotedCells(text: string): string[] {
  return [...new Set(quotationsOf(text).quotations.map(({ cell }) => cell.word))];
}

/** A text with a cell's new name wherever it quoted the cell by the old. */
export function renameQuoted(text: string, from: string, to: string): string {
  return quotationsOf(text)
    .quotations.filter(({ cell }) => cell.word === from)
    .reduceRight((renamed, { cell }) => renamed.slice(0, cell.from) + to + renamed.slice(cell.to), text);
}

/** A text with its quoted cells by their place among them: what they are called does not matter to what is said. */
export function withoutCellNames(text: string): string {
  const names = quotedCells(text);
  return quotationsOf(text).quotations.reduceRight(
    (plain, { cell }) => `${plain.slice(0, cell.from)}${names.indexOf(cell.word) + 1}${plain.slice(cell.to)}`,
    text,
  );
}

/** A word as a quotation writes it: in double quotes where it must be. */
export function quotedWord(word: string): string {
  return /[{},"]/.test(word) ? `"${word.replaceAll('"', "")}"` : word;
}
