import type { Finding } from "../../schemas/cell.ts";
import { isQuotable, QUOTED_PARTS } from "../../schemas/quotable.ts";
import { type Asked, NothingToQuote, plain, type QuotedAnswer } from "./answer.ts";
import { DATA_QUOTES } from "./data.ts";
import { ELASTICITIES_QUOTES } from "./elasticities.ts";
import { PRICE_CHANGE_QUOTES } from "./price-change.ts";
import { SLUTSKY_QUOTES } from "./slutsky.ts";
import { SYSTEM_QUOTES } from "./system.ts";
import { TESTS_QUOTES } from "./tests.ts";

type AnyQuote = (finding: Finding, asked: Asked) => QuotedAnswer;

/** By kind and word. That a finding meets the quotes of its own kind is what the compiler cannot follow. */
const QUOTES = {
  data: DATA_QUOTES,
  system: SYSTEM_QUOTES,
  tests: TESTS_QUOTES,
  elasticities: ELASTICITIES_QUOTES,
  slutsky: SLUTSKY_QUOTES,
  "price change": PRICE_CHANGE_QUOTES,
} as unknown as Readonly<Record<string, Readonly<Record<string, AnyQuote>>>>;

/**
 * The number a finding has under some words (["eta", "meat & fish"]), printed as the tables print it, with its
 * standard error in parentheses where it has one; or, where it has none, why. `canonical` is the vocabulary's own word
 * for the first of them.
 */
export function quoteOf(
  finding: Finding,
  canonical: string | undefined,
  rest: readonly string[],
): QuotedAnswer | { readonly absent: string } {
  const quotes = isQuotable(finding.kind) ? QUOTES[finding.kind] : {};
  const quote = canonical !== undefined && Object.hasOwn(quotes, canonical) ? quotes[canonical] : undefined;
  if (quote === undefined) return { absent: "It has no such number." };
  const part = QUOTED_PARTS.find((one) => one === plain(rest.at(-1) ?? ""));
  try {
    return quote(finding, { words: part ? rest.slice(0, -1) : rest, part });
  } catch (error) {
    if (error instanceof NothingToQuote) return { absent: error.message };
    throw error;
  }
}
