import type { QuotedNumber } from "../../../shared/schemas/text.ts";

/** Signs of private use, which no Markdown has a meaning for: they hold the place of a quotation while it is read. */
const OPEN = "\uE000";
const CLOSE = "\uE001";
const MARK = /\uE000(\d+)\uE001/g;

/** A text with a mark in the place of each quotation; marks that someone has written are none. */
export function withMarks(text: string, quotations: readonly Pick<QuotedNumber, "from" | "to">[]): string {
  const plain = text.replace(/[\uE000\uE001]/g, "\uFFFD");
  return quotations.reduceRight(
    (marked, { from, to }, place) => `${marked.slice(0, from)}${OPEN}${place}${CLOSE}${marked.slice(to)}`,
    plain,
  );
}

/** What was written where a mark stands: in code, addresses and the like a quotation is only its own letters. */
export function withoutMarks(
  marked: string,
  text: string,
  quotations: readonly Pick<QuotedNumber, "from" | "to">[],
): string {
  return marked.replace(MARK, (_, place) => {
    const quotation = quotations[Number(place)];
    return quotation ? text.slice(quotation.from, quotation.to) : "";
  });
}

/**
 * Quotes and lists opened on one line, one within the other, down to a depth that any page can draw; what stands deeper
 * is text. Readers of Markdown take a time that grows with the square of the depth.
 */
export function shallow(marked: string): string {
  return marked.replace(OPENED_DEEPLY, "$1\\$2");
}

const OPENED_DEEPLY =
  /^((?:[ \t]*(?:>|[-+*](?=[ \t])|\d{1,9}[.)](?=[ \t]))){12}[ \t]*)(?=>|[-+*][ \t]|\d{1,9}[.)][ \t])(\D?)/gm;

/** Text between marks, and the places of the quotations. */
export function atMarks(marked: string): (string | number)[] {
  return marked.split(MARK).flatMap((part, i): (string | number)[] => {
    if (i % 2 === 1) return [Number(part)];
    return part === "" ? [] : [part];
  });
}
