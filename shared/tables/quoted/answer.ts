import type { QuotedPart } from "../../schemas/quotable.ts";
import { printQuantity, type QuantityKind } from "../numbers.ts";

/** A number as prose quotes it, and what it is in words. */
export interface QuotedAnswer {
  readonly printed: string;
  readonly says: string;
}

/** The finding holds no such number: why, as a sentence. */
export class NothingToQuote extends Error {
  override name = "NothingToQuote";
}

/** What stands after the word: goods, a demographic, a hypothesis; and which part of an estimate is wanted. */
export interface Asked {
  readonly words: readonly string[];
  readonly part: QuotedPart | undefined;
}

export const plain = (word: string): string => word.trim().toLowerCase().replace(/\s+/g, " ");

/** Where a written name stands among names; the names are told when it does not. */
export function placeAmong(written: string | undefined, names: readonly string[], what: string): number {
  const place = written === undefined ? -1 : names.findIndex((name) => plain(name) === plain(written));
  if (place >= 0) return place;
  const there = names.length > 0 ? `there are ${names.slice(0, 12).join(", ")}` : "it has none";
  throw new NothingToQuote(
    written === undefined ? `A ${what} is needed: ${there}.` : `It has no ${what} ${written}: ${there}.`,
  );
}

/** "1.318 (0.009)", or the part of it that is asked for. */
export function estimateInWords(
  { estimate, error }: { readonly estimate: number; readonly error: number | undefined },
  kind: QuantityKind,
  part: QuotedPart | undefined,
): string {
  const number = printQuantity(estimate, kind);
  if (part === "error" && error === undefined) throw new NothingToQuote("It has no standard error.");
  if (part === "error") return printQuantity(error ?? 0, kind);
  return part === "alone" || error === undefined ? number : `${number} (${printQuantity(error, kind)})`;
}
