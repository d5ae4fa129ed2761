import { and, desc, eq, isNull } from "drizzle-orm";
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
  note: refereeCopies.note,
  fingerprint: refereeCopies.fingerprint,
  sealedBy: refereeCopies.sealedBy,
  sealedAt: refereeCopies.sealedAt,
  revokedAt: refereeCopies.revokedAt,
  lastOpenedAt: refereeCopies.lastOpenedAt,
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

/** Only a copy that is not revoked, of a study that is not deleted: one query, whether the token is wrong or its copy revoked. */
export function openRefereeCopy(
  db: Database,
  tokenHash: string,
): Pick<RefereeCopyRow, "id" | "fingerprint" | "content"> | undefined {
  return db
    .select({ id: refereeCopies.id, fingerprint: refereeCopies.fingerprint, content: refereeCopies.content })
    .from(refereeCopies)
    .innerJoin(studies, eq(studies.id, refereeCopies.studyId))
    .where(and(eq(refereeCopies.tokenHash, tokenHash), isNull(refereeCopies.revokedAt), isNull(studies.deletedAt)))
    .get();
}

export function changeRefereeCopy(
  db: Database,
  copyId: string,
  change: Partial<Pick<RefereeCopyRow, "revokedAt" | "lastOpenedAt">>,
): void {
  db.update(refereeCopies).set(change).where(eq(refereeCopies.id, copyId)).run();
}
