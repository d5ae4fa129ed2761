import { and, asc, eq, lte } from "drizzle-orm";
import * as Y from "yjs";
import type { CellEdit } from "../../shared/study/cell-edit.ts";
import type { Database } from "../db/client.ts";
import { appendUpdate, loadUpdates } from "../db/queries/documents.ts";
import { noteEdits } from "../db/queries/sittings.ts";
import { documentUpdates } from "../db/schema/documents.ts";

export interface NewUpdate {
  readonly update: Uint8Array;
  /** The account that made it; null when the program did. */
  readonly userId: string | null;
  /** What it does to which cells, for the history; left out where none is kept. */
  readonly edits?: readonly CellEdit[];
}

/** Where documents are kept. Whatever `append` was given is on disk when it returns, or when its promise is kept. */
export interface DocumentUpdates {
  /** Oldest first. */
  load(studyId: string): Uint8Array[];
  append(studyId: string, update: Uint8Array, userId: string | null, edits?: readonly CellEdit[]): void | Promise<void>;
  /** Several at once, all or none; without it they are appended one by one. */
  appendAll?(studyId: string, updates: readonly NewUpdate[]): void;
  /** Puts one row in the place of all; what the rows say together stays the same. */
  compact?(studyId: string): void;
}

/** Documents in the table `document_updates`, and with each update who edited which cell. */
export function storedUpdates(db: Database): DocumentUpdates {
  return {
    load: (studyId) => loadUpdates(db, studyId),
    append: (studyId, update, userId, edits) => appendAll(db, studyId, [{ update, userId, edits }]),
    appendAll: (studyId, updates) => appendAll(db, studyId, updates),
    compact: (studyId) => compact(db, studyId),
  };
}

/** In one transaction: an update is never there without its history, nor the history without its update. */
function appendAll(db: Database, studyId: string, updates: readonly NewUpdate[]): void {
  const at = new Date();
  db.transaction((inside) => {
    for (const { update, userId, edits = [] } of updates) {
      appendUpdate(inside, studyId, update, userId, at);
      noteEdits(inside, studyId, edits, userId, at);
    }
  });
}

/** In one transaction, so that a crash leaves either the rows or their sum. */
function compact(db: Database, studyId: string): void {
  db.transaction((inside) => {
    const rows = inside
      .select({ id: documentUpdates.id, update: documentUpdates.update })
      .from(documentUpdates)
      .where(eq(documentUpdates.studyId, studyId))
      .orderBy(asc(documentUpdates.id))
      .all();
    if (rows.length < 2) return;
    const doc = new Y.Doc();
    doc.transact(() => {
      for (const row of rows) Y.applyUpdate(doc, row.update);
    });
    inside
      .delete(documentUpdates)
      .where(and(eq(documentUpdates.studyId, studyId), lte(documentUpdates.id, rows[rows.length - 1].id)))
      .run();
    inside
      .insert(documentUpdates)
      .values({ studyId, update: Buffer.from(Y.encodeStateAsUpdate(doc)), userId: null, at: new Date() })
      .run();
    doc.destroy();
  });
}
