import { and, desc, eq, gt, isNull, or } from "drizzle-orm";
import type { Database } from "../client.ts";
import { user } from "../schema/auth.ts";
import { refereeCopies } from "../schema/referee-copies.ts";
import { studies } from "../schema/studies.ts";

export type RefereeCopyRow = typeof refereeCopies.$inferSelect;
export type RefereeCopySummaryRow = Omit<RefereeCopyRow, "content" | "tokenHash"> & { sealedByName: string | null };

const summary = {
  id: refereeCopies.id,
  studyId: refereeCopies.studyId,
  cellName: refereeCopies.cellName,
  also: refereeCopies.also,
  note: refereeCopies.note,
  fingerprint: refereeCopies.fingerprint,
  sealedBy: refereeCopies.sealedBy,
  sealedAt: refereeCopies.sealedAt,
  revokedAt: refereeCopies.revokedAt,
  lastOpenedAt: refereeCopies.lastOpenedAt,
  expiresAt: refereeCopies.expiresAt,
  replacedBy: refereeCopies.replacedBy,
  sealedByName: user.name,
};

export function insertRefereeCopy(db: Database, row: RefereeCopyRow): void {
  db.insert(refereeCopies).values(row).run();
}

/** Newest first. */
export function refereeCopiesOf(db: Database, studyId: string): RefereeCopySummaryRow[] {
  return db
    .select(summary)
    .from(refereeCopies)
    .leftJoin(user, eq(user.id, refereeCopies.sealedBy))
    .where(eq(refereeCopies.studyId, studyId))
    .orderBy(desc(refereeCopies.sealedAt))
    .all();
}

export function findRefereeCopy(db: Database, studyId: string, copyId: string): RefereeCopySummaryRow | undefined {
  return db
    .select(summary)
    .from(refereeCopies)
    .leftJoin(user, eq(user.id, refereeCopies.sealedBy))
    .where(and(eq(refereeCopies.studyId, studyId), eq(refereeCopies.id, copyId)))
    .get();
}

type OpenedRow = Pick<RefereeCopyRow, "id" | "fingerprint" | "content" | "sealedAt" | "replacedBy">;

const opened = {
  id: refereeCopies.id,
  fingerprint: refereeCopies.fingerprint,
  content: refereeCopies.content,
  sealedAt: refereeCopies.sealedAt,
  replacedBy: refereeCopies.replacedBy,
};

/**
 * Only a copy that is not revoked and has not run out, of a study that is not deleted: one query, whether the token is
 * wrong or its copy closed.
 */
export function openRefereeCopy(
  db: Database,
  by: { readonly tokenHash: string } | { readonly id: string },
  now: Date,
): OpenedRow | undefined {
  const which = "id" in by ? eq(refereeCopies.id, by.id) : eq(refereeCopies.tokenHash, by.tokenHash);
  const hasNotRunOut = or(isNull(refereeCopies.expiresAt), gt(refereeCopies.expiresAt, now));
  return db
    .select(opened)
    .from(refereeCopies)
    .innerJoin(studies, eq(studies.id, refereeCopies.studyId))
    .where(and(which, isNull(refereeCopies.revokedAt), hasNotRunOut, isNull(studies.deletedAt)))
    .get();
}

type Change = Partial<Pick<RefereeCopyRow, "tokenHash" | "expiresAt" | "replacedBy" | "revokedAt" | "lastOpenedAt">>;

export function changeRefereeCopy(db: Database, copyId: string, change: Change): void {
  db.update(refereeCopies).set(change).where(eq(refereeCopies.id, copyId)).run();
}
