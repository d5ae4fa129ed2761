import { isQuotable } from "../schemas/quotable.ts";
import { quotable } from "./quotable.ts";
import { quotationsOf } from "./quotations.ts";

/** A number that a text asks for: `canonical` is the vocabulary's own word for the first of its words. */
export interface AskedNumber {
  readonly from: number;
  readonly to: number;
  readonly cell: string;
  readonly words: readonly string[];
  readonly canonical?: string;
}

/** The numbers a text quotes, in its order, each with what its cell's kind calls it. */
export function askedNumbers(text: string, kindOf: (cell: string) => string | null | undefined): AskedNumber[] {
  return quotationsOf(text).quotations.map(({ from, to, cell, words }) => {
    const kind = kindOf(cell.word);
    const asked = words.map(({ word }) => word);
    const canonical = kind && isQuotable(kind) && asked[0] ? quotable(kind, asked[0])?.word : undefined;
    return { from, to, cell: cell.word, words: asked, ...(canonical !== undefined && { canonical }) };
  });
}
