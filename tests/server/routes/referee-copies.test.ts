import { createHash } from "node:crypto";
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { refereeCopies } from "../../../server/db/schema/referee-copies.ts";
import { sealedRefereeCopy } from "../../../shared/schemas/referee-copies.ts";
import { refereeCopy } from "../../../shared/schemas/referee-copy.ts";
import { canonicalJson } from "../../../shared/study/canonical-json.ts";
import { type Application, startApplication, type Visitor } from "../../support/application.ts";
import { exampleFindings, ROW_NUMBERS } from "../../support/findings.ts";

let application: Application;
let owner: Visitor;
let studyId: string;
let matrixId: string;

beforeAll(async () => {
  application = await startApplication();
  owner = await application.person("Ilse Marchetti");
  studyId = (await owner.ask("POST", "/api/studies", { title: "Levy on sweet drinks" })).body.id;
  const { data, system, slutsky } = exampleFindings();
  application.cells.put(
    studyId,
    { name: "survey", kind: "data", source: "upload: marchetti-2031.csv # weekly" },
    [],
    data,
  );
  application.cells.put(studyId, { name: "base", kind: "system", source: "data: survey" }, ["survey"], system);
  matrixId = put("matrix", "system: base\nat: base point", slutsky).cellId;
});
afterAll(() => application.close());

function put(name: string, source: string, finding = exampleFindings().slutsky, state = "current", reads = "base") {
  return application.cells.put(studyId, { name, kind: "slutsky", source }, [reads], finding, state);
}
const seal = (cellId: string, more = {}) =>
  owner.ask("POST", `/api/studies/${studyId}/referee-copies`, { cellId, note: "revision 2", ...more });
const open = (token: string) => application.stranger.ask("GET", `/api/referee/${token}`);

describe("a referee copy", () => {
  let token: string;
  let copyId: string;

  beforeEach(async () => {
    const { body, status } = await seal(matrixId);
    expect(status).toBe(201);
    ({ token } = sealedRefereeCopy.parse(body));
    copyId = body.copy.id;
  });

  test("is read by its link without an account, under the fingerprint of its content", async () => {
    const answer = await open(token);
    expect(answer.status).toBe(200);
    const { fingerprint, content } = refereeCopy.parse(answer.body);
    expect(createHash("sha256").update(canonicalJson(content)).digest("hex")).toBe(fingerprint);
    expect(content).toMatchObject({
      program: "Tangency test",
      study: { title: "Levy on sweet drinks" },
      note: "revision 2",
      cells: { matrix: "matrix", system: "base", data: "survey" },
    });
    expect(content.cells.sources.map((cell) => cell.name)).toEqual(["survey", "base", "matrix"]);
    expect(answer.headers.get("cache-control")).toBe("no-store");
    expect(answer.headers.get("referrer-policy")).toBe("no-referrer");
  });

  test("has sums only: no key that holds rows, and no row's number anywhere", async () => {
    const { content } = (await open(token)).body;
    const keys = new Set<string>();
    JSON.stringify(content, (key, value) => {
      keys.add(key);
      return value;
    });
    for (const key of ["brokenRows", "strip", "row", "flags", "upload", "numericColumns", "rowNumbers"]) {
      expect([...keys], key).not.toContain(key);
    }
    expect(Object.keys(content.accounting.leftOut[0])).toEqual(["reason", "label", "count"]);
    for (const number of ROW_NUMBERS) expect(JSON.stringify(content)).not.toContain(String(number));
    expect(Object.keys(content).sort()).toEqual(
      ["accounting", "cells", "data", "format", "note", "program", "sealedAt", "slutsky", "study", "system"].sort(),
    );
    expect(Object.keys(content.data).sort()).toEqual(["fingerprint", "meanTotal", "weighted"]);
  });

  test("keeps of its link only a hash", async () => {
    const stored = JSON.stringify(application.open.db.select().from(refereeCopies).all());
    expect(stored).not.toContain(token);
    expect(stored).toContain(createHash("sha256").update(token).digest("hex"));
    expect(Buffer.from(token, "base64url")).toHaveLength(32);
    const list = await owner.ask("GET", `/api/studies/${studyId}/referee-copies`);
    expect(JSON.stringify(list.body)).not.toContain(token);
  });

  test("says to its owner when it was last opened", async () => {
    const find = async () =>
      (await owner.ask("GET", `/api/studies/${studyId}/referee-copies`)).body.find(
        (copy: { id: string }) => copy.id === copyId,
      );
    expect(await find()).not.toHaveProperty("lastOpenedAt");
    await open(token);
    expect(Date.parse((await find()).lastOpenedAt)).toBeGreaterThan(Date.now() - 10_000);
  });

  test("revoked is not told from one that never was", async () => {
    const revoked = await owner.ask("DELETE", `/api/studies/${studyId}/referee-copies/${copyId}`);
    expect([revoked.status, typeof revoked.body.revokedAt]).toEqual([200, "string"]);
    const [after, never] = [await open(token), await open("x".repeat(43))];
    expect([after.status, never.status]).toEqual([404, 404]);
    expect(after.body).toEqual(never.body);
    const names = (headers: Headers) => [...headers.keys()].filter((name) => !name.startsWith("ratelimit"));
    expect(names(after.headers)).toEqual(names(never.headers));
  });
});

describe("sealing", () => {
  test("names the authors only when asked to", async () => {
    const { token } = (await seal(matrixId, { withholdAuthors: false })).body;
    const { content } = (await open(token)).body;
    expect(content.study.authors).toEqual(["Ilse Marchetti"]);
    expect(content.cells.sources[0].source).toBe("upload: marchetti-2031.csv # weekly");
    const withheld = (await open((await seal(matrixId)).body.token)).body;
    expect(withheld.content.cells.sources[0].source).toBe("upload: withheld # weekly");
    expect(JSON.stringify(withheld)).not.toMatch(/marchetti/i);
  });

  test.each(["out of date", "estimating", "failed"])("refuses a cell that is %s, and says so", async (state) => {
    const { cellId } = put(`matrix ${state}`, "system: base", undefined, state);
    const answer = await seal(cellId);
    expect([answer.status, answer.body.error.sentence]).toEqual([
      409,
      `matrix ${state} is ${state}, and only a current finding is sealed.`,
    ]);
  });

  test("refuses a matrix whose system is not current", async () => {
    const { system } = exampleFindings();
    application.cells.put(studyId, { name: "old", kind: "system", source: "" }, ["survey"], system, "out of date");
    const { cellId } = put("matrix of old", "system: old", undefined, "current", "old");
    const answer = await seal(cellId);
    expect([answer.status, answer.body.error.sentence]).toEqual([409, expect.stringContaining("old is out of date")]);
  });

  test("refuses another kind of cell, and a matrix at one household's row", async () => {
    const base = application.cells.status(studyId).cells.find((cell) => cell.name === "base");
    expect((await seal(base?.cellId ?? "")).body.error.sentence).toContain("base is a system cell");
    const { cellId } = put("matrix at a row", "system: base\nat: {row: 12}", {
      ...exampleFindings().slutsky,
      pointName: "row 12",
    });
    const answer = await seal(cellId);
    expect([answer.status, answer.body.error.sentence]).toEqual([409, expect.stringContaining("one household")]);
  });

  test.each([
    ["0", 409],
    ["0.005", 409],
    ["0.01", 201],
    ["0.9", 201],
    ["0.999", 409],
    ["1", 409],
  ])("at quantile %s of expenditure answers %d: the outermost are single households", async (fraction, status) => {
    const pointName = `quantile ${fraction} of expenditure`;
    const source = `system: base\nat: {x: quantile ${fraction}}`;
    const { cellId } = put(`matrix at ${fraction}`, source, { ...exampleFindings().slutsky, pointName });
    const answer = await seal(cellId);
    expect(answer.status).toBe(status);
    if (status === 409) expect(answer.body.error.sentence).toContain(`${pointName}, the total of one household`);
  });
});

test("opening links is counted", async () => {
  const strict = await startApplication({ limits: { refereeReadsPerMinute: 2 } });
  const statuses = [];
  for (let i = 0; i < 3; i += 1) statuses.push((await strict.stranger.ask("GET", `/api/referee/${i}`)).status);
  expect(statuses).toEqual([404, 404, 429]);
  await strict.close();
});
