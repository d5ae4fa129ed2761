import { afterEach, beforeEach, describe, expect, it } from "vitest";
import * as Y from "yjs";
import { type OpenDatabase, openDatabase } from "../../server/db/client.ts";
import { loadUpdates } from "../../server/db/queries/documents.ts";
import { addCell } from "../../server/sync/index.ts";
import { CLOSE, MESSAGE, SYNC } from "../../shared/schemas/sync.ts";
import { openAs, RawClient, until } from "../support/sync-clients.ts";
import { fillDatabase, type PersonId, type RunningSync, STUDY, startSyncServer } from "../support/sync-server.ts";
import { temporaryFolder } from "../support/temporary.ts";

let folder: ReturnType<typeof temporaryFolder>;
let open: OpenDatabase;
let server: RunningSync;
const clients: RawClient[] = [];

const join = async (person: PersonId) => {
  const client = await RawClient.as(person, server);
  clients.push(client);
  client.ask();
  await until(() => client.received.includes("answer"), "no answer");
  return client;
};

const rows = () => loadUpdates(open.db, STUDY).length;
const source = () => server.sync.sourcesOf(STUDY)[0].source;
/** A round trip: whatever the client sent before has been taken. */
const settled = async (client: RawClient) => {
  const before = client.received.length;
  client.ask();
  await until(() => client.received.slice(before).includes("answer") || client.closed !== undefined, "no answer");
};
const typeAtStart = (words: string) => (doc: Y.Doc) =>
  ((doc.getMap("cells").get("survey") as Y.Map<unknown>).get("source") as Y.Text).insert(0, words);

beforeEach(async () => {
  folder = temporaryFolder();
  open = openDatabase(`${folder.path}/sync.sqlite`);
  fillDatabase(open);
  server = await startSyncServer(open);
  await server.sync.edit(STUDY, (doc) => {
    addCell(doc, { id: "survey", name: "survey", kind: "data", source: "upload: drinks.csv\n" });
  });
});

afterEach(async () => {
  for (const client of clients.splice(0)) client.socket.terminate();
  await server.close();
  open.close();
  folder.remove();
});

describe("at the door", () => {
  const knock = async (path: string, headers: Record<string, string>) =>
    (await new RawClient(`${server.address}${path}`, headers).closing()).code;

  it("nobody without a session comes in", async () => {
    expect(await knock(`/${STUDY}`, { origin: server.origin })).toBe(CLOSE.notSignedIn);
    expect(await knock(`/${STUDY}`, { origin: server.origin, cookie: "person=nobody" })).toBe(CLOSE.notSignedIn);
  });

  it("no page of another origin comes in, whatever its cookie", async () => {
    const cookie = "person=ilse";
    expect(await knock(`/${STUDY}`, { origin: "https://elsewhere.example", cookie })).toBe(CLOSE.noRight);
    expect(await knock(`/${STUDY}`, { origin: "null", cookie })).toBe(CLOSE.noRight);
    expect(await knock(`/${STUDY}`, { cookie })).toBe(CLOSE.noRight);
  });

  it("a study that is not, and one that is not theirs, are told alike", async () => {
    const headers = { origin: server.origin, cookie: "person=tomas" };
    expect(await knock("/another", headers)).toBe(CLOSE.noStudy);
    expect(await knock("/..%2f", headers)).toBe(CLOSE.noStudy);
    server.roles.delete("tomas");
    expect(await knock(`/${STUDY}`, headers)).toBe(CLOSE.noStudy);
  });

  it("a foreign path is left to others, its socket untouched", () => {
    const request = { url: "/vite-hmr", headers: {} } as Parameters<RunningSync["sync"]["handleUpgrade"]>[0];
    const untouched = new Proxy({}, { get: () => expect.unreachable("the socket was touched") });
    expect(server.sync.handleUpgrade(request, untouched as never, Buffer.alloc(0))).toBe(false);
  });

  it("the thirteenth window of one person stays out", async () => {
    for (let window = 0; window < 12; window++) await join("tomas");
    const last = await RawClient.as("tomas", server);
    clients.push(last);
    expect((await last.closing()).code).toBe(CLOSE.tooMany);
    await join("ilse");
  });
});

describe("a reader who sends what no page would", () => {
  it("changes nothing, and nobody hears of it", async () => {
    const [ilse, vera] = [await join("ilse"), await join("vera")];
    const [before, heard] = [rows(), ilse.received.length];
    const forged = vera.edit(typeAtStart("forged "));
    vera.update(forged);
    vera.answer(forged);
    vera.answer(Y.encodeStateAsUpdate(vera.doc));
    vera.present(vera.doc.clientID, 1, { cell: "survey" });
    vera.present(ilse.doc.clientID, 99, null);
    vera.send(MESSAGE.sync, SYNC.update, new Uint8Array([255, 255, 255]));
    vera.send(MESSAGE.presence, new Uint8Array([255]));
    await settled(vera);
    await settled(ilse);
    expect(rows()).toBe(before);
    expect(source()).toBe("upload: drinks.csv\n");
    expect(ilse.received.slice(heard)).toEqual(["answer"]);
    expect(vera.closed).toBeUndefined();
    expect(vera.stored).toBe(0);
  });

  it("is never asked for what it has, and still receives", async () => {
    const [ilse, vera] = [await join("ilse"), await join("vera")];
    expect(ilse.received).toContain("ask");
    ilse.answer(ilse.edit(typeAtStart("# live\n")));
    ilse.present(ilse.doc.clientID, 1, { cell: "survey" });
    await until(() => vera.received.includes("update") && vera.received.includes("presence"), "nothing came");
    expect(vera.received).not.toContain("ask");
    expect(source()).toBe("# live\nupload: drinks.csv\n");
  });
});

describe("presence", () => {
  it("says who someone is by the session, whatever the state says", async () => {
    const [ilse, tomas] = [await join("ilse"), await join("tomas")];
    const user = { id: "ilse", name: "Ilse Marchetti", role: "owner", colour: 0, color: "red;position:fixed" };
    tomas.present(tomas.doc.clientID, 1, { cell: "survey", typing: true, user, anything: "else" });
    await until(() => ilse.awareness.getStates().has(tomas.doc.clientID), "no presence");
    expect(ilse.awareness.getStates().get(tomas.doc.clientID)).toEqual({
      cell: "survey",
      typing: true,
      user: { id: "tomas", name: "Tomás Adeyemi", role: "coauthor", colour: 1 },
    });
  });

  it("of another is not taken, neither to move nor to remove it", async () => {
    const [ilse, tomas] = [await join("ilse"), await join("tomas")];
    ilse.present(ilse.doc.clientID, 1, { cell: "survey" });
    tomas.present(tomas.doc.clientID, 1, {});
    await until(() => tomas.received.includes("presence"), "no presence");
    tomas.present(ilse.doc.clientID, 1e6, { cell: "elsewhere" });
    tomas.present(ilse.doc.clientID, 1e6, null);
    await settled(tomas);
    const late = await join("vera");
    await until(() => late.received.includes("presence"), "no presence on joining");
    expect(late.awareness.getStates().get(ilse.doc.clientID)).toMatchObject({ cell: "survey", user: { id: "ilse" } });
  });

  it("has one client id for a connection: a second is not taken", async () => {
    const [ilse, tomas] = [await join("ilse"), await join("tomas")];
    tomas.present(tomas.doc.clientID, 1, {});
    tomas.present(tomas.doc.clientID + 1, 1, { cell: "survey" });
    await settled(tomas);
    await settled(ilse);
    expect(ilse.awareness.getStates().has(tomas.doc.clientID)).toBe(true);
    expect(ilse.awareness.getStates().has(tomas.doc.clientID + 1)).toBe(false);
  });

  it("passes to the same person's newer connection, and the older one's end does not remove it", async () => {
    const [ilse, old, young] = [await join("ilse"), await join("tomas"), await join("tomas")];
    old.present(4, 1, { cell: "survey" });
    await settled(old);
    young.present(4, 1, { cell: "base" });
    await settled(young);
    await old.leave();
    await until(() => ilse.awareness.getStates().get(4)?.cell === "base", "not the newer one's");
    await settled(ilse);
    expect(ilse.awareness.getStates().has(4)).toBe(true);
  });

  it("goes with the socket", async () => {
    const [ilse, tomas] = [await join("ilse"), await join("tomas")];
    tomas.present(tomas.doc.clientID, 1, {});
    await until(() => ilse.awareness.getStates().has(tomas.doc.clientID), "no presence");
    tomas.socket.terminate();
    await until(() => !ilse.awareness.getStates().has(tomas.doc.clientID), "still there");
    expect(ilse.people?.people.map(({ id }) => id)).toEqual(["ilse"]);
  });

  it.each([
    ["too large", CLOSE.tooLarge, { cell: "c", cursor: { anchor: { tname: "x".repeat(5_000) } } }],
    ["no JSON", CLOSE.malformed, "{"],
    ["a cell that is no word", CLOSE.malformed, { cell: 4 }],
    ["a place that is none", CLOSE.malformed, { cursor: { anchor: { item: "here" }, head: {} } }],
  ])("is refused when it is %s", async (_words, code, state) => {
    const tomas = await join("tomas");
    tomas.present(tomas.doc.clientID, 1, state);
    expect((await tomas.closing()).code).toBe(code);
  });
});

describe("someone who is removed", () => {
  it("is out at once, and nothing already sent is taken any more", async () => {
    const [ilse, tomas] = [await join("ilse"), await join("tomas")];
    tomas.answer(tomas.edit(typeAtStart("one last word ")));
    server.roles.delete("tomas");
    server.sync.closePerson("tomas", STUDY);
    tomas.update(tomas.edit(typeAtStart("and another ")));
    expect(await tomas.closing()).toEqual({ code: CLOSE.noRight, reason: "You are no longer in this study." });
    await settled(ilse);
    expect(source()).toBe("upload: drinks.csv\n");
    expect(ilse.people?.people.map(({ id }) => id)).toEqual(["ilse"]);
  });

  it("sees it on the page, which stops asking and keeps what was not stored", async () => {
    const tomas = openAs("tomas", server);
    await until(() => tomas.snapshot().connection.state === "connected", "not connected");
    server.roles.delete("tomas");
    server.sync.closePerson("tomas", STUDY);
    tomas.sourceOf("survey")?.insert(0, "kept ");
    await until(() => tomas.snapshot().connection.state === "refused", "not refused");
    expect(tomas.snapshot().connection).toMatchObject({ code: 4403, sentence: "You are no longer in this study." });
    expect(tomas.snapshot().stored.unstored).toBe(1);
    expect(tomas.snapshot().cells[0].source).toBe("kept upload: drinks.csv\n");
    await tomas.close();
  });

  it("in another role comes back by itself in that role", async () => {
    const tomas = openAs("tomas", server);
    await until(() => tomas.snapshot().connection.state === "connected", "not connected");
    server.roles.set("tomas", "reader");
    server.sync.closePerson("tomas", STUDY);
    await until(() => tomas.snapshot().you?.role === "reader", "the new role was not told");
    expect(tomas.snapshot().readOnly).toBe(true);
    await until(() => tomas.snapshot().connection.state === "connected", "not connected again");
    await tomas.close();
  });

  it("by signing out leaves every study", async () => {
    const [first, second, ilse] = [await join("tomas"), await join("tomas"), await join("ilse")];
    server.sync.closePerson("tomas");
    expect((await first.closing()).code).toBe(CLOSE.notSignedIn);
    expect((await second.closing()).code).toBe(CLOSE.notSignedIn);
    await settled(ilse);
    expect(ilse.closed).toBeUndefined();
  });

  it("whose one session is ended leaves with its sockets, and stays with those of another", async () => {
    const [first, second, ilse] = [await join("tomas"), await join("tomas"), await join("ilse")];
    server.sync.closeSession("tomas 1");
    expect(await first.closing()).toEqual({ code: CLOSE.notSignedIn, reason: "Your session has ended." });
    await settled(second);
    await settled(ilse);
    expect([second.closed, ilse.closed]).toEqual([undefined, undefined]);
  });

  it("by the end of the session is out at that moment", async () => {
    await server.close();
    server = await startSyncServer(open, { expiresAt: new Date(Date.now() + 400) });
    const tomas = await join("tomas");
    expect(await tomas.closing()).toEqual({ code: CLOSE.notSignedIn, reason: "Your session has ended." });
    const late = await RawClient.as("tomas", server);
    expect((await late.closing()).code).toBe(CLOSE.notSignedIn);
  });
});
