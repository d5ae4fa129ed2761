import fc from "fast-check";
import { afterAll, afterEach, beforeAll, describe, expect, it } from "vitest";
import * as Y from "yjs";
import { type OpenDatabase, openDatabase } from "../../server/db/client.ts";
import { addCell } from "../../server/sync/index.ts";
import { CLOSE, MESSAGE } from "../../shared/schemas/sync.ts";
import { RawClient, until } from "../support/sync-clients.ts";
import { fillDatabase, type PersonId, type RunningSync, STUDY, startSyncServer } from "../support/sync-server.ts";
import { temporaryFolder } from "../support/temporary.ts";

let folder: ReturnType<typeof temporaryFolder>;
let open: OpenDatabase;
let server: RunningSync;
const clients: RawClient[] = [];

const join = async (person: PersonId = "tomas") => {
  const client = await RawClient.as(person, server);
  clients.push(client);
  client.ask();
  await until(() => client.received.includes("answer"), "no answer");
  return client;
};

const cellsOf = (doc: Y.Doc) => doc.getMap<Y.Map<unknown>>("cells");
const textOf = (doc: Y.Doc) => cellsOf(doc).get("survey")?.get("source") as Y.Text;

beforeAll(async () => {
  folder = temporaryFolder();
  open = openDatabase(`${folder.path}/sync.sqlite`);
  fillDatabase(open);
  server = await startSyncServer(open, { limits: { document: 2_000_000, messageBurst: 500 } });
  await server.sync.edit(STUDY, (doc) => {
    addCell(doc, { id: "survey", name: "survey", kind: "data", source: "upload: drinks.csv\n" });
  });
});

afterEach(() => {
  for (const client of clients.splice(0)) client.socket.terminate();
});

afterAll(async () => {
  await server.close();
  open.close();
  folder.remove();
});

describe("a message that is none of the protocol's closes the socket", () => {
  it.each([
    ["of an unknown type", [7]],
    ["asking for presence, which is not asked", [3]],
    ["that only the server sends", [MESSAGE.stored, 4]],
    ["of an unknown kind of sync", [MESSAGE.sync, 3]],
    ["without its content", [MESSAGE.sync, 2]],
    ["that goes on after its end", [MESSAGE.sync, 2, new Uint8Array([0, 0]), 1]],
    ["with an update that is none", [MESSAGE.sync, 2, new Uint8Array([9, 9, 9, 9])]],
    ["with a state vector that is none", [MESSAGE.sync, 0, new Uint8Array([200, 200])]],
  ])("%s", async (_words, fields) => {
    const client = await join();
    client.send(...fields);
    expect((await client.closing()).code).toBe(CLOSE.malformed);
  });

  it("as text", async () => {
    const client = await join();
    client.socket.send("hello");
    expect((await client.closing()).code).toBe(CLOSE.malformed);
  });

  it("from a reader as well", async () => {
    const client = await join("vera");
    client.send(7);
    expect((await client.closing()).code).toBe(CLOSE.malformed);
  });
});

describe("an update that would break the document's shape is refused", () => {
  const changes: [string, (doc: Y.Doc) => void, number?][] = [
    ["another root", (doc) => doc.getMap("secrets").set("a", 1)],
    ["another root of text", (doc) => doc.getText("notes").insert(0, "a")],
    ["a word among the cells", (doc) => doc.getMap("cells").set("survey", "gone")],
    ["a list among the cells", (doc) => doc.getMap("cells").set("list", new Y.Array())],
    ["a cell with a long id", (doc) => cellsOf(doc).set("x".repeat(65), new Y.Map())],
    ["another key in a cell", (doc) => cellsOf(doc).get("survey")?.set("owner", "me")],
    ["a name that is a number", (doc) => cellsOf(doc).get("survey")?.set("name", 4)],
    ["a name that is a map", (doc) => cellsOf(doc).get("survey")?.set("name", new Y.Map())],
    ["a long name", (doc) => cellsOf(doc).get("survey")?.set("name", "n".repeat(201)), CLOSE.tooLarge],
    ["an order that is no key", (doc) => cellsOf(doc).get("survey")?.set("order", "zzz")],
    ["a source that is a word", (doc) => cellsOf(doc).get("survey")?.set("source", "upload: x")],
    ["a formatted source", (doc) => textOf(doc).insert(0, "bold", { bold: true })],
    ["a thing embedded in a source", (doc) => textOf(doc).insertEmbed(0, { picture: "x" })],
    ["a long source", (doc) => textOf(doc).insert(0, "x".repeat(262_144)), CLOSE.tooLarge],
    [
      "a cell whose source is long from the start",
      (doc) => addCell(doc, { id: "long", name: "long", kind: "data", source: "x".repeat(262_145) }),
      CLOSE.tooLarge,
    ],
    [
      "more cells than a study has",
      (doc) => {
        for (let i = 0; i < 400; i++) addCell(doc, { id: `c${i}`, name: `c${i}`, kind: "data", source: "" });
      },
      CLOSE.tooLarge,
    ],
  ];

  it.each(changes)("%s", async (_words, change, code = CLOSE.malformed) => {
    const [watcher, client] = [await join("ilse"), await join()];
    const before = server.sync.sourcesOf(STUDY);
    const heard = watcher.received.filter((message) => message === "update").length;
    client.answer(client.edit(change));
    expect((await client.closing()).code).toBe(code);
    expect(server.sync.sourcesOf(STUDY)).toEqual(before);
    // The study goes on for the others.
    watcher.answer(watcher.edit((doc) => textOf(doc).insert(0, ".")));
    await until(() => watcher.stored === 1, "nothing is stored any more");
    expect(server.sync.sourcesOf(STUDY)[0].source).toBe(`.${before[0].source}`);
    expect(watcher.received.filter((message) => message === "update")).toHaveLength(heard);
  });

  it("an edit without those it builds on is not stored, and the exchange begins anew", async () => {
    const client = await join();
    client.edit((doc) => textOf(doc).insert(0, "a"));
    client.update(client.edit((doc) => textOf(doc).insert(1, "b")));
    expect((await client.closing()).code).toBe(CLOSE.missingEarlier);
  });
});

describe("size and rate", () => {
  it("a message over the limit, and one over the hard cap", async () => {
    const client = await join();
    client.update(new Uint8Array(1_048_577));
    expect((await client.closing()).code).toBe(CLOSE.tooLarge);
    const heavy = await join();
    heavy.update(new Uint8Array(2_200_000));
    expect((await heavy.closing()).code).toBe(CLOSE.overHardCap);
  });

  it("a flood of messages", async () => {
    const client = await join();
    for (let i = 0; i < 3_000; i++) client.present(client.doc.clientID, i, {});
    expect((await client.closing()).code).toBe(CLOSE.tooMany);
  });

  it("a document that grows without end", async () => {
    const client = await join();
    for (let i = 0; i < 10 && client.closed === undefined; i++) {
      const before = client.stored;
      client.update(
        client.edit((doc) =>
          addCell(doc, { id: `big${i}`, name: "big", kind: "text", source: `${i}`.repeat(250_000) }),
        ),
      );
      await until(() => client.stored > before || client.closed !== undefined, "neither stored nor closed");
    }
    expect((await client.closing()).code).toBe(CLOSE.tooLarge);
    expect(server.sync.sourcesOf(STUDY).filter(({ name }) => name === "big")).toHaveLength(7);
  });
});

it("no bytes whatever bring the server down or change the study", async () => {
  const before = server.sync.sourcesOf(STUDY);
  await fc.assert(
    fc.asyncProperty(fc.uint8Array({ maxLength: 200 }), fc.constantFrom(0, 1, 4, 5), async (bytes, type) => {
      const client = await join();
      client.socket.send(bytes);
      client.send(type, bytes);
      client.send(MESSAGE.sync, 1, bytes);
      client.send(MESSAGE.sync, 2, bytes);
      await client.closing();
    }),
    { numRuns: 100, seed: 20_250_301 },
  );
  expect(server.sync.sourcesOf(STUDY)).toEqual(before);
  expect(server.reports).toEqual([]);
});
