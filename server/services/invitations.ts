import { randomUUID } from "node:crypto";
import type { Role } from "../../shared/schemas/resources.ts";
import type { Database } from "../db/client.ts";
import {
  changeInvitation,
  deleteInvitation,
  deleteInvitationsOutrun,
  findInvitation,
  findOpenInvitation,
  type InvitationRow,
  insertInvitation,
  invitationsOf,
  type NamedInvitation,
  openInvitationsTo,
} from "../db/queries/invitations.ts";
import { insertPerson, peopleOf } from "../db/queries/people.ts";
import { findStudy } from "../db/queries/studies.ts";
import { conflict, forbidden, notFound } from "../errors.ts";
import * as texts from "../mail/texts.ts";
import type { Actor } from "../policies/can.ts";
import { type Access, noSuchStudy } from "./access.ts";
import type { AccountService } from "./accounts.ts";
import type { RecordInJournal } from "./journal.ts";
import { linkTokenHash, newLinkToken } from "./link-token.ts";
import type { MailService } from "./mail.ts";

export type { InvitationRow, NamedInvitation };

/** Who answers, as far as an invitation needs to know. */
export interface Invited extends Actor {
  readonly email: string;
  readonly emailVerified: boolean;
}

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly accounts: Pick<AccountService, "make" | "confirmed" | "hasAccount">;
  readonly mail: Pick<MailService, "send">;
  readonly record: RecordInJournal;
  readonly url: string;
}

const DAY = 24 * 3_600_000;
export const INVITATION_DAYS = 14;
/** Kept that long after it has run out, so that its owner can send it again. */
const REMEMBERED_DAYS = 30;
const MOST_WAITING = 200;

export type InvitationService = ReturnType<typeof createInvitationService>;

/** Invitations by mail. Whether an address has an account is told to nobody but whoever reads its mail. */
export function createInvitationService({ db, access, accounts, mail, record, url }: Collaborators) {
  function send(actor: Actor, invitation: InvitationRow, token: string): void {
    const study = findStudy(db, invitation.studyId);
    const inviter = peopleOf(db, invitation.studyId).find(({ id }) => id === actor.id);
    if (study === undefined || inviter === undefined) throw noSuchStudy();
    const until = invitation.expiresAt.toLocaleDateString("en-GB", { day: "numeric", month: "long", year: "numeric" });
    const link = `${url}/invitation/${token}`;
    const words = texts.invitation({ inviter: inviter.name, study: study.title, role: invitation.role, link, until });
    mail.send({ to: invitation.email, ...words });
  }

  /** A new link and a new end; the old link opens nothing any more. */
  function renewed(actor: Actor, role: Role) {
    const { token, tokenHash } = newLinkToken();
    const now = new Date();
    const expiresAt = new Date(now.getTime() + INVITATION_DAYS * DAY);
    return { token, row: { role, tokenHash, invitedBy: actor.id, invitedAt: now, expiresAt } };
  }

  function waiting(studyId: string, id: string): InvitationRow {
    const invitation = findInvitation(db, studyId, id);
    if (invitation === undefined) throw notFound("This invitation has been answered or withdrawn.");
    return invitation;
  }

  function openOne(by: { tokenHash: string } | { id: string }): NamedInvitation {
    const found = findOpenInvitation(db, by, new Date());
    if (found === undefined) throw notFound("This invitation has been answered, withdrawn, or has run out.");
    return found;
  }

  /** The person is in the study from here on, as the invitation says. */
  function join(invitation: InvitationRow, userId: string): { studyId: string } {
    const { studyId, role } = invitation;
    // Someone who is in it already keeps their role: an invitation takes nothing away.
    const isNew = access.roleOf(userId, studyId) === undefined;
    db.transaction((tx) => {
      if (!deleteInvitation(tx, invitation.id)) throw notFound("This invitation has been answered or withdrawn.");
      if (isNew) insertPerson(tx, studyId, userId, role, new Date());
    });
    if (isNew) record({ studyId, actor: { id: userId }, action: "person joined", subject: `as ${role}` });
    return { studyId };
  }

  function refuse({ id, studyId, email }: InvitationRow, actor?: Actor): void {
    if (!deleteInvitation(db, id)) throw notFound("This invitation has been answered or withdrawn.");
    record({ studyId, ...(actor && { actor }), action: "invitation refused", subject: email });
  }

  function theirs({ invitation }: NamedInvitation, who: Invited): InvitationRow {
    if (invitation.email === who.email.toLowerCase()) return invitation;
    throw forbidden(`This invitation is for ${invitation.email}, and you are signed in as ${who.email}.`);
  }

  return {
    list(actor: Actor, studyId: string): InvitationRow[] {
      access.allow(actor, "people.invite", studyId);
      return invitationsOf(db, studyId);
    },

    /** To whoever reads the address's mail; one who is invited already gets a new link, and this role. */
    invite(actor: Actor, studyId: string, wanted: { email: string; role: Role }): InvitationRow {
      access.allow(actor, "people.invite", studyId);
      const email = wanted.email.toLowerCase();
      const member = peopleOf(db, studyId).find((person) => person.email === email);
      if (member !== undefined) throw conflict(`${member.name} is the study's ${member.role} already.`);
      const others = invitationsOf(db, studyId);
      const { token, row } = renewed(actor, wanted.role);
      const before = others.find((invitation) => invitation.email === email);
      if (before === undefined && others.length >= MOST_WAITING) {
        throw conflict(`${others.length} invitations wait for an answer, which is the most: withdraw some first.`);
      }
      const invitation: InvitationRow = { id: before?.id ?? randomUUID(), studyId, email, ...row };
      if (before === undefined) insertInvitation(db, invitation);
      else changeInvitation(db, before.id, row);
      record({ studyId, actor, action: "person invited", subject: `${email}, as ${wanted.role}` });
      send(actor, invitation, token);
      return invitation;
    },

    sendAgain(actor: Actor, studyId: string, invitationId: string): InvitationRow {
      access.allow(actor, "people.invite", studyId);
      const before = waiting(studyId, invitationId);
      const { token, row } = renewed(actor, before.role);
      changeInvitation(db, before.id, row);
      record({ studyId, actor, action: "invitation sent again", subject: before.email });
      send(actor, { ...before, ...row }, token);
      return { ...before, ...row };
    },

    withdraw(actor: Actor, studyId: string, invitationId: string): void {
      access.allow(actor, "people.invite", studyId);
      const { id, email } = waiting(studyId, invitationId);
      deleteInvitation(db, id);
      record({ studyId, actor, action: "invitation withdrawn", subject: email });
    },

    /** For whoever has the link; whether its address has an account is theirs to know. */
    open(token: string): NamedInvitation & { readonly hasAccount: boolean } {
      const found = openOne({ tokenHash: linkTokenHash(token) });
      return { ...found, hasAccount: accounts.hasAccount(found.invitation.email) };
    },

    accept(who: Invited, token: string): { studyId: string } {
      const invitation = theirs(openOne({ tokenHash: linkTokenHash(token) }), who);
      if (!who.emailVerified) accounts.confirmed(who.id);
      return join(invitation, who.id);
    },

    /** The link came to the address, so that the account made here has it confirmed. */
    async acceptAsNew(token: string, wanted: { name: string; passphrase: string }) {
      const { invitation } = openOne({ tokenHash: linkTokenHash(token) });
      const userId = await accounts.make({ ...wanted, email: invitation.email });
      return { ...join(invitation, userId), email: invitation.email };
    },

    refuse: (token: string): void => refuse(openOne({ tokenHash: linkTokenHash(token) }).invitation),

    /** Those that wait for someone's answer; only under an address that is known to be theirs. */
    mine: (who: Invited): NamedInvitation[] =>
      who.emailVerified ? openInvitationsTo(db, who.email.toLowerCase(), new Date()) : [],

    acceptMine(who: Invited, invitationId: string): { studyId: string } {
      return join(mineOf(who, invitationId), who.id);
    },

    refuseMine: (who: Invited, invitationId: string): void => refuse(mineOf(who, invitationId), who),

    removeOld: (now = new Date()): void => deleteInvitationsOutrun(db, new Date(now.getTime() - REMEMBERED_DAYS * DAY)),
  };

  function mineOf(who: Invited, invitationId: string): InvitationRow {
    const found = findOpenInvitation(db, { id: invitationId }, new Date());
    if (!who.emailVerified || found?.invitation.email !== who.email.toLowerCase()) {
      throw notFound("This invitation has been answered, withdrawn, or has run out.");
    }
    return found.invitation;
  }
}
