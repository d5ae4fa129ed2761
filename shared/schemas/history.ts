import { z } from "zod";
import { count, identifier, instant } from "./primitives.ts";

/** A cell at one time. */
export const pastCell = z.strictObject({
  name: z.string(),
  kind: z.string(),
  order: z.string(),
  source: z.string(),
});
export type PastCell = z.infer<typeof pastCell>;

/** Someone who wrote; the name is left out where the account is gone. */
const writer = z.strictObject({ id: identifier, name: z.string().optional() });

/** What was done to one cell without a longer pause, by one person or by several in turns; by nobody where the program did it. */
export const sitting = z.strictObject({
  id: count,
  cellId: identifier,
  people: z.array(writer),
  from: instant,
  to: instant,
  /** As it was found and as it was left; absent where there was or is no such cell. */
  before: pastCell.optional(),
  after: pastCell.optional(),
});
export type Sitting = z.infer<typeof sitting>;

/** GET /api/studies/:studyId/history: the newest first; `next` is where to go on. */
export const historyPage = z.strictObject({ sittings: z.array(sitting), next: count.optional() });
export type HistoryPage = z.infer<typeof historyPage>;

/** GET /api/studies/:studyId/history/latest: who edited each cell last, and when; nobody where the program did. */
export const latestEdits = z.array(
  z.strictObject({ cellId: identifier, cellName: z.string(), by: writer.optional(), at: instant }),
);
export type LatestEdits = z.infer<typeof latestEdits>;

export const historyQuery = z.strictObject({
  cell: identifier.optional(),
  person: identifier.optional(),
  before: z.coerce.number().int().positive().optional(),
});
export type HistoryQuery = z.infer<typeof historyQuery>;

const checkpointName = z.string().trim().min(1, "a checkpoint needs a name").max(120);
const checkpointNote = z.string().trim().max(2000);

/** POST /api/studies/:studyId/checkpoints. */
export const newCheckpoint = z.strictObject({ name: checkpointName, note: checkpointNote.default("") });

/** PATCH /api/studies/:studyId/checkpoints/:checkpointId. */
export const changedCheckpoint = z.strictObject({ name: checkpointName.optional(), note: checkpointNote.optional() });

export const checkpointSummary = z.strictObject({
  id: identifier,
  name: z.string(),
  note: z.string(),
  /** Kept by a person, or by the program before a person returned to another. */
  occasion: z.enum(["kept", "before returning"]),
  madeBy: writer,
  madeAt: instant,
  cells: count,
});
export type CheckpointSummary = z.infer<typeof checkpointSummary>;

/** GET /api/studies/:studyId/checkpoints/:checkpointId: with its cells, in their order. */
export const checkpoint = checkpointSummary.extend({
  content: z.array(pastCell.extend({ id: identifier })),
});
export type Checkpoint = z.infer<typeof checkpoint>;

/** POST /api/studies/:studyId/checkpoints/:checkpointId/return: what to return to, and what was kept before. */
export const returning = z.strictObject({ to: checkpoint, before: checkpointSummary });
