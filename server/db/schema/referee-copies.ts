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
    /** Names of the cells sealed with the matrix, JSON. */
    also: text("also", { mode: "json" }).$type<string[]>().notNull().default([]),
    note: text("note").notNull(),
    /** SHA-256 of the canonical JSON of `content`. */
    fingerprint: text("fingerprint").notNull(),
    content: text("content").notNull(),
    sealedBy: text("sealed_by").notNull(),
    sealedAt: integer("sealed_at", { mode: "timestamp_ms" }).notNull(),
    revokedAt: integer("revoked_at", { mode: "timestamp_ms" }),
    lastOpenedAt: integer("last_opened_at", { mode: "timestamp_ms" }),
    /** From then on its link opens nothing; null: until it is revoked. */
    expiresAt: integer("expires_at", { mode: "timestamp_ms" }),
    /** The id of the copy sealed in its place. */
    replacedBy: text("replaced_by"),
  },
  (table) => [index("referee_copies_study").on(table.studyId)],
);
