import { z } from "zod";
import { count, instant } from "./primitives.ts";

/** What the journal of a study knows. A subject, where there is one, names what or whom it was done to. */
export const STUDY_ACTIONS = [
  "study made",
  "study deleted",
  "study brought back",
  "ownership handed over",
  "person invited",
  "invitation sent again",
  "invitation withdrawn",
  "invitation refused",
  "person joined",
  "role changed",
  "person removed",
  "person left",
  "upload added",
  "upload removed",
  "referee copy sealed",
  "referee copy sent",
  "referee copy replaced",
  "referee copy revoked",
  "replication bundle made",
  "checkpoint kept",
  "checkpoint returned to",
  "checkpoint removed",
] as const;

/** What the installation's own journal knows, for its administrators. */
export const INSTALLATION_ACTIONS = [
  "account made",
  "account deleted",
  "address changed",
  "passphrase reset",
  "sign-in locked",
  "study deleted for good",
] as const;

/** Told to owners only: who was asked and has not come is theirs, and so is what was sealed. */
export const OWNERS_ACTIONS: readonly JournalAction[] = [
  "person invited",
  "invitation sent again",
  "invitation withdrawn",
  "invitation refused",
  "referee copy sealed",
  "referee copy sent",
  "referee copy replaced",
  "referee copy revoked",
  "replication bundle made",
];

const journalAction = z.enum([...STUDY_ACTIONS, ...INSTALLATION_ACTIONS]);
export type JournalAction = z.infer<typeof journalAction>;

export const journalEntry = z.strictObject({
  id: count,
  at: instant,
  /** Missing where the program itself did it, or nobody signed in. */
  by: z.string().optional(),
  action: journalAction,
  subject: z.string().optional(),
});
export type JournalEntry = z.infer<typeof journalEntry>;

/** GET /api/studies/:studyId/journal and /api/administration/journal: a page of it, newest first. */
export const journalPage = z.strictObject({
  entries: z.array(journalEntry),
  /** The id to ask on from, where there is more. */
  next: count.optional(),
});
export type JournalPage = z.infer<typeof journalPage>;

/** The query: only what is older than this entry. */
export const journalFrom = z.object({ before: z.coerce.number().int().positive().optional() });
