import { index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";

/**
 * What was done by whom; rows are added and never changed, which a trigger holds. Without a study: what concerns the
 * installation. No foreign key, so that what was done outlives who did it.
 */
export const journal = sqliteTable(
  "journal",
  {
    id: integer("id").primaryKey({ autoIncrement: true }),
    at: integer("at", { mode: "timestamp_ms" }).notNull(),
    studyId: text("study_id"),
    actorId: text("actor_id"),
    action: text("action").notNull(),
    /** What or whom it was done to, in words. */
    subject: text("subject"),
  },
  (table) => [index("journal_study").on(table.studyId, table.id)],
);
