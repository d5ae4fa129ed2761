import { z } from "zod";
import { cellKind } from "./cell.ts";
import { count, fingerprint, finite, identifier, instant } from "./primitives.ts";
import { problem } from "./problem.ts";

export const CELL_STATES = ["draft", "estimating", "current", "out of date", "failed"] as const;

export const progress = z.strictObject({
  /** "reading rows", "accumulating moments", "iterating", "checking rows". */
  step: z.string(),
  iteration: count.optional(),
  logLikelihood: finite.optional(),
  gradient: finite.optional(),
  largestStep: finite.optional(),
  /** 0 to 1 where known. */
  fraction: finite.optional(),
  elapsedMs: finite,
  aboutMs: finite.optional(),
});
export type Progress = z.infer<typeof progress>;

/** What the study page shows of one cell, pushed to everyone in the study whenever it changes. */
export const cellStatus = z.strictObject({
  cellId: identifier,
  name: z.string(),
  kind: cellKind.nullable(),
  state: z.enum(CELL_STATES),
  /** Names of the cells it reads, in the order of its keys. */
  reads: z.array(z.string()),
  /** Under which its finding is (or would be) stored; absent while the source has problems. */
  fingerprint: fingerprint.optional(),
  /** The last finding the cell had, and the source that asked for it: shown under that source only. */
  last: z
    .strictObject({ fingerprint, source: z.string(), at: instant, tookMs: finite, by: z.string().optional() })
    .optional(),
  /** Why it is out of date, or has failed, in a sentence. */
  because: z.string().optional(),
  problems: z.array(problem),
  /** About how long an estimation would take; a light cell follows by itself and has none. */
  aboutMs: finite.optional(),
  progress: progress.optional(),
});
export type CellStatus = z.infer<typeof cellStatus>;

export const studyStatus = z.strictObject({ studyId: identifier, cells: z.array(cellStatus) });
export type StudyStatus = z.infer<typeof studyStatus>;
