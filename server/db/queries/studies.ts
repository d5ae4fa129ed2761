import { and, count, desc, eq, isNotNull, isNull, lt } from "drizzle-orm";
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

export interface Belonging {
  readonly study: StudyRow;
  readonly role: Role;
  readonly putAwayAt: Date | null;
}

/** The one changed last first. */
export function studiesOf(db: Database, userId: string): Belonging[] {
  return db
    .select({ study: studies, role: studyMembers.role, putAwayAt: studyMembers.putAwayAt })
    .from(studyMembers)
    .innerJoin(studies, eq(studies.id, studyMembers.studyId))
    .where(and(eq(studyMembers.userId, userId), isNull(studies.deletedAt)))
    .orderBy(desc(studies.changedAt))
    .all();
}

/** Deleted studies of an owner that are not yet purged, the latest first. */
export function deletedStudiesOf(db: Database, userId: string): StudyRow[] {
  return db
    .select({ study: studies })
    .from(studyMembers)
    .innerJoin(studies, eq(studies.id, studyMembers.studyId))
    .where(and(eq(studyMembers.userId, userId), eq(studyMembers.role, "owner"), isNotNull(studies.deletedAt)))
    .orderBy(desc(studies.deletedAt))
    .all()
    .map(({ study }) => study);
}

/** Studies deleted before then. */
export function studiesDeletedBefore(db: Database, then: Date): string[] {
  return db
    .select({ id: studies.id })
    .from(studies)
    .where(lt(studies.deletedAt, then))
    .all()
    .map(({ id }) => id);
}

export function changeStudy(
  db: Database,
  studyId: string,
  change: Partial<Pick<StudyRow, "title" | "lede" | "changedAt" | "deletedAt">>,
): void {
  db.update(studies).set(change).where(eq(studies.id, studyId)).run();
}

/** With everything in it. */
export function deleteStudy(db: Database, studyId: string): void {
  db.delete(studies).where(eq(studies.id, studyId)).run();
}

export function countStudies(db: Database): number {
  return db.select({ studies: count() }).from(studies).get()?.studies ?? 0;
}
