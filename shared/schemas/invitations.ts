import { z } from "zod";
import { identifier, instant } from "./primitives.ts";
import { role } from "./resources.ts";

export const emailAddress = z.email("is not an e-mail address").trim().max(254, "has more than 254 characters");

export const newInvitation = z.strictObject({ email: emailAddress, role });

/** An invitation as the study's owner sees it. */
export const invitation = z.strictObject({
  id: identifier,
  email: z.string(),
  role,
  invitedAt: instant,
  expiresAt: instant,
  /** Its link opens nothing any more; it can be sent again. */
  hasRunOut: z.boolean(),
});
export type Invitation = z.infer<typeof invitation>;

/** GET /api/invitations/:token, and with its id one of GET /api/account/invitations. */
export const openInvitation = z.strictObject({
  id: identifier,
  study: z.string(),
  inviter: z.string(),
  role,
  email: z.string(),
  expiresAt: instant,
});
export type OpenInvitation = z.infer<typeof openInvitation>;

/** What the link's page needs besides: whether its reader signs in or makes an account. */
export const linkedInvitation = openInvitation.extend({ hasAccount: z.boolean() });
export type LinkedInvitation = z.infer<typeof linkedInvitation>;

/** Where one is after accepting. */
export const joined = z.strictObject({ studyId: identifier });
