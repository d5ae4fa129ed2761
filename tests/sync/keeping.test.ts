import "fake-indexeddb/auto";
import { afterEach, beforeEach, expect, it } from "vitest";
import { type OpenDatabase, openDatabase } from "../../server/db/client.ts";
import { addCell } from "../../server/sync/index.ts";
import { forgetAccount, keepInBrowser } from "../../src/sync/keeping.ts";
import { keptWords, letGo } from "../../src/sync/kept-words.ts";
import { openAs, until } from "../support/sync-clients.ts";
import { fillDatabase, type RunningSync, STUDY, startSyncServer } from "../support/sync-server.ts";
import { temporaryFolder } from "../support/temporary.ts";

let folder: ReturnType<typeof temporaryFolder>;
let open: OpenDatabase;
let server: RunningSync;

const page = () => openAs("tomas", server, { keeping: (doc) => keepInBrowser("tomas", STUDY, doc) });
const source = (study: ReturnType<typeof page>) => study.snapshot().cells[0]?.source;

beforeEach(async () => {
  folder = temporaryFolder();
  open = openDatabase(`${folder.path}/sync.sqlite`);
  fillDatabase(open);
  server = await startSyncServer(open);
  await server.sync.edit(STUDY, (doc) => addCell(doc, { id: "survey", name: "survey", kind: "data", source: "s" }));
});

afterEach(async () => {
  await server.close();
  open.close();
  folder.remove();
  for (const { name } of await indexedDB.databases()) if (name) indexedDB.deleteDatabase(name);
});

it("a reload with unsynced edits loses nothing, and calls nothing stored too early", async () => {
  const port = Number(new URL(server.origin).port);
  const first = page();
  await until(() => first.snapshot().stored.everything, "not connected");
  await server.close();
  await until(() => first.snapshot().connection.state === "working alone", "still connected");
  first.sourceOf("survey")?.insert(1, " typed alone");
  first.sourceOf("survey")?.delete(0, 1);
  await first.close();

  const second = page();
  await until(() => second.snapshot().connection.state === "working alone", "not alone");
  expect(source(second)).toBe(" typed alone");
  expect(second.snapshot()).toMatchObject({ loaded: true, stored: { everything: false, unstored: 2 } });
  expect(second.snapshot().connection).toMatchObject({ editsKept: 2 });

  server = await startSyncServer(open, { port });
  await until(() => second.snapshot().stored.everything, "not stored");
  expect(server.sync.sourcesOf(STUDY)[0].source).toBe(" typed alone");
  await second.close();
});

it("edits whose count was lost still reach the server before anything is called stored", async () => {
  const port = Number(new URL(server.origin).port);
  const first = page();
  await until(() => first.snapshot().stored.everything, "not connected");
  await server.close();
  await until(() => first.snapshot().connection.state === "working alone", "still connected");
  first.sourceOf("survey")?.insert(0, "uncounted ");
  await first.close();
  const database = await new Promise<IDBDatabase>((resolve) => {
    const request = indexedDB.open(`tangency/tomas/${STUDY}`);
    request.onsuccess = () => resolve(request.result);
  });
  await new Promise((done) => {
    database.transaction("custom", "readwrite").objectStore("custom").clear().onsuccess = done;
  });
  database.close();

  server = await startSyncServer(open, { port });
  const second = page();
  expect(second.snapshot().stored.everything).toBe(false);
  await until(() => second.snapshot().stored.everything, "not stored");
  expect(server.sync.sourcesOf(STUDY)[0].source).toBe("uncounted s");
  await second.close();
});

it("signing out clears what is stored and leaves what is not", async () => {
  const stored = page();
  await until(() => stored.snapshot().stored.everything, "not connected");
  stored.sourceOf("survey")?.insert(0, "x");
  await until(() => stored.snapshot().stored.everything, "not stored");
  await stored.close();
  expect(await forgetAccount("ilse")).toEqual([]);
  expect((await indexedDB.databases()).map(({ name }) => name)).toContain(`tangency/tomas/${STUDY}`);
  expect(await forgetAccount("tomas")).toEqual([]);
  expect((await indexedDB.databases()).map(({ name }) => name)).not.toContain(`tangency/tomas/${STUDY}`);

  const port = Number(new URL(server.origin).port);
  const alone = page();
  await until(() => alone.snapshot().stored.everything, "not connected");
  await server.close();
  await until(() => alone.snapshot().connection.state === "working alone", "still connected");
  alone.sourceOf("survey")?.insert(0, "kept ");
  await alone.close();
  expect(await forgetAccount("tomas")).toEqual([STUDY]);
  expect((await indexedDB.databases()).map(({ name }) => name)).toContain(`tangency/tomas/${STUDY}`);
  server = await startSyncServer(open, { port });
});

it("what someone wrote before they became a reader is kept to be read, until they let it go", async () => {
  const first = page();
  await until(() => first.snapshot().stored.everything, "not connected");
  await first.close();
  expect(await keptWords("tomas", STUDY)).toBeUndefined();
  await server.close();
  server.roles.set("tomas", "reader");
  const alone = page();
  await until(() => alone.snapshot().loaded, "not kept");
  alone.replaceSource("survey", "s, and what was written alone");
  await alone.close();
  const kept = await keptWords("tomas", STUDY);
  expect(kept).toMatchObject({ edits: 1, cells: [{ id: "survey", source: "s, and what was written alone" }] });
  expect(await forgetAccount("tomas")).toEqual([STUDY]);
  await letGo("tomas", STUDY);
  expect(await keptWords("tomas", STUDY)).toBeUndefined();
  server = await startSyncServer(open);
});
