import { z } from "zod";
import { count, identifier, instant } from "./primitives.ts";
import { role } from "./resources.ts";

/** The title only of a study that one is in: what became of one that was left is for those in it. */
const study = z.strictObject({ id: identifier, title: z.string().optional() });
/** Of a remark or a reply to one; the cell only where one is still in the study. */
const words = z.strictObject({
  study,
  cell: z.string().optional(),
  about: z.string().optional(),
  text: z.string(),
  writtenAt: instant,
  editedAt: instant.optional(),
  withdrawnAt: instant.optional(),
});

/**
 * GET /api/account/data: everything that is kept about the person who asks. No secret is in it: no passphrase in any
 * form, and no token of a session or a link.
 */
export const ownData = z.strictObject({
  writtenAt: instant,
  account: z.strictObject({
    id: identifier,
    name: z.string(),
    email: z.string(),
    isConfirmed: z.boolean(),
    since: instant,
    changedAt: instant,
  }),
  /** Addresses the account was asked to move to, not confirmed yet. */
  addressesAskedFor: z.array(z.strictObject({ email: z.string(), expiresAt: instant })),
  sessions: z.array(
    z.strictObject({
      browser: z.string(),
      address: z.string().optional(),
      since: instant,
      lastUsed: instant,
      expiresAt: instant,
    }),
  ),
  messages: z.array(
    z.strictObject({ subject: z.string(), state: z.string(), writtenAt: instant, settledAt: instant.optional() }),
  ),
  invitations: z.array(z.strictObject({ study: identifier, role, invitedAt: instant, expiresAt: instant })),
  studies: z.array(z.strictObject({ study, role, since: instant, putAwayAt: instant.optional() })),
  remarks: z.array(words),
  replies: z.array(words),
  /** When the person worked on which cell. */
  edits: z.array(z.strictObject({ study, cellId: z.string(), from: instant, to: instant })),
  estimationsAskedFor: z.array(z.strictObject({ study, cellId: z.string(), at: instant })),
  uploads: z.array(z.strictObject({ study, name: z.string(), version: count, bytes: count, at: instant })),
  checkpoints: z.array(z.strictObject({ study, name: z.string(), note: z.string(), at: instant })),
  refereeCopies: z.array(z.strictObject({ study, cell: z.string(), note: z.string(), at: instant })),
  /** What the person did, and what was done with their address. */
  journal: z.array(
    z.strictObject({
      at: instant,
      study: study.optional(),
      action: z.string(),
      subject: z.string().optional(),
      byYou: z.boolean(),
    }),
  ),
});
export type OwnData = z.infer<typeof ownData>;
