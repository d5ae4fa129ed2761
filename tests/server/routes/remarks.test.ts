import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { insertPerson } from "../../../server/db/queries/people.ts";
import { remarks } from "../../../server/db/schema/remarks.ts";
import { REMARK_LIMITS } from "../../../server/services/remarks.ts";
import { type Remark, remark, remarkReply } from "../../../shared/schemas/remarks.ts";
import { type Application, startApplication, type Visitor } from "../../support/application.ts";

let application: Application;
let ilse: Visitor;
let tomas: Visitor;
let petra: Visitor;
let outsider: Visitor;
let studyId: string;
let cellId: string;

beforeAll(async () => {
  application = await startApplication();
  const names = ["Ilse Marchetti", "Tomas Adeyemi", "Petra Vance", "Outi Sider"];
  [ilse, tomas, petra, outsider] = await Promise.all(names.map(application.person));
});
afterAll(() => application.close());

beforeEach(async () => {
  studyId = (await ilse.ask("POST", "/api/studies", { title: "Levy" })).body.id;
  insertPerson(application.open.db, studyId, tomas.id, "coauthor", new Date());
  insertPerson(application.open.db, studyId, petra.id, "reader", new Date());
  cellId = application.cells.put(studyId, { name: "base", kind: "system", source: "" }, []).cellId;
  application.sockets.remarked.length = 0;
});

const path = (rest = "") => `/api/studies/${studyId}/remarks${rest}`;
const list = async (who = ilse): Promise<Remark[]> => remark.array().parse((await who.ask("GET", path())).body);
async function write(who: Visitor, text: string, anchor?: string): Promise<Remark> {
  const answer = await who.ask("POST", path(), { cellId, text, anchor });
  expect(answer.status).toBe(201);
  return remark.parse(answer.body);
}
async function reply(who: Visitor, to: Remark, text: string) {
  const answer = await who.ask("POST", path(`/${to.id}/replies`), { text });
  expect(answer.status).toBe(201);
  return remarkReply.parse(answer.body);
}

describe("a remark", () => {
  test("is written by a reader, on a cell and what it speaks of, and everyone is told", async () => {
    const made = await write(petra, "  Symmetry survives,\r\nbut only just. ", "verdict Symmetry");
    expect(made).toMatchObject({
      cellId,
      cellName: "base",
      cellIsThere: true,
      anchor: "verdict Symmetry",
      author: { id: petra.id, name: petra.name },
      text: "Symmetry survives,\nbut only just.",
      may: { edit: true, withdraw: true, settle: true },
      replies: [],
    });
    expect(application.sockets.remarked).toEqual([studyId]);
    const [seen] = await list(tomas);
    expect(seen).toEqual({ ...made, may: { edit: false, withdraw: false, settle: true } });
  });

  test("needs a cell that is in the study", async () => {
    const answer = await petra.ask("POST", path(), { cellId: "gone", text: "Which?" });
    expect([answer.status, answer.body.error.sentence]).toEqual([404, expect.stringContaining("not in this study")]);
  });

  test("is kept as it was written: nothing in it is taken for anything but words", async () => {
    const text = '<img src=x onerror="alert(1)"> **not bold** https://vihe.example';
    expect((await write(petra, text)).text).toBe(text);
  });

  test("gets other words from whoever wrote it and from nobody else", async () => {
    const made = await write(petra, "Quote one.");
    for (const who of [ilse, tomas]) {
      const refused = await who.ask("PATCH", path(`/${made.id}`), { text: "Quote none." });
      expect([refused.status, refused.body.error.sentence]).toEqual([403, expect.stringContaining("whoever wrote it")]);
    }
    expect((await outsider.ask("PATCH", path(`/${made.id}`), { text: "x" })).status).toBe(404);
    const same = await petra.ask("PATCH", path(`/${made.id}`), { text: "Quote one." });
    expect([same.status, same.body.editedAt]).toEqual([200, undefined]);
    const changed = await petra.ask("PATCH", path(`/${made.id}`), { text: "Quote both." });
    expect([changed.status, remark.parse(changed.body).text]).toEqual([200, "Quote both."]);
    expect((await list())[0].editedAt).toBeDefined();
    expect(application.sockets.remarked).toHaveLength(2);
  });

  test("is settled by owner, coauthor or author, by no other reader, and opened again", async () => {
    const own = await write(petra, "Mine.");
    const theirs = await write(tomas, "Not Petra's.");
    expect((await petra.ask("PATCH", path(`/${theirs.id}/settled`), { settled: true })).status).toBe(403);
    for (const [who, one] of [
      [petra, own],
      [tomas, theirs],
    ] as const) {
      const settled = await who.ask("PATCH", path(`/${one.id}/settled`), { settled: true });
      expect(settled.body.settled).toEqual({ by: { id: who.id, name: who.name }, at: expect.any(String) });
    }
    const told = application.sockets.remarked.length;
    await tomas.ask("PATCH", path(`/${theirs.id}/settled`), { settled: true });
    expect(application.sockets.remarked).toHaveLength(told);
    const late = await ilse.ask("POST", path(`/${own.id}/replies`), { text: "One more thing." });
    expect([late.status, late.body.error.sentence]).toEqual([409, expect.stringContaining("settled")]);
    const opened = await ilse.ask("PATCH", path(`/${own.id}/settled`), { settled: false });
    expect(opened.body.settled).toBeUndefined();
    expect(opened.body.reopened.by.name).toBe("Ilse Marchetti");
  });

  test("is withdrawn by its author or an owner: gone without replies, without words while it has some", async () => {
    const alone = await write(petra, "On second thoughts, no.");
    const answered = await write(petra, "Which survey?");
    const answer = await reply(tomas, answered, "Velmark's.");
    expect((await tomas.ask("DELETE", path(`/${alone.id}`))).status).toBe(403);
    expect((await petra.ask("DELETE", path(`/${alone.id}`))).status).toBe(204);
    expect((await ilse.ask("DELETE", path(`/${answered.id}`))).status).toBe(204);
    const [left, ...others] = await list();
    expect(others).toEqual([]);
    expect(left).toMatchObject({
      id: answered.id,
      text: "",
      withdrawnAt: expect.any(String),
      may: { withdraw: false },
    });
    expect(application.open.db.select({ text: remarks.text }).from(remarks).all()).not.toContainEqual({
      text: "Which survey?",
    });
    expect((await petra.ask("PATCH", path(`/${answered.id}`), { text: "Back." })).status).toBe(409);
    expect((await tomas.ask("DELETE", path(`/${answered.id}/replies/${answer.id}`))).status).toBe(204);
    expect(await list()).toEqual([]);
  });

  test("goes by its cell's name, and by the last one it had when the cell is gone", async () => {
    const [source] = application.cells.sourcesOf(studyId);
    await write(petra, "On this one.");
    Object.assign(source, { name: "preferred" });
    await application.services.remarks.cellsChanged(studyId);
    Object.assign(source, { id: "another" });
    expect(await list()).toMatchObject([{ cellId, cellName: "preferred", cellIsThere: false }]);
  });
});

describe("a reply", () => {
  test("stands under its remark, the oldest first, and is changed and withdrawn by its author", async () => {
    const made = await write(tomas, "Look at the ninetieth percentile too.");
    const first = await reply(petra, made, "The referees will ask.");
    await reply(ilse, made, "Done.");
    expect((await list())[0].replies.map(({ text }) => text)).toEqual(["The referees will ask.", "Done."]);
    const where = path(`/${made.id}/replies/${first.id}`);
    expect((await tomas.ask("PATCH", where, { text: "x" })).status).toBe(403);
    expect((await tomas.ask("DELETE", where)).status).toBe(403);
    expect((await petra.ask("PATCH", where, { text: "They will." })).body).toMatchObject({ text: "They will." });
    expect((await ilse.ask("PATCH", path(`/other/replies/${first.id}`), { text: "x" })).status).toBe(404);
    expect((await ilse.ask("DELETE", where)).status).toBe(204);
    expect((await list())[0].replies.map(({ text }) => text)).toEqual(["Done."]);
  });
});

describe("limits", () => {
  test("a study keeps so many and so much, and says both numbers", async () => {
    const row = { studyId, cellId, cellName: "base", authorId: ilse.id, writtenAt: new Date() };
    const many = Array.from({ length: REMARK_LIMITS.ofStudy }, (_, i) => ({
      ...row,
      id: `${studyId} ${i}`,
      text: "x",
    }));
    for (let from = 0; from < many.length; from += 500) {
      application.open.db
        .insert(remarks)
        .values(many.slice(from, from + 500))
        .run();
    }
    const full = await petra.ask("POST", path(), { cellId, text: "One more." });
    expect([full.status, full.body.error.sentence]).toEqual([409, expect.stringMatching(/2000 remarks.*at most 2000/)]);
    application.open.db.delete(remarks).run();
    const long = "x".repeat(REMARK_LIMITS.characters - 3);
    application.open.db
      .insert(remarks)
      .values({ ...row, id: "long", text: long })
      .run();
    expect((await petra.ask("POST", path(), { cellId, text: "abcd" })).status).toBe(409);
    expect((await petra.ask("POST", path(), { cellId, text: "abc" })).status).toBe(201);
    application.open.db.delete(remarks).run();
  });

  test("one person writes so many a minute, and others are not held up", async () => {
    const made = await write(tomas, "Often.");
    const hasty = await application.person("Hasty Reader");
    insertPerson(application.open.db, studyId, hasty.id, "reader", new Date());
    const answers = await Promise.all(
      Array.from({ length: 32 }, (_, i) => hasty.ask("POST", path(`/${made.id}/replies`), { text: `${i}` })),
    );
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(30);
    const late = answers.find(({ status }) => status === 429);
    expect(late?.body.error.sentence).toMatch(/^Too many remarks; try again in \d+ seconds\.$/);
    expect((await reply(tomas, made, "Still here.")).text).toBe("Still here.");
  });
});
