import { and, count, desc, eq, sum } from "drizzle-orm";
import type { Database } from "../client.ts";
import { user } from "../schema/auth.ts";
import { checkpoints } from "../schema/history.ts";

export type CheckpointRow = typeof checkpoints.$inferSelect;
export type CheckpointSummaryRow = Omit<CheckpointRow, "cells" | "title" | "lede"> & {
  /** None when the account is gone. */
  readonly madeByName: string | null;
};

const summary = {
  id: checkpoints.id,
  studyId: checkpoints.studyId,
  name: checkpoints.name,
  note: checkpoints.note,
  occasion: checkpoints.occasion,
  madeBy: checkpoints.madeBy,
  madeAt: checkpoints.madeAt,
  cellCount: checkpoints.cellCount,
  size: checkpoints.size,
  madeByName: user.name,
};

export function insertCheckpoint(db: Database, row: CheckpointRow): void {
  db.insert(checkpoints).values(row).run();
}

/** The newest first. */
export function checkpointsOf(db: Database, studyId: string): CheckpointSummaryRow[] {
  return db
    .select(summary)
    .from(checkpoints)
    .leftJoin(user, eq(user.id, checkpoints.madeBy))
    .where(eq(checkpoints.studyId, studyId))
    .orderBy(desc(checkpoints.madeAt))
    .all();
}

/** With its cells. */
export function findCheckpoint(
  db: Database,
  studyId: string,
  checkpointId: string,
): (CheckpointRow & Pick<CheckpointSummaryRow, "madeByName">) | undefined {
  return db
    .select({ ...summary, title: checkpoints.title, lede: checkpoints.lede, cells: checkpoints.cells })
    .from(checkpoints)
    .leftJoin(user, eq(user.id, checkpoints.madeBy))
    .where(and(eq(checkpoints.studyId, studyId), eq(checkpoints.id, checkpointId)))
    .get();
}

export function changeCheckpoint(
  db: Database,
  checkpointId: string,
  change: Partial<Pick<CheckpointRow, "name" | "note">>,
): void {
  db.update(checkpoints).set(change).where(eq(checkpoints.id, checkpointId)).run();
}

export function deleteCheckpoint(db: Database, checkpointId: string): void {
  db.delete(checkpoints).where(eq(checkpoints.id, checkpointId)).run();
}

/** How many checkpoints a study has, and how many characters they hold together. */
export function checkpointTotals(db: Database, studyId: string): { readonly count: number; readonly size: number } {
  const totals = db
    .select({ count: count(), size: sum(checkpoints.size) })
    .from(checkpoints)
    .where(eq(checkpoints.studyId, studyId))
    .get();
  return { count: totals?.count ?? 0, size: Number(totals?.size ?? 0) };
}
