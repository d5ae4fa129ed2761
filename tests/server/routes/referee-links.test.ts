import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { refereeCopies } from "../../../server/db/schema/referee-copies.ts";
import type { CellKind, Finding } from "../../../shared/schemas/cell.ts";
import { refereeCopy } from "../../../shared/schemas/referee-copy.ts";
import { type Application, startApplication, type Visitor } from "../../support/application.ts";
import { exampleFindings, ROW_NUMBERS } from "../../support/findings.ts";

const DAY = 24 * 3_600_000;
const inDays = (days: number) => new Date(Date.now() + days * DAY).toISOString();

let application: Application;
let owner: Visitor;
let coauthor: Visitor;
let outsider: Visitor;
let studyId: string;
let matrixId: string;
const ids: Record<string, string> = {};

const put = (name: string, kind: CellKind, source: string, reads: string[], finding: Finding) =>
  application.cells.put(studyId, { name, kind, source }, reads, finding).cellId;
const copies = () => `/api/studies/${studyId}/referee-copies`;
const seal = (more = {}) => owner.ask("POST", copies(), { cellId: matrixId, ...more });
const open = (token: string, which = "") => application.stranger.ask("GET", `/api/referee/${token}${which}`);
const sentTo = (address: string) => application.services.mail.list().filter(({ recipient }) => recipient === address);

beforeAll(async () => {
  application = await startApplication();
  owner = await application.person("Ilse Marchetti");
  coauthor = await application.person("Tomas Adeyemi");
  outsider = await application.person("Vera Lindqvist");
  studyId = (await owner.ask("POST", "/api/studies", { title: "Levy on sweet drinks" })).body.id;
  const { insertPerson } = await import("../../../server/db/queries/people.ts");
  insertPerson(application.open.db, studyId, coauthor.id, "coauthor", new Date());
  const { data, system, slutsky, tests, elasticities } = exampleFindings();
  put("survey", "data", "upload: a.csv", [], data);
  put("later", "data", "upload: marchetti-b.csv", [], data);
  put("base", "system", "data: survey", ["survey"], system);
  ids.rival = put("rival", "system", "data: later", ["later"], system);
  ids.laws = put("laws", "tests", "system: rival", ["rival"], tests);
  ids.fifths = put("fifths", "elasticities", "system: base", ["base"], elasticities);
  ids.second = put("second", "slutsky", "system: base\nat: mean", ["base"], slutsky);
  matrixId = put("matrix", "slutsky", "system: base\nat: base point", ["base"], slutsky);
});
afterAll(() => application.close());

describe("findings sealed with a matrix", () => {
  test("are those chosen, in their order, with the sources of all they rest on and no row", async () => {
    const sealed = await seal({ also: [ids.laws, ids.second, ids.rival, ids.fifths] });
    expect(sealed.status).toBe(201);
    expect(sealed.body.copy.also).toEqual(["laws", "second", "rival", "fifths"]);
    const { content } = refereeCopy.parse((await open(sealed.body.token)).body);
    expect(content.also?.map(({ name, kind }) => [name, kind])).toEqual([
      ["laws", "tests"],
      ["second", "slutsky"],
      ["rival", "system"],
      ["fifths", "elasticities"],
    ]);
    expect(content.cells.sources.map(({ name }) => name).sort()).toEqual(
      ["base", "fifths", "later", "laws", "matrix", "rival", "second", "survey"].sort(),
    );
    for (const number of ROW_NUMBERS) expect(JSON.stringify(content)).not.toContain(String(number));
    expect(JSON.stringify(content)).not.toContain("brokenRows");
    // The name of every file may be a person's.
    expect(JSON.stringify(content)).not.toMatch(/marchetti/i);
  });

  test("are counted when they contradict one another, not listed", async () => {
    const { tests } = exampleFindings();
    const revealed = {
      ...{ rows: 20, pairs: 4, directPairs: 2, rowsInvolved: 3, index: 0.97, periods: false, weighted: false },
      cycle: [...ROW_NUMBERS],
    };
    const id = put("axiom", "tests", "data: survey", ["survey"], { ...tests, revealed });
    const { content } = (await open((await seal({ also: [id] })).body.token)).body;
    expect(content.also[0].finding.revealed).toEqual({ ...revealed, cycle: [] });
  });

  test("are refused where a group is small enough to show whose it is", async () => {
    const { elasticities } = exampleFindings();
    const groups = [{ ...elasticities.groups[0], name: "village 7", rows: 9 }];
    const id = put("villages", "elasticities", "system: base", ["base"], { ...elasticities, groups });
    const answer = await seal({ also: [id] });
    expect([answer.status, answer.body.error.sentence]).toEqual([
      409,
      expect.stringMatching(
        /^villages has a group of 9 rows \(village 7\), and groups of fewer than 10 are not sealed/,
      ),
    ]);
    const ten = put("towns", "elasticities", "system: base", ["base"], {
      ...elasticities,
      groups: [{ ...elasticities.groups[0], rows: 10 }],
    });
    expect((await seal({ also: [ten] })).status).toBe(201);
  });

  test("are refused at one household's row, of another kind, or not current", async () => {
    const { elasticities, data } = exampleFindings();
    const atRow = put("at a row", "elasticities", "system: base\nat: {row: 3}", ["base"], elasticities);
    expect((await seal({ also: [atRow] })).body.error.sentence).toContain("one household");
    const survey = application.cells.status(studyId).cells.find(({ name }) => name === "survey")?.cellId;
    expect((await seal({ also: [survey] })).body.error.sentence).toContain("survey is a data cell");
    const { cellId } = application.cells.put(
      studyId,
      { name: "stale", kind: "elasticities", source: "system: base" },
      ["base"],
      elasticities,
      "out of date",
    );
    expect((await seal({ also: [cellId] })).body.error.sentence).toContain("stale is out of date");
    expect((await seal({ also: ["nowhere"] })).status).toBe(404);
    expect(data.kind).toBe("data");
  });
});

describe("a link", () => {
  test("opens until its day, which can be moved, and then as a wrong one does", async () => {
    const { token, copy } = (await seal({ expiresAt: inDays(30) })).body;
    expect((await open(token)).status).toBe(200);
    // The clock cannot be turned: the row is.
    application.open.db
      .update(refereeCopies)
      .set({ expiresAt: new Date(Date.now() - 1000) })
      .run();
    const [after, never] = [await open(token), await open("x".repeat(43))];
    expect([after.status, after.body]).toEqual([404, never.body]);
    const moved = await owner.ask("PATCH", `${copies()}/${copy.id}`, { expiresAt: inDays(90) });
    expect(Date.parse(moved.body.expiresAt)).toBeGreaterThan(Date.now() + 89 * DAY);
    expect((await open(token)).status).toBe(200);
    const freed = await owner.ask("PATCH", `${copies()}/${copy.id}`, { expiresAt: null });
    expect(freed.body).not.toHaveProperty("expiresAt");
    application.open.db.update(refereeCopies).set({ expiresAt: null }).run();
  });

  test.each([
    ["gone by", inDays(-1), /run out already/],
    ["out of sight", inDays(4000), /at most 10 years/],
    ["no moment", "next week", /moment/],
  ])("has no end that is %s", async (_, expiresAt, sentence) => {
    const answer = await seal({ expiresAt });
    expect(answer.status).toBe(400);
    expect(JSON.stringify(answer.body.error)).toMatch(sentence);
  });

  test("is told anew where it is lost, and the old one opens nothing", async () => {
    const { token, copy } = (await seal()).body;
    const renewed = await owner.ask("POST", `${copies()}/${copy.id}/link`, { email: "referee@example.org" });
    expect([renewed.status, renewed.body.copy.fingerprint]).toEqual([201, copy.fingerprint]);
    expect((await open(token)).status).toBe(404);
    expect((await open(renewed.body.token)).body.fingerprint).toBe(copy.fingerprint);
    await owner.ask("DELETE", `${copies()}/${copy.id}`);
    expect((await owner.ask("POST", `${copies()}/${copy.id}/link`, {})).status).toBe(409);
  });

  test("is sent where asked, without the authors' names when they are withheld", async () => {
    const withheld = (await seal({ email: "first@example.org" })).body.token;
    await seal({ email: "second@example.org", withholdAuthors: false });
    await expect.poll(() => sentTo("second@example.org")[0]?.state).toBe("kept");
    const [first] = sentTo("first@example.org");
    expect(first.subject).toContain("Levy on sweet drinks");
    expect(first.text).toContain(`${application.origin}/referee/${withheld}`);
    expect(first.text).not.toMatch(/marchetti/i);
    expect(sentTo("second@example.org")[0].text).toContain("Ilse Marchetti");
    expect((await seal({ email: "no address" })).status).toBe(400);
  });

  test("leads to the copy that replaced its own, and to the last of several", async () => {
    const first = (await seal()).body;
    const second = (await seal({ replaces: first.copy.id, note: "second" })).body;
    expect((await open(first.token)).body.newer).toMatchObject({ fingerprint: second.copy.fingerprint });
    const third = (await seal({ replaces: second.copy.id, note: "third" })).body;
    const { content, newer, fingerprint } = refereeCopy.parse((await open(first.token)).body);
    expect([fingerprint, newer?.fingerprint]).toEqual([first.copy.fingerprint, third.copy.fingerprint]);
    expect(content.note).toBe("");
    expect((await open(first.token, "/newest")).body.content.note).toBe("third");
    expect((await open(third.token)).body).not.toHaveProperty("newer");
    expect((await open(third.token, "/newest")).status).toBe(404);
    // What is revoked is not led to.
    await owner.ask("DELETE", `${copies()}/${third.copy.id}`);
    expect((await open(first.token)).body.newer.fingerprint).toBe(second.copy.fingerprint);
    expect((await seal({ replaces: first.copy.id })).status).toBe(409);
    expect((await seal({ replaces: "nowhere" })).status).toBe(404);
  });

  test("is the owner's to change: 401, 400, 403 and 404 first", async () => {
    const { copy } = (await seal()).body;
    const address = `${copies()}/${copy.id}`;
    const asks = [
      ["PATCH", address, { expiresAt: null }],
      ["POST", `${address}/link`, {}],
    ] as const;
    for (const [method, path, body] of asks) {
      expect((await application.stranger.ask(method, path, body)).status, path).toBe(401);
      expect((await owner.ask(method, path, { until: 1 })).status, path).toBe(400);
      expect((await coauthor.ask(method, path, body)).status, path).toBe(403);
      expect((await outsider.ask(method, path, body)).status, path).toBe(404);
      expect((await owner.ask(method, path.replace(copy.id, "none"), body)).status, path).toBe(404);
    }
  });

  test("is written down in the journal, for the owner", async () => {
    const { body } = await owner.ask("GET", `/api/studies/${studyId}/journal`);
    const actions = new Set(body.entries.map(({ action }: { action: string }) => action));
    for (const action of ["sealed", "sent", "replaced", "revoked"]) expect(actions).toContain(`referee copy ${action}`);
  });
});
