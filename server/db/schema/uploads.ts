import { blob, index, integer, primaryKey, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { studies } from "./studies.ts";

export const uploads = sqliteTable(
  "uploads",
  {
    id: text("id").primaryKey(),
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    /** By which cells name it; its versions share it. */
    name: text("name").notNull(),
    /** 1 for the first file of the name; 0 while it is still coming in. */
    version: integer("version").notNull().default(1),
    /** What the file of this version was called, when otherwise. */
    fileName: text("file_name"),
    bytes: integer("bytes").notNull(),
    /** "receiving" until every byte is stored and parsed; such rows are removed at start. */
    state: text("state", { enum: ["receiving", "ready"] }).notNull(),
    sha256: text("sha256"),
    rows: integer("rows"),
    format: text("format", { enum: ["csv", "parquet", "xlsx"] })
      .notNull()
      .default("csv"),
    /** The sheet that was read, and the names of all (JSON), of a workbook. */
    sheet: text("sheet"),
    sheets: text("sheets"),
    separator: text("separator"),
    decimalComma: integer("decimal_comma", { mode: "boolean" }),
    uploadedBy: text("uploaded_by").notNull(),
    uploadedAt: integer("uploaded_at", { mode: "timestamp_ms" }).notNull(),
  },
  (table) => [index("uploads_study").on(table.studyId)],
);

/** The file as it came, in pieces of at most 1 MiB. */
export const uploadChunks = sqliteTable(
  "upload_chunks",
  {
    uploadId: text("upload_id")
      .notNull()
      .references(() => uploads.id, { onDelete: "cascade" }),
    position: integer("position").notNull(),
    bytes: blob("bytes", { mode: "buffer" }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.uploadId, table.position] })],
);

/** The file's columns, parsed once: Float64 little-endian, or Int32 codes with their levels as JSON. */
export const uploadColumns = sqliteTable(
  "upload_columns",
  {
    uploadId: text("upload_id")
      .notNull()
      .references(() => uploads.id, { onDelete: "cascade" }),
    position: integer("position").notNull(),
    name: text("name").notNull(),
    type: text("type", { enum: ["number", "text"] }).notNull(),
    /** The column as `shared/schemas/resources` describes it, JSON. */
    description: text("description").notNull(),
    levels: text("levels"),
    values: blob("values", { mode: "buffer" }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.uploadId, table.position] })],
);
