import { index, integer, primaryKey, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { user } from "./auth.ts";

export const studies = sqliteTable("studies", {
  id: text("id").primaryKey(),
  title: text("title").notNull(),
  lede: text("lede").notNull().default(""),
  createdAt: integer("created_at", { mode: "timestamp_ms" }).notNull(),
  changedAt: integer("changed_at", { mode: "timestamp_ms" }).notNull(),
  /** Deleted then; its owners may bring it back until it is purged. */
  deletedAt: integer("deleted_at", { mode: "timestamp_ms" }),
});

export const studyMembers = sqliteTable(
  "study_members",
  {
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    userId: text("user_id")
      .notNull()
      .references(() => user.id, { onDelete: "cascade" }),
    role: text("role", { enum: ["owner", "coauthor", "reader"] }).notNull(),
    addedAt: integer("added_at", { mode: "timestamp_ms" }).notNull(),
    /** This person has put the study away, from their own list only. */
    putAwayAt: integer("put_away_at", { mode: "timestamp_ms" }),
  },
  (table) => [primaryKey({ columns: [table.studyId, table.userId] }), index("study_members_user").on(table.userId)],
);
