import { z } from "zod";
import { LEFT_OUT_REASONS } from "./data.ts";
import { elasticitiesFinding } from "./elasticities.ts";
import { count, fingerprint, finite, instant } from "./primitives.ts";
import { negativityOverSample, slutskyFinding } from "./slutsky.ts";
import { systemFinding } from "./system.ts";
import { testsFinding } from "./tests.ts";
import { sealedTextFinding } from "./text.ts";

/** A Slutsky finding without the rows where negativity breaks. */
const sealedSlutsky = slutskyFinding
  .omit({ brokenRows: true, sample: true })
  .extend({ sample: negativityOverSample.optional() });
export type SealedSlutsky = z.infer<typeof sealedSlutsky>;

/** The kinds that can be sealed beside the matrix. */
export const ALSO_KINDS = ["system", "tests", "elasticities", "slutsky", "text"] as const;
export type AlsoKind = (typeof ALSO_KINDS)[number];

/** A further finding under its cell's name: of rows it has counts and sums, never which. */
const sealedAlso = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("system"), name: z.string(), finding: systemFinding }),
  z.strictObject({ kind: z.literal("tests"), name: z.string(), finding: testsFinding }),
  z.strictObject({ kind: z.literal("elasticities"), name: z.string(), finding: elasticitiesFinding }),
  z.strictObject({ kind: z.literal("slutsky"), name: z.string(), finding: sealedSlutsky }),
  z.strictObject({ kind: z.literal("text"), name: z.string(), finding: sealedTextFinding }),
]);
export type SealedAlso = z.infer<typeof sealedAlso>;

/** The methods of a sealed system in the words of a paper, as they were drafted when it was sealed. */
const sealedMethods = z.strictObject({
  system: z.string(),
  text: z.string(),
  /** By first author and year, in words. */
  references: z.array(z.string()),
  bibtex: z.string(),
});
export type SealedMethods = z.infer<typeof sealedMethods>;

/**
 * What a referee reads: everything needed to recompute matrix, errors, eigenvalues and checks, and
 * nothing of any household: no row numbers, no row values, no upload. Groups of households have their
 * names and counts only in elasticities by group that the owner chose to seal, ten rows or more each.
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
  slutsky: sealedSlutsky,
  system: systemFinding,
  /** Further findings of the owner's choice; a copy without any has no such key. */
  also: z.array(sealedAlso).min(1).optional(),
  /** Of the matrix's system first, then of those among the further findings; where the owner chose so. */
  methods: z.array(sealedMethods).min(1).optional(),
  accounting: z.strictObject({
    uploaded: count,
    leftOut: z.array(z.strictObject({ reason: z.enum(LEFT_OUT_REASONS), label: z.string(), count })),
    used: count,
  }),
  /** Weighted mean expenditure and whether weighted, to name the point. */
  data: z.strictObject({ meanTotal: finite, weighted: z.boolean(), fingerprint }),
});
export type SealedContent = z.infer<typeof sealedContent>;

/** That a copy has been replaced, and by which: told beside it, since nothing in it can change. */
const newerCopy = z.strictObject({ sealedAt: instant, fingerprint });

/**
 * GET /api/referee/:token, and /api/referee/:token/newest for the copy that replaced it. The fingerprint is the SHA-256
 * of the canonical JSON of `content`.
 */
export const refereeCopy = z.strictObject({ fingerprint, content: sealedContent, newer: newerCopy.optional() });
export type RefereeCopy = z.infer<typeof refereeCopy>;
