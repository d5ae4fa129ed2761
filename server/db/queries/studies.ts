import { count, desc, eq } from "drizzle-orm";
import type { Role } from "../../../shared/schemas/resources.ts";
import type { Database } from "../client.ts";
import { studies, studyMembers } from "../schema/studies.ts";

export type StudyRow = typeof studies.$inferSelect;

export function insertStudy(db: Database, row: typeof studies.$inferInsert): void {
  db.insert(studies).values(row).run();
}

export function findStudy(db: Database, studyId: string): StudyRow | undefined {
  return db.select().from(studies).where(eq(studies.id, studyId)).get();
}

export function studiesOf(db: Database, userId: string): { study: StudyRow; role: Role }[] {
  return db
    .select({ study: studies, role: studyMembers.role })
    .from(studyMembers)
    .innerJoin(studies, eq(studies.id, studyMembers.studyId))
    .where(eq(studyMembers.userId, userId))
    .orderBy(desc(studies.changedAt))
    .all();
}

export function changeStudy(
  db: Database,
  studyId: string,
  change: Partial<Pick<StudyRow, "title" | "lede" | "changedAt">>,
): void {
  db.update(studies).set(change).where(eq(studies.id, studyId)).run();
}

export function deleteStudy(db: Database, studyId: string): void {
  db.delete(studies).where(eq(studies.id, studyId)).run();
}

export function countStudies(db: Database): number {
  return db.select({ studies: count() }).from(studies).get()?.studies ?? 0;
}
