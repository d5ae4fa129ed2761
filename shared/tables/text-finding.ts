import type { Finding } from "../schemas/cell.ts";
import type { QuotedNumber, SealedNumber, SealedText, TextFinding } from "../schemas/text.ts";
import { textCell } from "./cells.ts";
import { printCount } from "./numbers.ts";
import { quoteOf } from "./quoted/quote.ts";
import type { LabelledTable } from "./table.ts";

/** A quotation as it was read from a text; `canonical` is the vocabulary's word for the first of its words. */
export interface AskedNumber {
  readonly from: number;
  readonly to: number;
  readonly cell: string;
  readonly words: readonly string[];
  readonly canonical?: string;
}

/** What a quoted cell has to say: a finding that answers it, an older one and why it is that, or none and why. */
export type QuotedCell =
  | { readonly standing: "current"; readonly finding: Finding; readonly fingerprint?: string }
  | {
      readonly standing: "out of date";
      readonly finding: Finding;
      readonly fingerprint?: string;
      readonly because: string;
    }
  | { readonly standing: "absent"; readonly because: string };

/**
 * A text with its quoted numbers looked up, each with the finding it is from. A number is called current only where
 * its cell's finding is; browser, server and command line all go by this.
 */
export function textFinding(
  text: string,
  asked: readonly AskedNumber[],
  cellOf: (name: string) => QuotedCell,
): TextFinding {
  const quotations = asked.map((one) => quoted(one, cellOf(one.cell)));
  return { kind: "text", text, quotations, resolved: resolve(text, quotations) };
}

function quoted({ from, to, cell, words, canonical }: AskedNumber, told: QuotedCell): QuotedNumber {
  const place = { from, to, cell, words: [...words] };
  if (told.standing === "absent") return { ...place, standing: "absent", because: told.because };
  const answer = quoteOf(told.finding, canonical, words.slice(1));
  if ("absent" in answer) return { ...place, standing: "absent", because: answer.absent };
  return {
    ...place,
    standing: told.standing,
    ...answer,
    ...(told.fingerprint !== undefined && { fingerprint: told.fingerprint }),
    ...(told.standing === "out of date" && { because: told.because }),
  };
}

/** "base: eta, meat & fish": what is asked, as it is written. */
export function askedInWords({ cell, words }: Pick<QuotedNumber, "cell" | "words">): string {
  return `${cell}: ${words.join(", ")}`;
}

/** A quotation as text without marks: its number, and in parentheses why that is not to be relied on. */
export function quotationInWords(quotation: QuotedNumber): string {
  const { standing, printed = "", because = "" } = quotation;
  if (standing === "current") return printed;
  if (standing === "out of date") return `${printed} (out of date: ${because})`;
  return `(no number for ${askedInWords(quotation)}. ${because})`;
}

/** Signs with a meaning in Markdown, written so that they stand for themselves. */
const escaped = (words: string): string => words.replace(/[\\`*_[\]<>#~|${}]/g, "\\$&");

function resolve(text: string, quotations: readonly QuotedNumber[]): string {
  return quotations.reduceRight(
    (resolved, one) => resolved.slice(0, one.from) + escaped(quotationInWords(one)) + resolved.slice(one.to),
    text,
  );
}

const numbers = (count: number) => `${printCount(count)} quoted number${count === 1 ? "" : "s"}`;

/** For the state line: "3 quoted numbers, all from current findings", "1 of 3 quoted numbers is out of date". */
export function quotationsInWords(quotations: readonly Pick<QuotedNumber, "standing">[]): string {
  const all = quotations.length;
  if (all === 0) return "quotes no number";
  const stale = quotations.filter(({ standing }) => standing === "out of date").length;
  const absent = quotations.filter(({ standing }) => standing === "absent").length;
  if (stale + absent === 0) {
    return all === 1 ? "1 quoted number, from a current finding" : `${numbers(all)}, all from current findings`;
  }
  const of = (count: number) => (all === 1 ? "the quoted number" : `${printCount(count)} of ${numbers(all)}`);
  const told = (count: number, words: string) => `${of(count)} ${count === 1 ? "is" : "are"} ${words}`;
  return [...(stale > 0 ? [told(stale, "out of date")] : []), ...(absent > 0 ? [told(absent, "not there")] : [])].join(
    "; ",
  );
}

const STANDINGS: Readonly<Record<QuotedNumber["standing"], string>> = {
  current: "current",
  "out of date": "out of date",
  absent: "not there",
};

/** Every quoted number with what it is and where it is from. */
export function quotedNumbersTable({ quotations }: Pick<TextFinding, "quotations">): LabelledTable {
  return {
    name: "quoted-numbers",
    title: "Quoted numbers",
    corner: "Quoted as",
    columns: [{ label: "Number" }, { label: "What it is" }, { label: "Finding" }, { label: "Fingerprint" }],
    rows: quotations.map((one) => ({
      label: askedInWords(one),
      cells: [
        textCell(one.printed ?? "none"),
        textCell(one.says ?? one.because ?? ""),
        textCell(one.standing === "out of date" ? `out of date: ${one.because}` : STANDINGS[one.standing]),
        textCell(one.fingerprint?.slice(0, 16) ?? ""),
      ],
    })),
    notes: [],
  };
}

/** A text to be sealed. Only one whose every number is current is: otherwise which are not, in words. */
export function sealedText({ quotations, resolved }: TextFinding): SealedText | { readonly refused: string } {
  const behind = quotations.filter(({ standing }) => standing !== "current");
  if (behind.length > 0) return { refused: `${quotationsInWords(quotations)}: ${behind.map(asRefused).join("; ")}` };
  let shift = 0;
  const numbers = quotations.map(({ from, to, cell, words, printed = "", says = "", fingerprint }): SealedNumber => {
    const start = from + shift;
    const length = escaped(printed).length;
    shift += length - (to - from);
    const place = { from: start, to: start + length, cell, words, printed, says };
    return { ...place, ...(fingerprint !== undefined && { fingerprint }) };
  });
  return { kind: "text", markdown: resolved, numbers };
}

function asRefused(one: QuotedNumber): string {
  const because = (one.because ?? "").replace(/\.$/, "");
  return one.standing === "absent" ? `${askedInWords(one)} has no number (${because})` : quotationInWords(one);
}

/** A sealed text as a reader of texts takes it: what was current when it was sealed is all there is. */
export function asSealed({ markdown, numbers }: SealedText): TextFinding {
  const quotations = numbers.map((one) => ({ ...one, standing: "current" as const }));
  return { kind: "text", text: markdown, quotations, resolved: markdown };
}
