import type { Invitation, LinkedInvitation, OpenInvitation } from "../../shared/schemas/invitations.ts";
import type { InvitationRow, NamedInvitation } from "../services/invitations.ts";

export function presentInvitation({ id, email, role, invitedAt, expiresAt }: InvitationRow): Invitation {
  return {
    id,
    email,
    role,
    invitedAt: invitedAt.toISOString(),
    expiresAt: expiresAt.toISOString(),
    hasRunOut: expiresAt.getTime() <= Date.now(),
  };
}

export function presentOpenInvitation({ invitation, studyTitle, inviterName }: NamedInvitation): OpenInvitation {
  return {
    id: invitation.id,
    study: studyTitle,
    inviter: inviterName ?? "Someone no longer here",
    role: invitation.role,
    email: invitation.email,
    expiresAt: invitation.expiresAt.toISOString(),
  };
}

export function presentLinkedInvitation(found: NamedInvitation & { readonly hasAccount: boolean }): LinkedInvitation {
  return { ...presentOpenInvitation(found), hasAccount: found.hasAccount };
}
