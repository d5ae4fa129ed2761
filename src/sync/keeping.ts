import { IndexeddbPersistence } from "y-indexeddb";
import type * as Y from "yjs";

/** Edits kept in this browser until the server has them. */
export interface Keeping {
  /** What an earlier visit left is in the document: how many of its edits were not known to be stored. */
  readonly loaded: Promise<number>;
  note(unstored: number): void;
  /** Whether a change of the document is what was found here, and not an edit. */
  brought(origin: unknown): boolean;
  close(): Promise<void>;
}

export const UNSTORED = "unstored";
/** A browser may refuse to keep anything; the study then opens without. */
const PATIENCE_MS = 4_000;

export const databaseOf = (accountId: string, studyId: string) => `tangency/${accountId}/${studyId}`;

export function keepInBrowser(accountId: string, studyId: string, doc: Y.Doc): Keeping {
  const persistence = new IndexeddbPersistence(databaseOf(accountId, studyId), doc);
  const loaded = persistence.whenSynced.then(async () => Number((await persistence.get(UNSTORED)) ?? 0));
  return {
    loaded: Promise.race([loaded, new Promise<number>((resolve) => setTimeout(resolve, PATIENCE_MS, 0))]),
    note: (unstored) => {
      if (persistence.db !== null) void persistence.set(UNSTORED, unstored);
    },
    brought: (origin) => origin === persistence,
    close: () => persistence.destroy(),
  };
}

/**
 * On signing out: removes the account's documents from this browser, except those with edits the server has not stored.
 * Returns the ids of the studies that stay.
 */
export async function forgetAccount(accountId: string): Promise<string[]> {
  const prefix = databaseOf(accountId, "");
  const stay: string[] = [];
  for (const { name } of await indexedDB.databases()) {
    if (!name?.startsWith(prefix)) continue;
    if ((await unstoredIn(name)) > 0) stay.push(name.slice(prefix.length));
    else await asked(indexedDB.deleteDatabase(name));
  }
  return stay;
}

async function unstoredIn(name: string): Promise<number> {
  const database = await asked(indexedDB.open(name));
  try {
    if (!database.objectStoreNames.contains("custom")) return 0;
    return Number((await asked(database.transaction("custom").objectStore("custom").get(UNSTORED))) ?? 0);
  } finally {
    database.close();
  }
}

export function asked<T>(request: IDBRequest<T>): Promise<T> {
  return new Promise((resolve, reject) => {
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error);
  });
}
