import { and, asc, eq, gt, isNull, lt } from "drizzle-orm";
import type { Database } from "../client.ts";
import { user } from "../schema/auth.ts";
import { invitations } from "../schema/invitations.ts";
import { studies } from "../schema/studies.ts";

export type InvitationRow = typeof invitations.$inferSelect;

export interface NamedInvitation {
  readonly invitation: InvitationRow;
  readonly studyTitle: string;
  readonly inviterName: string | null;
}

const named = { invitation: invitations, studyTitle: studies.title, inviterName: user.name };

export function insertInvitation(db: Database, row: InvitationRow): void {
  db.insert(invitations).values(row).run();
}

export function changeInvitation(db: Database, id: string, change: Partial<Omit<InvitationRow, "id">>): void {
  db.update(invitations).set(change).where(eq(invitations.id, id)).run();
}

/** True for the one caller that found it there. */
export function deleteInvitation(db: Database, id: string): boolean {
  return db.delete(invitations).where(eq(invitations.id, id)).run().changes === 1;
}

/** Those that ran out before then. */
export function deleteInvitationsOutrun(db: Database, before: Date): void {
  db.delete(invitations).where(lt(invitations.expiresAt, before)).run();
}

/** In the order they were written, those that have run out among them. */
export function invitationsOf(db: Database, studyId: string): InvitationRow[] {
  return db
    .select()
    .from(invitations)
    .where(eq(invitations.studyId, studyId))
    .orderBy(asc(invitations.invitedAt), asc(invitations.email))
    .all();
}

export function findInvitation(db: Database, studyId: string, id: string): InvitationRow | undefined {
  return db
    .select()
    .from(invitations)
    .where(and(eq(invitations.studyId, studyId), eq(invitations.id, id)))
    .get();
}

const open = (now: Date) => and(gt(invitations.expiresAt, now), isNull(studies.deletedAt));

/** Only one that has not run out, into a study that is there. */
export function findOpenInvitation(
  db: Database,
  by: { readonly tokenHash: string } | { readonly id: string },
  now: Date,
): NamedInvitation | undefined {
  const which = "id" in by ? eq(invitations.id, by.id) : eq(invitations.tokenHash, by.tokenHash);
  return db
    .select(named)
    .from(invitations)
    .innerJoin(studies, eq(studies.id, invitations.studyId))
    .leftJoin(user, eq(user.id, invitations.invitedBy))
    .where(and(which, open(now)))
    .get();
}

/** Those an address may answer, oldest first. */
export function openInvitationsTo(db: Database, email: string, now: Date): NamedInvitation[] {
  return db
    .select(named)
    .from(invitations)
    .innerJoin(studies, eq(studies.id, invitations.studyId))
    .leftJoin(user, eq(user.id, invitations.invitedBy))
    .where(and(eq(invitations.email, email), open(now)))
    .orderBy(asc(invitations.invitedAt))
    .all();
}
