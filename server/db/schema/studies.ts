import { index, integer, primaryKey, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { user } from "./auth.ts";

export const studies = sqliteTable("studies", {
  id: text("id").primaryKey(),
  title: text("title").notNull(),
  lede: text("lede").notNull().default(""),
  createdAt: integer("created_at", { mode: "timestamp_ms" }).notNull(),
  changedAt: integer("changed_at", { mode: "timestamp_ms" }).notNull(),
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
  },
  (table) => [primaryKey({ columns: [table.studyId, table.userId] }), index("study_members_user").on(table.userId)],
);
