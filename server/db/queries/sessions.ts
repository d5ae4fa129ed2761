import { and, desc, eq, gt } from "drizzle-orm";
import type { Database } from "../client.ts";
import { session } from "../schema/auth.ts";

export type SessionRow = typeof session.$inferSelect;

/** An account's open sessions, the one used last first. */
export function sessionsOf(db: Database, userId: string, now: Date): SessionRow[] {
  return db
    .select()
    .from(session)
    .where(and(eq(session.userId, userId), gt(session.expiresAt, now)))
    .orderBy(desc(session.updatedAt), desc(session.createdAt))
    .all();
}
