import { index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { studies } from "./studies.ts";

export const refereeCopies = sqliteTable(
  "referee_copies",
  {
    id: text("id").primaryKey(),
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    /** SHA-256 of the link's token; the token itself is told once and never stored. */
    tokenHash: text("token_hash").notNull().unique(),
    cellName: text("cell_name").notNull(),
    note: text("note").notNull(),
    /** SHA-256 of the canonical JSON of `content`. */
    fingerprint: text("fingerprint").notNull(),
    content: text("content").notNull(),
    sealedBy: text("sealed_by").notNull(),
    sealedAt: integer("sealed_at", { mode: "timestamp_ms" }).notNull(),
    revokedAt: integer("revoked_at", { mode: "timestamp_ms" }),
    lastOpenedAt: integer("last_opened_at", { mode: "timestamp_ms" }),
  },
  (table) => [index("referee_copies_study").on(table.studyId)],
);
