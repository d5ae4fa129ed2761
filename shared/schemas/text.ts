import { z } from "zod";
import { count, fingerprint } from "./primitives.ts";

/** The longest text a cell may hold, in characters: that of any cell's source. */
export const LONGEST_TEXT = 32_768;

export const textSpecification = z.strictObject({
  kind: z.literal("text"),
  /** Markdown with mathematics between dollar signs; numbers of other cells quoted as {base: eta, grains}. */
  text: z.string().max(LONGEST_TEXT),
});
export type TextSpecification = z.infer<typeof textSpecification>;

/** From a finding that answers its cell as it stands; from an older one; or no number at all. */
export const QUOTED_STANDINGS = ["current", "out of date", "absent"] as const;

/** A number that prose quotes, at its place in the text. */
export const quotedNumber = z.strictObject({
  from: count,
  to: count,
  /** The name of the cell, and what is asked of it: ["eta", "meat & fish"]. */
  cell: z.string(),
  words: z.array(z.string()),
  standing: z.enum(QUOTED_STANDINGS),
  /** "1.318 (0.009)"; absent where there is no number. */
  printed: z.string().optional(),
  /** What the number is: "expenditure elasticity of Meat & fish at the base point". */
  says: z.string().optional(),
  /** Of the finding it is from. */
  fingerprint: fingerprint.optional(),
  /** Why it is out of date or not there. */
  because: z.string().optional(),
});
export type QuotedNumber = z.infer<typeof quotedNumber>;

export const textFinding = z.strictObject({
  kind: z.literal("text"),
  /** As written. */
  text: z.string(),
  /** In the order of the text. */
  quotations: z.array(quotedNumber),
  /** The text with every quotation replaced by its number, and those that are not current marked in words. */
  resolved: z.string(),
});
export type TextFinding = z.infer<typeof textFinding>;

/** A number of a sealed text: at its place in the sealed words, as it was printed, and what it was quoted as. */
const sealedNumber = quotedNumber.omit({ standing: true, because: true }).required({ printed: true, says: true });
export type SealedNumber = z.infer<typeof sealedNumber>;

/** A text as a sealed copy keeps it: Markdown with its numbers in their places, none of which can change any more. */
export const sealedTextFinding = z.strictObject({
  kind: z.literal("text"),
  markdown: z.string(),
  /** In the order of the text. */
  numbers: z.array(sealedNumber),
});
export type SealedText = z.infer<typeof sealedTextFinding>;
