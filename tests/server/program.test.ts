import { readFileSync } from "node:fs";
import { join } from "node:path";
import * as decoding from "lib0/decoding";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import WebSocket from "ws";
import { finding as findingSchema } from "../../shared/schemas/cell.ts";
import { refereeCopy } from "../../shared/schemas/referee-copy.ts";
import { studySummary, upload as uploadSchema } from "../../shared/schemas/resources.ts";
import { type StudyStatus, studyStatus } from "../../shared/schemas/status.ts";
import { MESSAGE } from "../../shared/schemas/sync.ts";
import { startProgram } from "../support/program.ts";
import { temporaryFolder } from "../support/temporary.ts";

/** The program as it is started by hand: a new folder of data, then a second start over it. */
const folder = temporaryFolder();
let program: Awaited<ReturnType<typeof startProgram>>;
let cookie = "";

beforeAll(async () => {
  program = await startProgram({ dataFolder: folder.path });
  const { demo } = await (await fetch(`${program.origin}/api/installation`)).json();
  const answer = await post("/api/auth/sign-in/email", { email: demo[0].email, password: demo[0].passphrase });
  cookie = answer.headers.getSetCookie()[0].split(";")[0];
});
afterAll(async () => {
  await program?.stop();
  folder.remove();
});

const heads = () => ({ cookie, origin: program.origin });
const get = async (path: string) => (await fetch(program.origin + path, { headers: heads() })).json();
const post = (path: string, body: unknown) =>
  fetch(program.origin + path, {
    method: "POST",
    headers: { ...heads(), "content-type": "application/json" },
    body: JSON.stringify(body),
  });

/** The first study status that the socket tells. */
function statusBySocket(studyId: string): Promise<StudyStatus> {
  const socket = new WebSocket(`${program.origin.replace("http", "ws")}/sync/${studyId}`, { headers: heads() });
  return new Promise((resolve, reject) => {
    socket.on("error", reject);
    socket.on("close", (code) => reject(new Error(`closed with ${code}`)));
    socket.on("message", (data: Buffer) => {
      const decoder = decoding.createDecoder(data);
      if (decoding.readVarUint(decoder) !== MESSAGE.status) return;
      socket.removeAllListeners("close");
      socket.close();
      resolve(studyStatus.parse(JSON.parse(decoding.readVarString(decoder))));
    });
  });
}

describe("a first start", () => {
  test("makes the demo study with every finding current, and says its address and sign-ins", async () => {
    expect(program.said()).toContain(`Tangency is open at ${program.origin}`);
    expect(program.said()).toContain("ilse.marchetti@vihe.example (owner)");
    const [study] = (await get("/api/studies")).map((one: unknown) => studySummary.parse(one));
    expect(study.cells.length).toBeGreaterThanOrEqual(3);
    expect(new Set(study.cells.map(({ state }: { state: string }) => state))).toEqual(new Set(["current"]));
  });

  test("every finding is its kind's schema, under its fingerprint", async () => {
    const { cells } = studyStatus.parse(await get("/api/studies/demo/status"));
    for (const { fingerprint, kind } of cells) {
      // Prose has no finding of its own: its numbers are those of the cells it quotes.
      if (kind === "text") continue;
      const { finding, tookMs } = await get(`/api/studies/demo/findings/${fingerprint}`);
      expect(findingSchema.parse(finding).kind).toBe(kind);
      expect(tookMs).toBeGreaterThan(0);
    }
  });

  test("a socket is told where the cells stand, though nothing has changed", async () => {
    const { cells } = await statusBySocket("demo");
    expect(cells.every(({ state }) => state === "current")).toBe(true);
  });

  test("an uploaded file is read by the worker; one that is no table is refused with its place", async () => {
    const send = (content: BlobPart, name: string) => {
      const form = new FormData();
      form.set("file", new Blob([content]), name);
      return fetch(`${program.origin}/api/studies/demo/uploads`, { method: "POST", headers: heads(), body: form });
    };
    const tuna = readFileSync(join(import.meta.dirname, "..", "reference", "fixtures", "tuna-weekly.csv"));
    const read = await send(new Uint8Array(tuna), "tuna-weekly.csv");
    expect(read.status).toBe(201);
    expect(uploadSchema.parse(await read.json())).toMatchObject({ name: "tuna-weekly.csv", rows: 338 });
    const ragged = await send("a,b\n1,2\n3,4,5\n", "ragged.csv");
    expect(ragged.status).toBe(422);
    expect((await ragged.json()).error.problems[0].row).toBe(2);
  });

  test("a sealed matrix opens by its link alone", async () => {
    const { cells } = await get("/api/studies/demo/status");
    const { cellId } = cells.find(({ kind }: { kind: string }) => kind === "slutsky");
    const sealed = await (await post("/api/studies/demo/referee-copies", { cellId, note: "for the referee" })).json();
    const copy = refereeCopy.parse(await (await fetch(`${program.origin}/api/referee/${sealed.token}`)).json());
    expect(copy.fingerprint).toBe(sealed.copy.fingerprint);
    expect(copy.content.accounting.used).toBeGreaterThan(1000);
    expect(JSON.stringify(copy.content)).not.toMatch(/"(brokenRows|strip|rows":\[)/);
  });
});

test("a stop is quiet, and a second start finds everything and makes nothing", async () => {
  expect(await program.stop("SIGTERM")).toBe(0);
  program = await startProgram({ dataFolder: folder.path, port: program.port });
  expect(program.said()).not.toContain("Making the demo study");
  const { cells } = await get("/api/studies/demo/status");
  expect(cells.every(({ state }: { state: string }) => state === "current")).toBe(true);
  expect(await get("/api/studies/demo/uploads")).toHaveLength(2);
});

test("a second program over the same data is refused, and goes away without touching them", async () => {
  const start = startProgram({ dataFolder: folder.path });
  await expect(start).rejects.toThrow(/The data in .* are in use by another Tangency/);
  expect(await get("/api/studies/demo/uploads")).toHaveLength(2);
});

test("killed outright, it starts again over the same data", async () => {
  expect(await program.stop("SIGKILL")).toBeNull();
  program = await startProgram({ dataFolder: folder.path, port: program.port });
  expect(await get("/api/studies/demo/uploads")).toHaveLength(2);
});

test("a taken port is said in a sentence", async () => {
  const other = temporaryFolder();
  const start = startProgram({ dataFolder: other.path, port: program.port, env: { TANGENCY_DEMO: "off" } });
  await expect(start).rejects.toThrow(`Port ${program.port} is taken by another program`);
  other.remove();
});
