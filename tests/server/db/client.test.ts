import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { afterEach, expect, test } from "vitest";
import { connectDatabase, openDatabase } from "../../../server/db/client.ts";
import { appendUpdate, loadUpdates } from "../../../server/db/queries/documents.ts";
import { deleteStudy, insertStudy } from "../../../server/db/queries/studies.ts";
import { temporaryFolder } from "../../support/temporary.ts";

const folder = temporaryFolder();
afterEach(() => folder.remove());
const path = () => join(folder.path, "deeper", "tangency.sqlite");

test("a new file gets its folder, its tables, and write-ahead logging with foreign keys", () => {
  const open = openDatabase(path());
  expect(open.sqlite.pragma("journal_mode", { simple: true })).toBe("wal");
  expect(open.sqlite.pragma("foreign_keys", { simple: true })).toBe(1);
  expect(Number(open.sqlite.pragma("user_version", { simple: true }))).toBeGreaterThan(0);
  open.close();
});

test("what is written is there for the next to open it, and goes with its study", () => {
  const first = openDatabase(path());
  insertStudy(first.db, { id: "s", title: "Levy", lede: "", createdAt: new Date(), changedAt: new Date() });
  appendUpdate(first.db, "s", Uint8Array.of(1, 2, 3), null);
  appendUpdate(first.db, "s", Uint8Array.of(4), "someone");
  first.close();
  const second = openDatabase(path());
  expect(loadUpdates(second.db, "s").map((update) => [...update])).toEqual([[1, 2, 3], [4]]);
  deleteStudy(second.db, "s");
  expect(loadUpdates(second.db, "s")).toEqual([]);
  second.close();
});

test("what is deleted leaves the file, not only its index", () => {
  const open = openDatabase(path());
  insertStudy(open.db, { id: "s", title: "Levy", lede: "", createdAt: new Date(), changedAt: new Date() });
  appendUpdate(open.db, "s", new TextEncoder().encode("household 4711 bought nothing"), null);
  open.sqlite.pragma("wal_checkpoint(TRUNCATE)");
  expect(readFileSync(path()).includes("household 4711")).toBe(true);
  deleteStudy(open.db, "s");
  open.sqlite.pragma("wal_checkpoint(TRUNCATE)");
  expect(readFileSync(path()).includes("household 4711")).toBe(false);
  open.close();
});

test("a database of a newer program is refused with both versions, and not touched", () => {
  const open = openDatabase(path());
  const known = Number(open.sqlite.pragma("user_version", { simple: true }));
  open.sqlite.pragma(`user_version = ${known + 7}`);
  open.close();
  expect(() => openDatabase(path())).toThrow(
    `is at version ${known + 7}, and this program knows versions up to ${known}`,
  );
  const again = connectDatabase(path());
  expect(again.sqlite.pragma("user_version", { simple: true })).toBe(known + 7);
  again.close();
});

test("a file that is no database is refused by name", () => {
  openDatabase(path()).close();
  writeFileSync(path(), "this is a text file and not a database at all".repeat(100));
  expect(() => openDatabase(path())).toThrow(/tangency\.sqlite is not a database/);
});

test("rows without what they refer to are found at opening", () => {
  const open = openDatabase(path());
  open.sqlite.pragma("foreign_keys = OFF");
  appendUpdate(open.db, "no such study", Uint8Array.of(1), null);
  open.close();
  expect(() => openDatabase(path())).toThrow("the first is in document_updates, which refers to studies");
});
