import { z } from "zod";
import { identifier, instant } from "./primitives.ts";

/** How long a link may be made to open; without one it opens until it is revoked. */
const opensUntil = z.iso.datetime({ error: "is a moment in ISO 8601, with its time zone" });

const address = z.email("is an e-mail address").max(254);

/** As many findings beside the matrix as one copy holds. */
export const MOST_ALSO = 12;

export const newRefereeCopy = z.strictObject({
  /** The matrix. */
  cellId: identifier,
  /** Further cells whose findings are sealed with it, in this order. */
  also: z.array(identifier).max(MOST_ALSO).default([]),
  /** Whether the methods paragraph of every system goes with them. */
  methods: z.boolean().default(false),
  note: z.string().trim().max(300).default(""),
  withholdAuthors: z.boolean().default(true),
  expiresAt: opensUntil.optional(),
  /** An earlier copy of the study, which then says that there is a newer one. */
  replaces: identifier.optional(),
  /** Where the link is sent. It stays in the study's journal, and with the message as long as messages are kept. */
  email: address.optional(),
});
export type NewRefereeCopy = z.infer<typeof newRefereeCopy>;

/** Until when the link opens; null: until it is revoked. */
export const changedRefereeCopy = z.strictObject({ expiresAt: opensUntil.nullable() });

/** A new link for a copy whose link is lost; the old one opens nothing any more. */
export const newRefereeLink = z.strictObject({ email: address.optional() });

/** What the owner sees of a copy afterwards; the link itself is told once, when sealed. */
export const refereeCopySummary = z.strictObject({
  id: identifier,
  cellName: z.string(),
  /** Names of the cells sealed with the matrix. */
  also: z.array(z.string()),
  note: z.string(),
  fingerprint: z.string(),
  sealedAt: instant,
  sealedBy: z.string(),
  expiresAt: instant.optional(),
  replacedBy: identifier.optional(),
  revokedAt: instant.optional(),
  lastOpenedAt: instant.optional(),
});
export type RefereeCopySummary = z.infer<typeof refereeCopySummary>;

export const sealedRefereeCopy = z.strictObject({ copy: refereeCopySummary, token: z.string() });
