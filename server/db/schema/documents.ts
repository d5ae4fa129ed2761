import { blob, index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { studies } from "./studies.ts";

/** Every document update, written before anyone else sees it. The document is the sum of its rows. */
export const documentUpdates = sqliteTable(
  "document_updates",
  {
    id: integer("id").primaryKey({ autoIncrement: true }),
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    update: blob("update", { mode: "buffer" }).notNull(),
    /** The account that made it; null once compacted or when the program itself made it. */
    userId: text("user_id"),
    at: integer("at", { mode: "timestamp_ms" }).notNull(),
  },
  (table) => [index("document_updates_study").on(table.studyId, table.id)],
);
