import type { OwnData } from "../../shared/schemas/own-data.ts";
import type { KeptOfPerson } from "../services/own-account.ts";

/** What is kept about a person, each field listed, in words of the product. */
export function presentOwnData({ account, sessions, rows }: KeptOfPerson, now: Date): OwnData {
  const titles = new Map(rows.memberships.map(({ studyId, title }) => [studyId, title]));
  const study = (id: string) => {
    const title = titles.get(id);
    return { id, ...(title !== undefined && { title }) };
  };
  const words = (
    studyId: string,
    cell: string,
    { text, writtenAt, editedAt }: { text: string; writtenAt: Date; editedAt: Date | null },
  ) => ({
    study: study(studyId),
    ...(titles.has(studyId) && { cell }),
    text,
    writtenAt: writtenAt.toISOString(),
    ...(editedAt && { editedAt: editedAt.toISOString() }),
  });
  return {
    writtenAt: now.toISOString(),
    account: {
      id: account.id,
      name: account.name,
      email: account.email,
      isConfirmed: account.emailVerified,
      since: account.createdAt.toISOString(),
      changedAt: account.updatedAt.toISOString(),
    },
    addressesAskedFor: rows.addressLinks.map(({ email, expiresAt }) => ({ email, expiresAt: expiresAt.toISOString() })),
    sessions: sessions.map(({ userAgent, ipAddress, createdAt, updatedAt, expiresAt }) => ({
      browser: userAgent ?? "",
      ...(ipAddress && { address: ipAddress }),
      since: createdAt.toISOString(),
      lastUsed: updatedAt.toISOString(),
      expiresAt: expiresAt.toISOString(),
    })),
    messages: rows.mails.map(({ subject, state, writtenAt, settledAt }) => ({
      subject,
      state,
      writtenAt: writtenAt.toISOString(),
      ...(settledAt && { settledAt: settledAt.toISOString() }),
    })),
    invitations: rows.invitations.map(({ studyId, role, invitedAt, expiresAt }) => ({
      study: studyId,
      role,
      invitedAt: invitedAt.toISOString(),
      expiresAt: expiresAt.toISOString(),
    })),
    studies: rows.memberships.map(({ studyId, role, addedAt, putAwayAt }) => ({
      study: study(studyId),
      role,
      since: addedAt.toISOString(),
      ...(putAwayAt && { putAwayAt: putAwayAt.toISOString() }),
    })),
    remarks: rows.remarks.map((remark) => ({
      ...words(remark.studyId, remark.cellName, remark),
      ...(remark.anchor && { about: remark.anchor }),
      ...(remark.withdrawnAt && { withdrawnAt: remark.withdrawnAt.toISOString() }),
    })),
    replies: rows.replies.map(({ reply, studyId, cellName }) => words(studyId, cellName, reply)),
    edits: rows.sittings.map(({ studyId, cellId, startedAt, endedAt }) => ({
      study: study(studyId),
      cellId,
      from: startedAt.toISOString(),
      to: endedAt.toISOString(),
    })),
    estimationsAskedFor: rows.estimations.map(({ studyId, cellId, at }) => ({
      study: study(studyId),
      cellId,
      at: at.toISOString(),
    })),
    uploads: rows.uploads.map(({ studyId, name, version, bytes, at }) => ({
      study: study(studyId),
      name,
      version,
      bytes,
      at: at.toISOString(),
    })),
    checkpoints: rows.checkpoints.map(({ studyId, name, note, at }) => ({
      study: study(studyId),
      name,
      note,
      at: at.toISOString(),
    })),
    refereeCopies: rows.refereeCopies.map(({ studyId, cell, note, at }) => ({
      study: study(studyId),
      cell,
      note,
      at: at.toISOString(),
    })),
    journal: rows.journal.map(({ at, studyId, actorId, action, subject }) => ({
      at: at.toISOString(),
      ...(studyId !== null && { study: study(studyId) }),
      action,
      ...(subject !== null && { subject }),
      byYou: actorId === account.id,
    })),
  };
}
