import { request as openRequest } from "node:http";
import { PassThrough } from "node:stream";
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { uploadChunks, uploadColumns, uploads } from "../../../server/db/schema/uploads.ts";
import { upload as uploadSchema } from "../../../shared/schemas/resources.ts";
import { type Application, startApplication, type Visitor } from "../../support/application.ts";

let application: Application;
let owner: Visitor;
let studyId: string;
const log = new PassThrough();
let logged = "";
log.on("data", (part) => {
  logged += part;
});

beforeAll(async () => {
  application = await startApplication({ log });
  owner = await application.person("Ilse Marchetti");
});
afterAll(() => application.close());
beforeEach(async () => {
  application.parser.refuse = undefined;
  studyId = (await owner.ask("POST", "/api/studies", { title: "Levy" })).body.id;
});

const bring = (name: string, content: BlobPart = "p1\n1\n2\n", query = "", field = "file") => {
  const form = new FormData();
  form.set(field, new Blob([content]), name);
  return owner.ask("POST", `/api/studies/${studyId}/uploads${query}`, form);
};
const rowsOf = (table: typeof uploads | typeof uploadChunks | typeof uploadColumns) =>
  application.open.db.select().from(table).all().length;

describe("an upload", () => {
  test("is kept as it came and described", async () => {
    const answer = await bring("käufe.csv");
    expect(answer.status).toBe(201);
    expect(uploadSchema.parse(answer.body)).toMatchObject({
      name: "käufe.csv",
      bytes: 7,
      rows: 2,
      uploadedBy: "Ilse Marchetti",
    });
    const [chunk] = application.open.db.select().from(uploadChunks).all();
    expect(chunk.bytes.toString()).toBe("p1\n1\n2\n");
    expect((await owner.ask("GET", `/api/studies/${studyId}/uploads`)).body).toEqual([answer.body]);
    expect(application.cells.calls).toContain(`changed ${studyId}`);
  });

  test("of a name that is taken gets a number", async () => {
    const names = [];
    for (let i = 0; i < 3; i += 1) names.push((await bring("weeks.csv", `p1\n${i}\n`, "?beside=1")).body.name);
    expect(names).toEqual(["weeks.csv", "weeks (2).csv", "weeks (3).csv"]);
  });

  test("of a name that is taken, or said to replace another, is a new version and keeps the old", async () => {
    const first = (await bring("weeks.csv", "p1\n1\n")).body;
    const second = (await bring("weeks.csv", "p1\n2\n")).body;
    const third = (await bring("weeks of 2032.csv", "p1\n3\n", "?replaces=weeks.csv")).body;
    expect([first, second, third].map(({ name, version, fileName }) => [name, version, fileName])).toEqual([
      ["weeks.csv", 1, undefined],
      ["weeks.csv", 2, undefined],
      ["weeks.csv", 3, "weeks of 2032.csv"],
    ]);
    expect((await owner.ask("GET", `/api/studies/${studyId}/uploads`)).body).toHaveLength(3);
    const missing = await bring("a.csv", "p1\n4\n", "?replaces=months.csv");
    expect([missing.status, missing.body.error.sentence]).toEqual([
      404,
      "There is no upload called months.csv in this study to put a new version of.",
    ]);
  });

  test("that is the same as a version kept is told so, and nothing of it stays", async () => {
    await bring("weeks.csv", "p1\n1\n");
    await bring("weeks.csv", "p1\n2\n");
    const before = [uploads, uploadChunks].map(rowsOf);
    const answer = await bring("weeks.csv", "p1\n1\n");
    expect([answer.status, answer.body.error.sentence]).toEqual([
      409,
      "The file is the same as version 1 of weeks.csv, byte for byte; nothing was added.",
    ]);
    expect([uploads, uploadChunks].map(rowsOf)).toEqual(before);
  });

  test("of several sheets gives one, and another sheet as an upload of its own", async () => {
    const { id, sheet, sheets } = (await bring("book.xlsx", "PK")).body;
    expect([sheet, sheets]).toEqual(["Rows", ["Rows", "Codes"]]);
    const path = `/api/studies/${studyId}/uploads/${id}/sheets`;
    expect((await owner.ask("POST", path, {})).status).toBe(400);
    const wrong = await owner.ask("POST", path, { sheet: "Notes" });
    expect(wrong.body.error.sentence).toBe("book.xlsx has no sheet Notes: its sheets are Rows, Codes.");
  });

  test("is looked at a page at a time, by whoever may read it", async () => {
    const { id } = (await bring("weeks.csv", "p1\n9\n")).body;
    const path = `/api/studies/${studyId}/uploads/${id}/rows`;
    const outsider = await application.person("Nobody Inparticular");
    expect((await application.stranger.ask("GET", path)).status).toBe(401);
    expect((await owner.ask("GET", `${path}?count=9999`)).status).toBe(400);
    expect((await outsider.ask("GET", path)).status).toBe(404);
    expect((await owner.ask("GET", `/api/studies/${studyId}/uploads/none/rows`)).status).toBe(404);
    const page = await owner.ask("GET", `${path}?from=100&count=20`);
    expect([page.status, page.body.total]).toEqual([200, 1]);
    expect(application.parser.looked.at(-1)).toEqual({ of: "upload", uploadId: id, asked: { from: 100, count: 20 } });
  });

  test("is looked at through a data cell, under its present finding only", async () => {
    const { cellId, fingerprint } = application.cells.put(
      studyId,
      { name: "survey", kind: "data", source: "upload: weeks.csv" },
      [],
    );
    const path = `/api/studies/${studyId}/cells/${cellId}/rows`;
    const about = encodeURIComponent('["zeros","grains"]');
    expect((await application.stranger.ask("GET", path)).status).toBe(401);
    expect((await owner.ask("GET", path)).status).toBe(400);
    expect((await owner.ask("GET", `${path}?about=${about}&fingerprint=${"0".repeat(64)}`)).status).toBe(409);
    const page = await owner.ask("GET", `${path}?about=${about}&fingerprint=${fingerprint}`);
    expect(page.status).toBe(200);
    expect(application.parser.looked.at(-1)).toMatchObject({
      of: "cell",
      about: '["zeros","grains"]',
      asked: { from: 0, count: 50 },
    });
  });

  test.each([
    ["cut short", '--XX\r\nContent-Disposition: form-data; name="file"; filename="a.csv"\r\n\r\np1\n1\n'],
    ["without a part", ""],
    [
      "with a control character in the name",
      '--XX\r\nContent-Disposition: form-data; name="file"; filename="a\u0000.csv"\r\n\r\np1\n1\r\n--XX--\r\n',
    ],
  ])("in a form %s is refused as no form, and nothing of it stays", async (_how, body) => {
    const before = [uploads, uploadChunks, uploadColumns].map(rowsOf);
    const answer = await owner.ask("POST", `/api/studies/${studyId}/uploads`, new Blob([body]), {
      "content-type": "multipart/form-data; boundary=XX",
    });
    expect([answer.status, answer.body.error.code]).toEqual([400, "invalid"]);
    expect([uploads, uploadChunks, uploadColumns].map(rowsOf)).toEqual(before);
  });

  test("that will not do is told with its problems, and nothing of it stays", async () => {
    const before = [uploads, uploadChunks, uploadColumns].map(rowsOf);
    application.parser.refuse = "Row 3: p1 has the text abc.";
    const answer = await bring("bad.csv");
    expect(answer.status).toBe(422);
    expect(answer.body.error).toMatchObject({
      sentence: "Row 3: p1 has the text abc.",
      problems: [{ sentence: "Row 3: p1 has the text abc.", row: 3, column: "p1" }],
    });
    expect([uploads, uploadChunks, uploadColumns].map(rowsOf)).toEqual(before);
  });

  test("needs the field file and one file", async () => {
    expect((await bring("weeks.csv", "x", "", "data")).status).toBe(400);
    const two = new FormData();
    two.append("file", new Blob(["a"]), "a.csv");
    two.append("file", new Blob(["b"]), "b.csv");
    expect((await owner.ask("POST", `/api/studies/${studyId}/uploads`, two)).status).toBe(400);
    expect((await owner.ask("POST", `/api/studies/${studyId}/uploads`, new FormData())).status).toBe(400);
    expect((await owner.ask("GET", `/api/studies/${studyId}/uploads`)).body).toEqual([]);
  });

  test("that a cell names stays, and the refusal names the cell", async () => {
    const { id } = (await bring("weeks.csv")).body;
    application.cells.put(studyId, { name: "survey", kind: "data", source: "upload: weeks.csv\ngoods: {" }, []);
    const answer = await owner.ask("DELETE", `/api/studies/${studyId}/uploads/${id}`);
    expect([answer.status, answer.body.error.sentence]).toEqual([409, "weeks.csv stays: the cell survey reads it."]);
  });

  test("in a version that no cell reads goes, and the one that is read stays", async () => {
    const [old, now] = [(await bring("weeks.csv", "p1\n1\n")).body, (await bring("weeks.csv", "p1\n2\n")).body];
    application.cells.put(studyId, { name: "survey", kind: "data", source: "upload: weeks.csv" }, []);
    const refused = await owner.ask("DELETE", `/api/studies/${studyId}/uploads/${now.id}`);
    expect(refused.body.error.sentence).toBe("version 2 of weeks.csv stays: the cell survey reads it.");
    expect((await owner.ask("DELETE", `/api/studies/${studyId}/uploads/${old.id}`)).status).toBe(204);
    application.cells.put(studyId, { name: "pinned", kind: "data", source: "upload: weeks.csv\nversion: 2" }, []);
    const two = await owner.ask("DELETE", `/api/studies/${studyId}/uploads/${now.id}`);
    expect(two.body.error.sentence).toBe("weeks.csv stays: the cells survey and pinned read it.");
  });

  test("that no cell names is removed whole", async () => {
    const before = [uploads, uploadChunks, uploadColumns].map(rowsOf);
    const { id } = (await bring("weeks.csv")).body;
    expect((await owner.ask("DELETE", `/api/studies/${studyId}/uploads/${id}`)).status).toBe(204);
    expect([uploads, uploadChunks, uploadColumns].map(rowsOf)).toEqual(before);
    expect((await owner.ask("DELETE", `/api/studies/${studyId}/uploads/${id}`)).status).toBe(404);
  });

  test("left half-way is removed at the next start", async () => {
    const before = rowsOf(uploads);
    application.open.db
      .insert(uploads)
      .values({
        id: "half",
        studyId,
        name: "half.csv",
        bytes: 1,
        state: "receiving",
        uploadedBy: owner.id,
        uploadedAt: new Date(),
      })
      .run();
    expect((await owner.ask("GET", `/api/studies/${studyId}/uploads`)).body).toEqual([]);
    expect(application.services.uploads.removeUnfinished()).toBe(1);
    expect(rowsOf(uploads)).toBe(before);
  });
});

const MIB = 1024 * 1024;

/** Sends a form piece by piece over a plain socket; `pieces` of 1 MiB, or hangs up after them. */
function send(
  pieces: number,
  { hangUp = false, announce = false } = {},
): Promise<{ status: number; sentence: string }> {
  const boundary = "----tangency";
  const head = `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="large.csv"\r\n\r\n`;
  const foot = `\r\n--${boundary}--\r\n`;
  const cookie = cookieOfOwner;
  return new Promise((resolve, reject) => {
    const request = openRequest(`${application.origin}/api/studies/${studyId}/uploads`, {
      method: "POST",
      headers: {
        cookie,
        origin: application.origin,
        "content-type": `multipart/form-data; boundary=${boundary}`,
        ...(announce && { "content-length": head.length + pieces * MIB + foot.length }),
      },
    });
    request.on("error", reject);
    request.on("response", (response) => {
      let text = "";
      response.on("data", (part) => {
        text += part;
      });
      response.on("end", () => {
        resolve({ status: response.statusCode ?? 0, sentence: JSON.parse(text).error?.sentence ?? "" });
        request.destroy();
      });
    });
    const piece = Buffer.alloc(MIB, "1,2\n");
    request.write(head);
    const next = (left: number) => {
      if (request.destroyed) return;
      if (left > 0) return void request.write(piece, () => next(left - 1));
      if (hangUp) request.destroy(new Error("hung up"));
      else request.end(foot);
    };
    next(pieces);
  });
}

let cookieOfOwner = "";
beforeAll(async () => {
  const answer = await fetch(`${application.origin}/api/auth/sign-in/email`, {
    method: "POST",
    headers: { "content-type": "application/json", origin: application.origin },
    body: JSON.stringify({ email: owner.email, password: "a curve and a line" }),
  });
  cookieOfOwner = answer.headers.getSetCookie()[0].split(";")[0];
});

describe("a large upload", () => {
  test("of 96 MB goes through in pieces of 1 MiB, in a part of its size of memory", async () => {
    await send(2);
    const before = process.memoryUsage().arrayBuffers;
    let most = 0;
    const watch = setInterval(() => {
      most = Math.max(most, process.memoryUsage().arrayBuffers - before);
    }, 2);
    const answer = await send(96);
    clearInterval(watch);
    expect(answer.status).toBe(201);
    const [{ id, bytes }] = application.open.db
      .select()
      .from(uploads)
      .all()
      .filter((row) => row.bytes === 96 * MIB);
    expect(bytes).toBe(96 * MIB);
    const pieces = application.open.db
      .select({ uploadId: uploadChunks.uploadId, bytes: uploadChunks.bytes })
      .from(uploadChunks)
      .all()
      .filter((chunk) => chunk.uploadId === id);
    expect(pieces.map((piece) => piece.bytes.length)).toEqual(Array(96).fill(MIB));
    // Pieces no longer held, and the client's, which sits in the same process, count until they are collected.
    expect(most / MIB).toBeLessThan(48);
  });

  test("over the limit is refused before its first byte when it says its size, naming both", async () => {
    const answer = await send(101, { announce: true });
    expect(answer).toEqual({ status: 413, sentence: "The file has 101 MB, and an upload may have 100 MB." });
  });

  test("over the limit is stopped when it does not say its size, and nothing of it stays", async () => {
    const before = [uploads, uploadChunks].map(rowsOf);
    const answer = await send(102);
    expect(answer).toEqual({ status: 413, sentence: "The file has more than 100 MB, and an upload may have 100 MB." });
    expect([uploads, uploadChunks].map(rowsOf)).toEqual(before);
  });

  test("that breaks off is removed", async () => {
    const before = [uploads, uploadChunks].map(rowsOf);
    await expect(send(3, { hangUp: true })).rejects.toThrow("hung up");
    await expect.poll(() => [uploads, uploadChunks].map(rowsOf), { timeout: 5000 }).toEqual(before);
    await expect.poll(() => logged).toContain("request aborted");
    expect(logged).not.toContain("unforeseen");
  });
});
