import { and, asc, eq, isNotNull, isNull, type SQL } from "drizzle-orm";
import type { Role } from "../../../shared/schemas/resources.ts";
import type { Database } from "../client.ts";
import { user } from "../schema/auth.ts";
import { studies, studyMembers } from "../schema/studies.ts";

export interface PersonRow {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly role: Role;
}

const person = { id: user.id, name: user.name, email: user.email, role: studyMembers.role };

/** Everyone of a study, in the order they were added. */
export function peopleOf(db: Database, studyId: string): PersonRow[] {
  return db
    .select(person)
    .from(studyMembers)
    .innerJoin(user, eq(user.id, studyMembers.userId))
    .where(eq(studyMembers.studyId, studyId))
    .orderBy(asc(studyMembers.addedAt), asc(user.name))
    .all();
}

/** In a study that is there. */
export function roleIn(db: Database, studyId: string, userId: string): Role | undefined {
  return roleWhere(db, studyId, userId, isNull(studies.deletedAt));
}

/** In a study that is deleted and not yet purged. */
export function roleInDeleted(db: Database, studyId: string, userId: string): Role | undefined {
  return roleWhere(db, studyId, userId, isNotNull(studies.deletedAt));
}

function roleWhere(db: Database, studyId: string, userId: string, standing: SQL): Role | undefined {
  return db
    .select({ role: studyMembers.role })
    .from(studyMembers)
    .innerJoin(studies, eq(studies.id, studyMembers.studyId))
    .where(and(eq(studyMembers.studyId, studyId), eq(studyMembers.userId, userId), standing))
    .get()?.role;
}

export function insertPerson(db: Database, studyId: string, userId: string, role: Role, addedAt: Date): void {
  db.insert(studyMembers).values({ studyId, userId, role, addedAt }).run();
}

export function changeRole(db: Database, studyId: string, userId: string, role: Role): void {
  db.update(studyMembers)
    .set({ role })
    .where(and(eq(studyMembers.studyId, studyId), eq(studyMembers.userId, userId)))
    .run();
}

/** From this person's list only; null brings it back into it. */
export function putAway(db: Database, studyId: string, userId: string, putAwayAt: Date | null): void {
  db.update(studyMembers)
    .set({ putAwayAt })
    .where(and(eq(studyMembers.studyId, studyId), eq(studyMembers.userId, userId)))
    .run();
}

export function deletePerson(db: Database, studyId: string, userId: string): void {
  db.delete(studyMembers)
    .where(and(eq(studyMembers.studyId, studyId), eq(studyMembers.userId, userId)))
    .run();
}
