import { isQuotable } from "../schemas/quotable.ts";
import { goodsNeeded, plainWord, quotable } from "./quotable.ts";
import { type PlacedWord, type Quotation, quotationsOf, quotedWord } from "./quotations.ts";

/**
 * A text with a good's new name wherever it asked for the good by the old, of the cells that have a kind here; words of
 * other cells, and words that are no goods, stay as they are.
 */
export function renameQuotedGood(
  text: string,
  kindOf: (cell: string) => string | null | undefined,
  from: string,
  to: string,
): string {
  return quotationsOf(text)
    .quotations.flatMap((one) => goodsOf(one, kindOf(one.cell.word)))
    .filter(({ word }) => plainWord(word) === plainWord(from))
    .reduceRight((renamed, word) => renamed.slice(0, word.from) + quotedWord(to) + renamed.slice(word.to), text);
}

/** The words of a quotation that are goods: those after the word for the number, or after the demographic. */
function goodsOf({ words }: Quotation, kind: string | null | undefined): readonly PlacedWord[] {
  if (!kind || !isQuotable(kind) || words.length === 0) return [];
  const needs = quotable(kind, words[0].word)?.needs;
  if (needs === undefined) return [];
  const start = needs === "demographic and good" ? 2 : 1;
  return words.slice(start, start + goodsNeeded(needs));
}
