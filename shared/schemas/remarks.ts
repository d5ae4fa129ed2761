import { z } from "zod";
import { identifier, instant } from "./primitives.ts";

/** The longest remark or reply, in characters. */
export const LONGEST_REMARK = 4_000;

/**
 * Plain text: no control characters but line breaks and tabs. Line breaks are counted alike from every system.
 */
const words = z
  .string()
  .transform((text) => text.replace(/\r\n?/g, "\n").trim())
  .pipe(
    z
      .string()
      .min(1, "a remark needs words")
      .max(LONGEST_REMARK, `a remark has at most ${LONGEST_REMARK.toLocaleString("en-GB")} characters`)
      // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is refused
      .regex(/^[^\u0000-\u0008\u000B-\u001F\u007F]*$/, "a remark is plain text, without control characters"),
  );

export const ANCHOR_KINDS = ["verdict", "row", "entry", "key"] as const;
export type AnchorKind = (typeof ANCHOR_KINDS)[number];

/**
 * What a remark speaks of within its cell, as people read it: "verdict Symmetry", "row Log size",
 * "entry Grains, Dairy" of the finding, or "key estimator" of the source.
 */
export const anchor = z
  .string()
  .max(200)
  .regex(/^(?:verdict|row|entry|key) \P{C}+$/u, "an anchor is a verdict, a row, an entry or a key, and its name");

export const newRemark = z.strictObject({ cellId: identifier, text: words, anchor: anchor.optional() });
export type NewRemark = z.infer<typeof newRemark>;
/** A reply, or other words for a remark or a reply. */
export const remarkWords = z.strictObject({ text: words });
export const settledOrNot = z.strictObject({ settled: z.boolean() });

const author = z.strictObject({ id: identifier, name: z.string() });
const doneBy = z.strictObject({ by: author, at: instant });

/** What whoever asked may do with it; decided by the server's one table of rights. */
const may = z.strictObject({ edit: z.boolean(), withdraw: z.boolean() });

export const remarkReply = z.strictObject({
  id: identifier,
  author,
  text: z.string(),
  writtenAt: instant,
  editedAt: instant.optional(),
  may,
});
export type RemarkReply = z.infer<typeof remarkReply>;

export const remark = z.strictObject({
  id: identifier,
  cellId: identifier,
  /** The cell's name; when the cell is gone, the last it had. */
  cellName: z.string(),
  /** The cell is in the study now. */
  cellIsThere: z.boolean(),
  anchor: z.string().optional(),
  author,
  /** Empty once withdrawn. */
  text: z.string(),
  writtenAt: instant,
  editedAt: instant.optional(),
  withdrawnAt: instant.optional(),
  settled: doneBy.optional(),
  /** Settled before, and opened again. */
  reopened: doneBy.optional(),
  may: may.extend({ settle: z.boolean() }),
  replies: z.array(remarkReply),
});
export type Remark = z.infer<typeof remark>;
