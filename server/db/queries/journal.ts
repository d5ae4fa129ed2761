import { and, desc, eq, isNull, lt, notInArray, type SQL } from "drizzle-orm";
import type { Database } from "../client.ts";
import { user } from "../schema/auth.ts";
import { journal } from "../schema/journal.ts";

export interface JournalRow {
  readonly id: number;
  readonly at: Date;
  readonly actorId: string | null;
  /** As the account is called now; null when it is gone. */
  readonly actorName: string | null;
  readonly action: string;
  readonly subject: string | null;
}

export function insertJournalRow(db: Database, row: Omit<typeof journal.$inferInsert, "id">): void {
  db.insert(journal).values(row).run();
}

interface Page {
  /** Only rows older than this one. */
  readonly before: number | undefined;
  readonly most: number;
  readonly without: readonly string[];
}

/** Newest first; the installation's own where no study is named. */
export function journalOf(db: Database, studyId: string | undefined, { before, most, without }: Page): JournalRow[] {
  const conditions: SQL[] = [studyId === undefined ? isNull(journal.studyId) : eq(journal.studyId, studyId)];
  if (before !== undefined) conditions.push(lt(journal.id, before));
  if (without.length > 0) conditions.push(notInArray(journal.action, [...without]));
  return db
    .select({
      id: journal.id,
      at: journal.at,
      actorId: journal.actorId,
      actorName: user.name,
      action: journal.action,
      subject: journal.subject,
    })
    .from(journal)
    .leftJoin(user, eq(user.id, journal.actorId))
    .where(and(...conditions))
    .orderBy(desc(journal.id))
    .limit(most)
    .all();
}

/** With its study, when that is deleted for good. */
export function deleteJournalOf(db: Database, studyId: string): void {
  db.delete(journal).where(eq(journal.studyId, studyId)).run();
}
