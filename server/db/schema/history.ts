import { index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { studies } from "./studies.ts";

/**
 * Who worked on which cell, and when. One row a sitting, written with the updates it sums up, so that it outlives
 * their compaction. What a sitting made of the cell is what the next one found, or the cell as it stands.
 */
export const cellSittings = sqliteTable(
  "cell_sittings",
  {
    id: integer("id").primaryKey({ autoIncrement: true }),
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    cellId: text("cell_id").notNull(),
    /** JSON list of accounts; several who wrote in turns, none when the program wrote. */
    people: text("people").notNull(),
    startedAt: integer("started_at", { mode: "timestamp_ms" }).notNull(),
    endedAt: integer("ended_at", { mode: "timestamp_ms" }).notNull(),
    /** The cell as the sitting found it, as JSON; null when there was none. */
    before: text("before"),
  },
  (table) => [
    index("cell_sittings_study").on(table.studyId, table.id),
    index("cell_sittings_cell").on(table.studyId, table.cellId, table.id),
  ],
);

/** A state of a study that was given a name, whole. */
export const checkpoints = sqliteTable(
  "checkpoints",
  {
    id: text("id").primaryKey(),
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    note: text("note").notNull(),
    /** Kept by a person, or by the program before a person returned to another. */
    occasion: text("occasion", { enum: ["kept", "before returning"] }).notNull(),
    madeBy: text("made_by").notNull(),
    madeAt: integer("made_at", { mode: "timestamp_ms" }).notNull(),
    /** Of the study at the time, for its study file. */
    title: text("title").notNull(),
    lede: text("lede").notNull(),
    /** JSON list of cells with ids, names, kinds, order and sources. */
    cells: text("cells").notNull(),
    cellCount: integer("cell_count").notNull(),
    /** Of `cells`, in characters. */
    size: integer("size").notNull(),
  },
  (table) => [index("checkpoints_study").on(table.studyId, table.madeAt)],
);
