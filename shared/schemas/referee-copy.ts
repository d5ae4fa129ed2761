import { z } from "zod";
import { LEFT_OUT_REASONS } from "./data.ts";
import { count, fingerprint, finite, instant } from "./primitives.ts";
import { negativityOverSample, slutskyFinding } from "./slutsky.ts";
import { systemFinding } from "./system.ts";

/**
 * What a referee reads: everything needed to recompute matrix, errors, eigenvalues and checks, and
 * nothing of any household: no row numbers, no row values, no village, no upload.
 */
export const sealedContent = z.strictObject({
  format: z.literal("tangency referee copy 1"),
  program: z.string(),
  study: z.strictObject({ title: z.string(), authors: z.array(z.string()).optional() }),
  note: z.string(),
  sealedAt: instant,
  cells: z.strictObject({
    /** The sources as YAML, data cell included: names of columns, never values. */
    sources: z.array(z.strictObject({ name: z.string(), kind: z.string(), source: z.string() })),
    matrix: z.string(),
    system: z.string(),
    data: z.string(),
  }),
  slutsky: slutskyFinding.omit({ brokenRows: true, sample: true }).extend({ sample: negativityOverSample.optional() }),
  system: systemFinding,
  accounting: z.strictObject({
    uploaded: count,
    leftOut: z.array(z.strictObject({ reason: z.enum(LEFT_OUT_REASONS), label: z.string(), count })),
    used: count,
  }),
  /** Weighted mean expenditure and whether weighted, to name the point. */
  data: z.strictObject({ meanTotal: finite, weighted: z.boolean(), fingerprint }),
});
export type SealedContent = z.infer<typeof sealedContent>;

/** GET /api/referee/:token. The fingerprint is the SHA-256 of the canonical JSON of `content`. */
export const refereeCopy = z.strictObject({ fingerprint, content: sealedContent });
export type RefereeCopy = z.infer<typeof refereeCopy>;
