import { z } from "zod";
import { emailAddress } from "./invitations.ts";
import { count, identifier, instant } from "./primitives.ts";

export const SHORTEST_PASSPHRASE = 10;
export const LONGEST_PASSPHRASE = 128;

const passphrase = z.string("a passphrase is needed").superRefine((words, context) => {
  const length = words.length;
  if (length >= SHORTEST_PASSPHRASE && length <= LONGEST_PASSPHRASE) return;
  const bound =
    length < SHORTEST_PASSPHRASE ? `needs at least ${SHORTEST_PASSPHRASE}` : `may have ${LONGEST_PASSPHRASE}`;
  context.addIssue({ code: "custom", message: `the passphrase has ${length} characters and ${bound}` });
});
const knownPassphrase = z.string("a passphrase is needed").min(1, "a passphrase is needed").max(LONGEST_PASSPHRASE);
const personName = z
  .string("a name is needed")
  .trim()
  .min(1, "a name is needed")
  .max(100, "has more than 100 characters");

/** Something is sent to the address, whoever has it. */
export const addressAsked = z.object({ email: emailAddress });
export const signIn = z.object({
  email: emailAddress,
  password: z.string("a passphrase is needed").max(LONGEST_PASSPHRASE),
});
/** Whoever follows a link to an address makes its account. */
export const newAccount = z.object({ name: personName, password: passphrase });
export const changedAccount = z.strictObject({ name: personName });
export const changedPassphrase = z.object({ currentPassword: knownPassphrase, newPassword: passphrase });
export const resetPassphrase = z.object({ token: z.string().min(1).max(200), newPassword: passphrase });
export const removedAccount = z.strictObject({ password: knownPassphrase });

/** Whose link it is. */
export const linkedAddress = z.strictObject({ email: z.string() });

export const sessionSummary = z.strictObject({
  id: identifier,
  /** "Firefox on Linux", as the browser calls itself. */
  browser: z.string(),
  address: z.string().optional(),
  since: instant,
  lastUsed: instant,
  isThis: z.boolean(),
});
export type SessionSummary = z.infer<typeof sessionSummary>;

const holding = z.strictObject({ studyId: identifier, title: z.string(), others: count });

/** GET /api/account */
export const ownAccount = z.strictObject({
  id: identifier,
  name: z.string(),
  email: z.string(),
  /** Someone read a message sent to the address. */
  isConfirmed: z.boolean(),
  since: instant,
  sessions: z.array(sessionSummary),
  toHandOver: z.array(holding),
  alone: z.array(holding),
});
export type OwnAccount = z.infer<typeof ownAccount>;

/** GET /api/deleted-studies */
export const deletedStudy = z.strictObject({
  id: identifier,
  title: z.string(),
  lede: z.string(),
  deletedAt: instant,
  purgedAt: instant,
});
export type DeletedStudy = z.infer<typeof deletedStudy>;

/** GET /api/administration/mails: the words of a message only where the local post box keeps them. */
export const mailSummary = z.strictObject({
  id: identifier,
  to: z.string(),
  subject: z.string(),
  state: z.enum(["waiting", "sent", "kept", "given up"]),
  writtenAt: instant,
  attempts: count,
  nextAt: instant.optional(),
  settledAt: instant.optional(),
  fault: z.string().optional(),
  text: z.string().optional(),
});
export type MailSummary = z.infer<typeof mailSummary>;
export const postBox = z.strictObject({ kind: z.enum(["mail server", "post box"]), mails: z.array(mailSummary) });

/** GET /api/administration/accounts */
export const accountSummary = z.strictObject({
  id: identifier,
  name: z.string(),
  email: z.string(),
  isConfirmed: z.boolean(),
  since: instant,
  studies: count,
});
export type AccountSummary = z.infer<typeof accountSummary>;
