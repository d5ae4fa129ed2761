import { index, integer, primaryKey, real, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { studies } from "./studies.ts";

/** A finding under the SHA-256 of everything it depends on. Never changed, never under another key. */
export const findings = sqliteTable(
  "findings",
  {
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    fingerprint: text("fingerprint").notNull(),
    kind: text("kind").notNull(),
    /** JSON of the kind's schema. */
    finding: text("finding").notNull(),
    tookMs: real("took_ms").notNull(),
    foundAt: integer("found_at", { mode: "timestamp_ms" }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.studyId, table.fingerprint] })],
);

/** Which finding a cell last had, and the source that asked for it. */
export const cellFindings = sqliteTable(
  "cell_findings",
  {
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    cellId: text("cell_id").notNull(),
    fingerprint: text("fingerprint").notNull(),
    source: text("source").notNull(),
    userId: text("user_id"),
    /** SHA-256 of the upload it rested on. */
    uploadSha256: text("upload_sha256"),
    at: integer("at", { mode: "timestamp_ms" }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.studyId, table.cellId] }), index("cell_findings_study").on(table.studyId)],
);
