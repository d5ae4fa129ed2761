import { and, asc, eq, sql } from "drizzle-orm";
import type { Database } from "../client.ts";
import { studies, studyMembers } from "../schema/studies.ts";

/** A study whose only owner a person is. */
export interface Holding {
  readonly studyId: string;
  readonly title: string;
  /** How many people besides are in it. */
  readonly others: number;
  readonly deleted: boolean;
}

export function holdingsOf(db: Database, userId: string): Holding[] {
  const countOf = (condition: ReturnType<typeof sql>) =>
    sql<number>`(select count(*) from study_members m where m.study_id = ${studies.id} and ${condition})`;
  const owners = countOf(sql`m.role = 'owner'`);
  return db
    .select({
      studyId: studies.id,
      title: studies.title,
      others: countOf(sql`m.user_id <> ${userId}`),
      deleted: sql<number>`${studies.deletedAt} is not null`.mapWith(Boolean),
    })
    .from(studyMembers)
    .innerJoin(studies, eq(studies.id, studyMembers.studyId))
    .where(and(eq(studyMembers.userId, userId), eq(studyMembers.role, "owner"), sql`${owners} = 1`))
    .orderBy(asc(studies.title))
    .all();
}
