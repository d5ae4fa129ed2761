import { asc, eq } from "drizzle-orm";
import type { Database } from "../client.ts";
import { documentUpdates } from "../schema/documents.ts";

/** The updates of a study's document, oldest first. */
export function loadUpdates(db: Database, studyId: string): Uint8Array[] {
  return db
    .select({ update: documentUpdates.update })
    .from(documentUpdates)
    .where(eq(documentUpdates.studyId, studyId))
    .orderBy(asc(documentUpdates.id))
    .all()
    .map((row) => row.update);
}

/** On disk when this returns. `userId` is null when the program itself made the update. */
export function appendUpdate(
  db: Database,
  studyId: string,
  update: Uint8Array,
  userId: string | null,
  at = new Date(),
): void {
  db.insert(documentUpdates)
    .values({ studyId, update: Buffer.from(update), userId, at })
    .run();
}
