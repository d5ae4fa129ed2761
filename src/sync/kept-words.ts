import * as Y from "yjs";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { listCells } from "./cells.ts";
import { asked, databaseOf, UNSTORED } from "./keeping.ts";

/** What this browser keeps of a study with edits the server never took. */
export interface KeptWords {
  readonly edits: number;
  /** The whole study as this browser last knew it. */
  readonly cells: readonly CellSource[];
}

/** Undefined when nothing is kept, or all of it is stored. */
export async function keptWords(accountId: string, studyId: string): Promise<KeptWords | undefined> {
  const name = databaseOf(accountId, studyId);
  if (!(await indexedDB.databases()).some((one) => one.name === name)) return undefined;
  const database = await asked(indexedDB.open(name));
  try {
    const stores = database.objectStoreNames;
    if (!stores.contains("custom") || !stores.contains("updates")) return undefined;
    const reading = database.transaction(["custom", "updates"]);
    const [edits, updates] = await Promise.all([
      asked(reading.objectStore("custom").get(UNSTORED)),
      asked(reading.objectStore("updates").getAll()),
    ]);
    return Number(edits ?? 0) > 0 ? { edits: Number(edits), cells: cellsIn(updates as Uint8Array[]) } : undefined;
  } finally {
    database.close();
  }
}

function cellsIn(updates: readonly Uint8Array[]): readonly CellSource[] {
  const doc = new Y.Doc();
  doc.transact(() => {
    for (const update of updates) Y.applyUpdate(doc, update);
  });
  const cells = listCells(doc);
  doc.destroy();
  return cells;
}

/** Forgets what is kept of a study, stored or not. */
export async function letGo(accountId: string, studyId: string): Promise<void> {
  await asked(indexedDB.deleteDatabase(databaseOf(accountId, studyId)));
}
