import { index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { studies } from "./studies.ts";

/** Remarks on cells. Not in the document: a reader writes remarks, and never the document. */
export const remarks = sqliteTable(
  "remarks",
  {
    id: text("id").primaryKey(),
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    cellId: text("cell_id").notNull(),
    /** The cell's name, followed while the cell is there; the last one it had afterwards. */
    cellName: text("cell_name").notNull(),
    anchor: text("anchor"),
    authorId: text("author_id").notNull(),
    /** Empty once withdrawn. */
    text: text("text").notNull(),
    writtenAt: integer("written_at", { mode: "timestamp_ms" }).notNull(),
    editedAt: integer("edited_at", { mode: "timestamp_ms" }),
    withdrawnAt: integer("withdrawn_at", { mode: "timestamp_ms" }),
    settledBy: text("settled_by"),
    settledAt: integer("settled_at", { mode: "timestamp_ms" }),
    reopenedBy: text("reopened_by"),
    reopenedAt: integer("reopened_at", { mode: "timestamp_ms" }),
  },
  (table) => [index("remarks_study").on(table.studyId, table.writtenAt)],
);

export const remarkReplies = sqliteTable(
  "remark_replies",
  {
    id: text("id").primaryKey(),
    remarkId: text("remark_id")
      .notNull()
      .references(() => remarks.id, { onDelete: "cascade" }),
    authorId: text("author_id").notNull(),
    text: text("text").notNull(),
    writtenAt: integer("written_at", { mode: "timestamp_ms" }).notNull(),
    editedAt: integer("edited_at", { mode: "timestamp_ms" }),
  },
  (table) => [index("remark_replies_remark").on(table.remarkId, table.writtenAt)],
);
