import { integer, primaryKey, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { studies } from "./studies.ts";

/**
 * Estimations that have been started and have not ended. A row that is there when the program starts
 * is one that was interrupted: the cell then says so.
 */
export const estimations = sqliteTable(
  "estimations",
  {
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    cellId: text("cell_id").notNull(),
    fingerprint: text("fingerprint").notNull(),
    startedAt: integer("started_at", { mode: "timestamp_ms" }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.studyId, table.cellId] })],
);
