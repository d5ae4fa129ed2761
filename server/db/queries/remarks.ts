import { and, asc, eq, inArray, ne, sql } from "drizzle-orm";
import type { Database } from "../client.ts";
import { user } from "../schema/auth.ts";
import { remarkReplies, remarks } from "../schema/remarks.ts";

export type RemarkRow = typeof remarks.$inferSelect;
export type ReplyRow = typeof remarkReplies.$inferSelect;

/** All of a study, the oldest first. */
export function remarksOf(db: Database, studyId: string): RemarkRow[] {
  return db
    .select()
    .from(remarks)
    .where(eq(remarks.studyId, studyId))
    .orderBy(asc(remarks.writtenAt), asc(remarks.id))
    .all();
}

export function repliesOf(db: Database, studyId: string): ReplyRow[] {
  return db
    .select({ reply: remarkReplies })
    .from(remarkReplies)
    .innerJoin(remarks, eq(remarks.id, remarkReplies.remarkId))
    .where(eq(remarks.studyId, studyId))
    .orderBy(asc(remarkReplies.writtenAt), asc(remarkReplies.id))
    .all()
    .map(({ reply }) => reply);
}

export function findRemark(db: Database, studyId: string, remarkId: string): RemarkRow | undefined {
  return db
    .select()
    .from(remarks)
    .where(and(eq(remarks.studyId, studyId), eq(remarks.id, remarkId)))
    .get();
}

export function findReply(db: Database, remarkId: string, replyId: string): ReplyRow | undefined {
  return db
    .select()
    .from(remarkReplies)
    .where(and(eq(remarkReplies.remarkId, remarkId), eq(remarkReplies.id, replyId)))
    .get();
}

export function countReplies(db: Database, remarkId: string): number {
  const counts = sql<number>`count(*)`;
  return db.select({ counts }).from(remarkReplies).where(eq(remarkReplies.remarkId, remarkId)).get()?.counts ?? 0;
}

/** How much is written about a study: remarks and replies together, and their characters. */
export function measureRemarks(db: Database, studyId: string): { count: number; characters: number } {
  const characters = sql<number>`coalesce(sum(length(text)), 0)`;
  const ids = db.select({ id: remarks.id }).from(remarks).where(eq(remarks.studyId, studyId));
  const counts = sql<number>`count(*)`;
  const first = db.select({ counts, characters }).from(remarks).where(eq(remarks.studyId, studyId)).get();
  const second = db
    .select({ counts, characters })
    .from(remarkReplies)
    .where(inArray(remarkReplies.remarkId, ids))
    .get();
  return {
    count: (first?.counts ?? 0) + (second?.counts ?? 0),
    characters: (first?.characters ?? 0) + (second?.characters ?? 0),
  };
}

export function insertRemark(
  db: Database,
  remark: Pick<RemarkRow, "id" | "studyId" | "cellId" | "cellName" | "anchor" | "authorId" | "text" | "writtenAt">,
): void {
  db.insert(remarks).values(remark).run();
}

export function insertReply(db: Database, reply: Omit<ReplyRow, "editedAt">): void {
  db.insert(remarkReplies).values(reply).run();
}

export function changeRemark(
  db: Database,
  remarkId: string,
  change: Partial<Omit<RemarkRow, "id" | "studyId" | "cellId" | "authorId">>,
): void {
  db.update(remarks).set(change).where(eq(remarks.id, remarkId)).run();
}

export function changeReply(db: Database, replyId: string, change: Pick<ReplyRow, "text" | "editedAt">): void {
  db.update(remarkReplies).set(change).where(eq(remarkReplies.id, replyId)).run();
}

export function deleteRemark(db: Database, remarkId: string): void {
  db.delete(remarks).where(eq(remarks.id, remarkId)).run();
}

export function deleteReply(db: Database, replyId: string): void {
  db.delete(remarkReplies).where(eq(remarkReplies.id, replyId)).run();
}

/** A cell has another name: its remarks follow. */
export function renameRemarkedCell(db: Database, studyId: string, cellId: string, name: string): void {
  db.update(remarks)
    .set({ cellName: name })
    .where(and(eq(remarks.studyId, studyId), eq(remarks.cellId, cellId), ne(remarks.cellName, name)))
    .run();
}

/** Which cells of a study are remarked on, under which name. */
export function remarkedCells(db: Database, studyId: string): { cellId: string; cellName: string }[] {
  return db
    .selectDistinct({ cellId: remarks.cellId, cellName: remarks.cellName })
    .from(remarks)
    .where(eq(remarks.studyId, studyId))
    .all();
}

/** Names of accounts; those that are gone have none. */
export function namesOf(db: Database, ids: readonly string[]): ReadonlyMap<string, string> {
  if (ids.length === 0) return new Map();
  const rows = db
    .select({ id: user.id, name: user.name })
    .from(user)
    .where(inArray(user.id, [...ids]))
    .all();
  return new Map(rows.map(({ id, name }) => [id, name]));
}
