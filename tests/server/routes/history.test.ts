import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { insertPerson } from "../../../server/db/queries/people.ts";
import { noteEdits } from "../../../server/db/queries/sittings.ts";
import { cellSittings } from "../../../server/db/schema/history.ts";
import { createCheckpointService } from "../../../server/services/checkpoints.ts";
import { checkpoint, checkpointSummary, historyPage, latestEdits, returning } from "../../../shared/schemas/history.ts";
import { parseStudyFile } from "../../../shared/study/study-file.ts";
import { type Application, startApplication, type Visitor } from "../../support/application.ts";

let application: Application;
let owner: Visitor;
let coauthor: Visitor;
let reader: Visitor;
let outsider: Visitor;
let studyId: string;
let cellId: string;

const BASE = { name: "base", kind: "system", source: "data: survey\nform: aids # for now\n" };
const at = (minute: number) => new Date(Date.UTC(2031, 2, 4, 14, minute));
const study = (rest = "") => `/api/studies/${studyId}${rest}`;

beforeAll(async () => {
  application = await startApplication();
  owner = await application.person("Ilse Marchetti");
  coauthor = await application.person("Tomas Adeyemi");
  reader = await application.person("Petra Vance");
  outsider = await application.person("Olga Lind");
});
afterAll(() => application.close());

beforeEach(async () => {
  studyId = (await owner.ask("POST", "/api/studies", { title: "Levy", lede: "Who pays?" })).body.id;
  insertPerson(application.open.db, studyId, coauthor.id, "coauthor", new Date());
  insertPerson(application.open.db, studyId, reader.id, "reader", new Date());
  ({ cellId } = application.cells.put(studyId, BASE, ["survey"]));
});

function edited(userId: string | null, minute: number, before: string | undefined, after: string, id = cellId) {
  const cell = (source: string) => ({ id, name: "base", kind: "system", order: "a0", source });
  const edit = { cellId: id, ...(before !== undefined && { before: cell(before) }), after: cell(after) };
  noteEdits(application.open.db, studyId, [edit], userId, at(minute));
}

describe("the history of a study", () => {
  test("is for its people only, and its questions are checked", async () => {
    expect((await application.stranger.ask("GET", study("/history"))).status).toBe(401);
    expect((await owner.ask("GET", study("/history?before=yesterday"))).status).toBe(400);
    expect((await owner.ask("GET", study("/history?who=me"))).status).toBe(400);
    expect((await outsider.ask("GET", study("/history"))).status).toBe(404);
    for (const one of [owner, coauthor, reader]) expect((await one.ask("GET", study("/history"))).status).toBe(200);
  });

  test("tells who found a cell how and left it how, the newest first", async () => {
    edited(owner.id, 0, undefined, "form: la-aids\n");
    edited(coauthor.id, 20, "form: la-aids\n", BASE.source);
    const { sittings, next } = historyPage.parse((await reader.ask("GET", study("/history"))).body);
    expect(next).toBeUndefined();
    expect(sittings).toMatchObject([
      {
        cellId,
        people: [{ id: coauthor.id, name: "Tomas Adeyemi" }],
        from: at(20).toISOString(),
        before: { source: "form: la-aids\n" },
        after: { source: BASE.source },
      },
      { people: [{ name: "Ilse Marchetti" }], after: { source: "form: la-aids\n" } },
    ]);
    expect(sittings[1].before).toBeUndefined();
  });

  test("tells in short who edited each cell last", async () => {
    expect((await application.stranger.ask("GET", study("/history/latest"))).status).toBe(401);
    expect((await outsider.ask("GET", study("/history/latest"))).status).toBe(404);
    edited(owner.id, 0, undefined, "a");
    edited(coauthor.id, 9, "a", "b");
    edited(owner.id, 12, undefined, "of a cell that is gone", "gone");
    expect(latestEdits.parse((await reader.ask("GET", study("/history/latest"))).body)).toEqual([
      { cellId, cellName: "base", by: { id: coauthor.id, name: "Tomas Adeyemi" }, at: at(9).toISOString() },
    ]);
  });

  test("is read by cell and by person", async () => {
    edited(owner.id, 0, undefined, "a");
    edited(coauthor.id, 1, undefined, "b", "another");
    edited(null, 2, undefined, "c", "third");
    const of = async (query: string) =>
      (await owner.ask("GET", study(`/history?${query}`))).body.sittings.map((one: { cellId: string }) => one.cellId);
    expect(await of(`cell=${cellId}`)).toEqual([cellId]);
    expect(await of(`person=${coauthor.id}`)).toEqual(["another"]);
    expect(await of("")).toEqual(["third", "another", cellId]);
  });

  test("comes in pages, of ten thousand edits as of ten, within a moment", async () => {
    const rows = Array.from({ length: 10_000 }, (_, i) => ({
      studyId,
      cellId: `cell ${i % 50}`,
      people: JSON.stringify([i % 2 ? owner.id : coauthor.id]),
      startedAt: at(6 * i),
      endedAt: at(6 * i),
      before: JSON.stringify({ name: "base", kind: "system", order: "a0", source: `form: ${i}` }),
    }));
    for (let i = 0; i < rows.length; i += 500) {
      application.open.db
        .insert(cellSittings)
        .values(rows.slice(i, i + 500))
        .run();
    }
    const began = performance.now();
    const page = historyPage.parse((await owner.ask("GET", study("/history"))).body);
    expect(performance.now() - began).toBeLessThan(1000);
    expect(page.sittings).toHaveLength(40);
    const then = historyPage.parse((await owner.ask("GET", study(`/history?before=${page.next}`))).body);
    expect(then.sittings[0].id).toBe(page.sittings[39].id - 1);
  });

  test("keeps a page within bounds where sources are long", async () => {
    const long = "x".repeat(300_000);
    for (let i = 0; i < 8; i++) edited(i % 2 ? owner.id : coauthor.id, 6 * i, long + i, long + (i + 1));
    const page = historyPage.parse((await owner.ask("GET", study("/history"))).body);
    expect(page.sittings.length).toBeLessThan(3);
    expect(page.next).toBe(page.sittings.at(-1)?.id);
  });
});

const make = (who: Visitor, name = "Before the referee", note = "") =>
  who.ask("POST", study("/checkpoints"), { name, note });

describe("checkpoints", () => {
  test("are refused to strangers, without a name, and to those who only read", async () => {
    expect((await make(application.stranger)).status).toBe(401);
    const nameless = await make(owner, "  ");
    expect([nameless.status, nameless.body.error.sentence]).toEqual([400, expect.stringContaining("needs a name")]);
    expect((await make(reader)).status).toBe(403);
    expect((await make(outsider)).status).toBe(404);
    expect((await owner.ask("GET", study("/checkpoints"))).body).toEqual([]);
  });

  test("keep the study whole, whatever becomes of it", async () => {
    const made = await make(coauthor, " First draft ", "as sent to the office");
    expect(made.status).toBe(201);
    expect(checkpointSummary.parse(made.body)).toMatchObject({
      name: "First draft",
      note: "as sent to the office",
      occasion: "kept",
      madeBy: { id: coauthor.id, name: "Tomas Adeyemi" },
      cells: 1,
    });
    application.cells.put(studyId, { name: "later", kind: "system", source: "" }, []);
    const one = await reader.ask("GET", study(`/checkpoints/${made.body.id}`));
    expect(checkpoint.parse(one.body).content).toEqual([{ id: cellId, order: "a0", ...BASE }]);
    expect((await reader.ask("GET", study("/checkpoints"))).body).toEqual([made.body]);
  });

  test("are of one study only", async () => {
    const { id } = (await make(owner)).body;
    const other = (await owner.ask("POST", "/api/studies", { title: "Other" })).body.id;
    for (const [method, rest, body] of [
      ["GET", "", undefined],
      ["GET", "/study.yaml", undefined],
      ["PATCH", "", { name: "x" }],
      ["POST", "/return", {}],
      ["DELETE", "", undefined],
    ] as const) {
      const answer = await owner.ask(method, `/api/studies/${other}/checkpoints/${id}${rest}`, body);
      expect([method, rest, answer.status]).toEqual([method, rest, 404]);
      expect((await outsider.ask(method, study(`/checkpoints/${id}${rest}`), body)).status).toBe(404);
      expect((await application.stranger.ask(method, study(`/checkpoints/${id}${rest}`), body)).status).toBe(401);
    }
  });

  test("are renamed by owner and coauthor, and removed by the owner", async () => {
    const { id } = (await make(owner)).body;
    const path = study(`/checkpoints/${id}`);
    expect((await coauthor.ask("PATCH", path, { name: "" })).status).toBe(400);
    expect((await reader.ask("PATCH", path, { name: "mine" })).status).toBe(403);
    expect((await coauthor.ask("PATCH", path, { name: "Sent" })).body).toMatchObject({ name: "Sent", note: "" });
    expect((await coauthor.ask("DELETE", path)).status).toBe(403);
    expect((await owner.ask("DELETE", path)).status).toBe(204);
    expect((await owner.ask("GET", path)).status).toBe(404);
  });

  test("can be taken away as a study file", async () => {
    const { id } = (await make(owner, "Sent: 1/2")).body;
    const answer = await reader.ask("GET", study(`/checkpoints/${id}/study.yaml`));
    expect(answer.headers.get("content-disposition")).toBe('attachment; filename="Sent 12.yaml"');
    const file = parseStudyFile(answer.body);
    expect([file.title, file.lede, file.cells[0].name, file.cells[0].source]).toEqual([
      "Levy",
      "Who pays?",
      BASE.name,
      BASE.source,
    ]);
  });

  test("are returned to by those who write, and what was there before is kept", async () => {
    const { id } = (await make(owner)).body;
    application.cells.put(studyId, { name: "later", kind: "system", source: "form: les\n" }, []);
    expect((await reader.ask("POST", study(`/checkpoints/${id}/return`))).status).toBe(403);
    const answer = await coauthor.ask("POST", study(`/checkpoints/${id}/return`));
    expect(answer.status).toBe(201);
    const { to, before } = returning.parse(answer.body);
    expect(to.content.map(({ name }) => name)).toEqual(["base"]);
    expect(before).toMatchObject({
      name: "Before returning to Before the referee",
      occasion: "before returning",
      madeBy: { id: coauthor.id },
      cells: 2,
    });
    const kept = checkpoint.parse((await owner.ask("GET", study(`/checkpoints/${before.id}`))).body);
    expect(kept.content.map(({ name }) => name)).toEqual(["base", "later"]);
  });

  test("have a limit in number and in size, told with both figures", async () => {
    const { access } = application.services;
    const { sourcesOf } = application.cells;
    const { record } = application.services.journal;
    const few = createCheckpointService({ db: application.open.db, access, sourcesOf, record, limits: { count: 1 } });
    await few.make(owner, studyId, { name: "first", note: "" });
    await expect(few.make(owner, studyId, { name: "second", note: "" })).rejects.toThrow("has 1 checkpoints");
    const small = createCheckpointService({
      db: application.open.db,
      access,
      sourcesOf,
      record,
      limits: { size: 200 },
    });
    await expect(small.make(owner, studyId, { name: "third", note: "" })).rejects.toThrow(/hold \d+ .* at most 200/);
  });
});
