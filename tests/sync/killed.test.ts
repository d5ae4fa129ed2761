import { type ChildProcess, spawn } from "node:child_process";
import type { AddressInfo } from "node:net";
import { createServer } from "node:net";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, expect, it } from "vitest";
import * as Y from "yjs";
import { openDatabase } from "../../server/db/client.ts";
import { loadUpdates } from "../../server/db/queries/documents.ts";
import { addCell, readCells, storedUpdates } from "../../server/sync/index.ts";
import { type Random, seededRandom } from "../../shared/numerics/random.ts";
import { openAs, until } from "../support/sync-clients.ts";
import { fillDatabase, type PersonId, STUDY } from "../support/sync-server.ts";
import { temporaryFolder } from "../support/temporary.ts";

const KILLS = Number(process.env.SYNC_KILLS ?? 10);
const PROCESS = fileURLToPath(new URL("../support/sync-process.ts", import.meta.url));

const folder = temporaryFolder();
const path = `${folder.path}/sync.sqlite`;
let port = 0;
let child: ChildProcess | undefined;

beforeAll(async () => {
  const open = openDatabase(path);
  fillDatabase(open);
  const doc = new Y.Doc();
  addCell(doc, { id: "cell", name: "cell", kind: "text", source: "" });
  storedUpdates(open.db).append(STUDY, Y.encodeStateAsUpdate(doc), null);
  open.close();
  port = await freePort();
});

afterAll(async () => {
  await kill();
  folder.remove();
});

/** Someone who types characters of their own and deletes some again, and what the page has called stored of it. */
class Typist {
  readonly page: ReturnType<typeof openAs>;
  readonly #made: { token: string; kind: "insert" | "delete" }[] = [];
  readonly #chance: Random;
  readonly #first: number;

  constructor(person: PersonId, first: number, chance: Random) {
    const place = { address: `ws://127.0.0.1:${port}/sync`, origin: `http://127.0.0.1:${port}` };
    this.page = openAs(person, place);
    this.#first = first;
    this.#chance = chance;
  }

  get edits(): number {
    return this.#made.length;
  }

  type(): void {
    const text = this.page.sourceOf("cell");
    if (text === undefined) return;
    const words = text.toString();
    const own = [...words].filter((token) => this.#isOwn(token));
    if (own.length > 0 && this.#chance.uniform() < 0.3) {
      const token = own[this.#chance.integer(own.length)];
      this.#made.push({ token, kind: "delete" });
      text.delete(words.indexOf(token), 1);
    } else {
      const token = String.fromCodePoint(this.#first + this.#made.length);
      this.#made.push({ token, kind: "insert" });
      text.insert(this.#chance.integer(text.length + 1), token);
    }
  }

  /** What the page calls stored and the file does not have. */
  untrue(file: string): string[] {
    const known = this.#made.slice(0, this.#made.length - this.page.snapshot().stored.unstored);
    const gone = new Set(this.#made.filter(({ kind }) => kind === "delete").map(({ token }) => token));
    return known
      .filter(({ token, kind }) =>
        kind === "insert" ? !file.includes(token) && !gone.has(token) : file.includes(token),
      )
      .map(({ token, kind }) => `${kind} of ${token} was lost`);
  }

  #isOwn(token: string): boolean {
    const code = token.codePointAt(0) ?? 0;
    return code >= this.#first && code < this.#first + 10_000;
  }
}

it(
  `no edit called stored is lost by ${KILLS} SIGKILLs of the server while two people type`,
  async () => {
    const chance = seededRandom(20_250_407);
    // From two planes of Unicode without surrogate halves to split: Han and Hangul.
    const [ilse, tomas] = [new Typist("ilse", 0x4e00, chance), new Typist("tomas", 0xac00, chance)];
    let stored = 0;
    let underway = 0;
    for (let round = 0; round < KILLS; round++) {
      await start();
      await until(() => [ilse, tomas].every(({ page }) => page.snapshot().connection.state === "connected"), "alone");
      const end = Date.now() + 20 + chance.integer(280);
      while (Date.now() < end) {
        (chance.uniform() < 0.5 ? ilse : tomas).type();
        await new Promise((later) => setTimeout(later, chance.integer(6)));
      }
      // A burst, so that the end finds edits at every stage of their way.
      for (let edit = 0; edit < 40; edit++) (edit % 2 === 0 ? ilse : tomas).type();
      await new Promise((later) => setTimeout(later, chance.integer(12)));
      const killed = kill();
      ilse.type();
      await killed;
      const file = sourceInFile();
      for (const typist of [ilse, tomas]) expect(typist.untrue(file), `kill ${round + 1}`).toEqual([]);
      stored = ilse.edits + tomas.edits - unstored(ilse, tomas);
      underway += unstored(ilse, tomas);
    }
    await start();
    await until(
      () => [ilse, tomas].every(({ page }) => page.snapshot().stored.everything),
      "not all stored in the end",
    );
    const texts = () => [ilse, tomas].map(({ page }) => page.snapshot().cells[0].source);
    await until(() => texts()[0] === texts()[1], "the pages differ");
    await kill();
    expect(sourceInFile()).toBe(texts()[0]);
    console.info(`${KILLS} kills, ${ilse.edits + tomas.edits} edits, ${underway} under way when the server was killed`);
    expect(underway).toBeGreaterThan(KILLS);
    expect(stored).toBeGreaterThan(KILLS);
    await Promise.all([ilse.page.close(), tomas.page.close()]);
  },
  60_000 + KILLS * 8_000,
);

const unstored = (...typists: Typist[]) => typists.reduce((sum, { page }) => sum + page.snapshot().stored.unstored, 0);

/** What a fresh program finds in the file. */
function sourceInFile(): string {
  const open = openDatabase(path);
  const doc = new Y.Doc();
  for (const row of loadUpdates(open.db, STUDY)) Y.applyUpdate(doc, row);
  open.close();
  return readCells(doc)[0].source;
}

async function start(): Promise<void> {
  const started = spawn(process.execPath, ["--import", "tsx", PROCESS, path, String(port)], {
    stdio: ["ignore", "pipe", "inherit"],
    env: { ...process.env, VITEST: "", TEST: "", NODE_ENV: "production" },
  });
  child = started;
  await new Promise<void>((ready, failed) => {
    started.stdout?.once("data", () => ready());
    started.once("exit", (code) => failed(new Error(`the server ended with ${code} before it was ready`)));
  });
}

async function kill(): Promise<void> {
  const killed = child;
  child = undefined;
  if (killed === undefined || killed.exitCode !== null || killed.signalCode !== null) return;
  const ended = new Promise((resolve) => killed.once("exit", resolve));
  killed.kill("SIGKILL");
  await ended;
}

async function freePort(): Promise<number> {
  const server = createServer();
  await new Promise<void>((ready) => server.listen(0, "127.0.0.1", ready));
  const { port: free } = server.address() as AddressInfo;
  await new Promise((closed) => server.close(closed));
  return free;
}
