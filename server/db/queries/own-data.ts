import { asc, eq, or, sql } from "drizzle-orm";
import type { Database } from "../client.ts";
import { cellFindings } from "../schema/findings.ts";
import { cellSittings, checkpoints } from "../schema/history.ts";
import { addressLinks, invitations } from "../schema/invitations.ts";
import { journal } from "../schema/journal.ts";
import { mails } from "../schema/mail.ts";
import { refereeCopies } from "../schema/referee-copies.ts";
import { remarkReplies, remarks } from "../schema/remarks.ts";
import { studies, studyMembers } from "../schema/studies.ts";
import { uploads } from "../schema/uploads.ts";

export type OwnRows = ReturnType<typeof rowsAbout>;

/**
 * Every row about a person, each with the columns that say something and none that opens anything: no hash, no token,
 * no sealed words. By the account's id, and by its address where only that is known.
 */
export function rowsAbout(db: Database, { id, email }: { readonly id: string; readonly email: string }) {
  return {
    addressLinks: db
      .select({ email: addressLinks.email, expiresAt: addressLinks.expiresAt })
      .from(addressLinks)
      .where(eq(addressLinks.userId, id))
      .all(),
    mails: db
      .select({
        subject: mails.subject,
        state: mails.state,
        writtenAt: mails.writtenAt,
        settledAt: mails.settledAt,
      })
      .from(mails)
      .where(eq(mails.recipient, email))
      .orderBy(asc(mails.writtenAt))
      .all(),
    invitations: db
      .select({
        studyId: invitations.studyId,
        role: invitations.role,
        invitedAt: invitations.invitedAt,
        expiresAt: invitations.expiresAt,
      })
      .from(invitations)
      .where(eq(invitations.email, email))
      .all(),
    ...writtenBy(db, id),
    ...doneBy(db, id),
    journal: db
      .select()
      .from(journal)
      .where(
        or(
          eq(journal.actorId, id),
          eq(journal.subject, email),
          sql`substr(${journal.subject}, 1, ${email.length + 1}) = ${`${email},`}`,
        ),
      )
      .orderBy(asc(journal.id))
      .all(),
  };
}

function writtenBy(db: Database, id: string) {
  return {
    memberships: db
      .select({
        studyId: studies.id,
        title: studies.title,
        role: studyMembers.role,
        addedAt: studyMembers.addedAt,
        putAwayAt: studyMembers.putAwayAt,
      })
      .from(studyMembers)
      .innerJoin(studies, eq(studies.id, studyMembers.studyId))
      .where(eq(studyMembers.userId, id))
      .orderBy(asc(studyMembers.addedAt))
      .all(),
    remarks: db.select().from(remarks).where(eq(remarks.authorId, id)).orderBy(asc(remarks.writtenAt)).all(),
    replies: db
      .select({ reply: remarkReplies, studyId: remarks.studyId, cellName: remarks.cellName })
      .from(remarkReplies)
      .innerJoin(remarks, eq(remarks.id, remarkReplies.remarkId))
      .where(eq(remarkReplies.authorId, id))
      .orderBy(asc(remarkReplies.writtenAt))
      .all(),
  };
}

function doneBy(db: Database, id: string) {
  const among = sql`exists (select 1 from json_each(${cellSittings.people}) where value = ${id})`;
  return {
    sittings: db
      .select({
        studyId: cellSittings.studyId,
        cellId: cellSittings.cellId,
        startedAt: cellSittings.startedAt,
        endedAt: cellSittings.endedAt,
      })
      .from(cellSittings)
      .where(among)
      .orderBy(asc(cellSittings.id))
      .all(),
    estimations: db
      .select({ studyId: cellFindings.studyId, cellId: cellFindings.cellId, at: cellFindings.at })
      .from(cellFindings)
      .where(eq(cellFindings.userId, id))
      .orderBy(asc(cellFindings.at))
      .all(),
    uploads: db
      .select({
        studyId: uploads.studyId,
        name: uploads.name,
        version: uploads.version,
        bytes: uploads.bytes,
        at: uploads.uploadedAt,
      })
      .from(uploads)
      .where(eq(uploads.uploadedBy, id))
      .orderBy(asc(uploads.uploadedAt))
      .all(),
    checkpoints: db
      .select({
        studyId: checkpoints.studyId,
        name: checkpoints.name,
        note: checkpoints.note,
        at: checkpoints.madeAt,
      })
      .from(checkpoints)
      .where(eq(checkpoints.madeBy, id))
      .orderBy(asc(checkpoints.madeAt))
      .all(),
    refereeCopies: db
      .select({
        studyId: refereeCopies.studyId,
        cell: refereeCopies.cellName,
        note: refereeCopies.note,
        at: refereeCopies.sealedAt,
      })
      .from(refereeCopies)
      .where(eq(refereeCopies.sealedBy, id))
      .orderBy(asc(refereeCopies.sealedAt))
      .all(),
  };
}
