import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { type OpenDatabase, openDatabase } from "../../../server/db/client.ts";
import { studies, uploadColumns, uploads, user } from "../../../server/db/schema/index.ts";
import { createCellService } from "../../../server/services/cells.ts";
import { type CellStatus, type StudyStatus, studyStatus } from "../../../shared/schemas/status.ts";
import { FakePool } from "../../support/fake-pool.ts";
import { temporaryFolder } from "../../support/temporary.ts";

const STUDY = "s1";
const SURVEY =
  "upload: u.csv\ngoods:\n  a: {price: p_a, quantity: q_a}\n  b: {price: p_b, quantity: q_b}\n  c: {price: p_c, quantity: q_c}\n";

let folder: ReturnType<typeof temporaryFolder>;
let open: OpenDatabase;
let pool: FakePool;
let cells: Map<string, { kind: string; source: string }>;
let published: StudyStatus[];
let faults: unknown[];
let service: ReturnType<typeof createCellService>;

beforeEach(() => {
  folder = temporaryFolder();
  open = openDatabase(`${folder.path}/test.sqlite`);
  const now = new Date();
  open.db
    .insert(user)
    .values({ id: "u1", name: "Ilse Marchetti", email: "ilse@vihe.example", createdAt: now, updatedAt: now })
    .run();
  open.db.insert(studies).values({ id: STUDY, title: "A study", createdAt: now, changedAt: now }).run();
  addUpload("u.csv", "0");
  cells = new Map([
    ["survey", { kind: "data", source: SURVEY }],
    ["base", { kind: "system", source: "data: survey\nform: la-aids\n" }],
    ["matrix", { kind: "slutsky", source: "system: base\n" }],
  ]);
  pool = new FakePool();
  pool.prompt.add("data").add("slutsky");
  service = begin();
});

afterEach(() => {
  service.close();
  open.close();
  folder.remove();
});

function begin() {
  published = [];
  faults = [];
  return createCellService({
    db: open.db,
    pool,
    sourcesOf: () =>
      [...cells].map(([name, { kind, source }], i) => ({ id: name, name, kind, source, order: `${i + 1}` })),
    publish: (_, status) => void published.push(studyStatus.parse(status)),
    report: (error) => void faults.push(error),
    restMs: 0,
  });
}

function addUpload(name: string, digit: string) {
  open.db
    .insert(uploads)
    .values({
      id: `id ${name}`,
      studyId: STUDY,
      name,
      bytes: 1,
      state: "ready",
      sha256: digit.repeat(64),
      rows: 500,
      uploadedBy: "u1",
      uploadedAt: new Date(),
    })
    .run();
  ["p_a", "q_a", "p_b", "q_b", "p_c", "q_c", "urban"].forEach((column, position) => {
    const description = JSON.stringify({ name: column, type: "number", missing: 0, distinct: 3 });
    open.db
      .insert(uploadColumns)
      .values({ uploadId: `id ${name}`, position, name: column, type: "number", description, values: Buffer.alloc(0) })
      .run();
  });
}

async function settled(): Promise<Record<string, CellStatus>> {
  for (let turn = 0; turn < 20; turn++) await new Promise((next) => setImmediate(next));
  const { cells: all } = await service.status(STUDY);
  return Object.fromEntries(all.map((cell) => [cell.name, cell]));
}
const states = async () => Object.values(await settled()).map(({ state }) => state);
function edit(name: string, source: string) {
  cells.set(name, { kind: cells.get(name)?.kind ?? "system", source });
  service.changed(STUDY);
}
async function estimated() {
  await service.estimate(STUDY, "base", "u1");
  pool.finish("system");
  return settled();
}

describe("cells that follow by themselves", () => {
  it("data at once, slutsky once its system is estimated, a system only when asked", async () => {
    const before = await settled();
    expect(Object.values(before).map(({ state }) => state)).toEqual(["current", "draft", "draft"]);
    expect(before.matrix.because).toBe("waits for base to be estimated");
    expect(before.base.aboutMs).toBeGreaterThan(0);
    const after = await estimated();
    expect(Object.values(after).map(({ state }) => state)).toEqual(["current", "current", "current"]);
    expect(after.base.last).toMatchObject({
      source: "data: survey\nform: la-aids\n",
      by: "Ilse Marchetti",
      tookMs: 12,
    });
  });

  it("never compute the same question twice", async () => {
    await estimated();
    expect(pool.started).toHaveLength(3);
    edit("base", "# thought over\nform: la-aids\ndata: survey\nindex: tornqvist\n");
    expect(await states()).toEqual(["current", "current", "current"]);
    edit("base", "data: survey\nform: aids\n");
    await settled();
    edit("base", "data: survey\nform: la-aids\n");
    expect(await states()).toEqual(["current", "current", "current"]);
    expect(pool.started).toHaveLength(3);
  });

  it("tell everyone, and nothing when nothing changed", async () => {
    await settled();
    const told = published.length;
    expect(told).toBeGreaterThan(0);
    service.changed(STUDY);
    await settled();
    expect(published).toHaveLength(told);
  });

  it("stop when their question is no longer asked", async () => {
    pool.prompt.delete("data");
    await settled();
    const [job] = pool.open;
    edit("survey", `${SURVEY}normalise: none\n`);
    await settled();
    expect(job.signal.aborted).toBe(true);
    expect(pool.open.map((one) => one.job.fingerprint)).not.toContain(job.job.fingerprint);
    pool.finish("data");
    expect((await settled()).survey.state).toBe("current");
  });
});

describe("out of date", () => {
  it("says what changed and keeps the old finding under its own source", async () => {
    const before = await estimated();
    edit("base", "data: survey\nform: aids\n");
    const { base, matrix } = await settled();
    expect(base).toMatchObject({ state: "out of date", because: "form changed from la-aids to aids" });
    expect(base.last).toEqual(before.base.last);
    expect(base.fingerprint).not.toBe(base.last?.fingerprint);
    expect(matrix).toMatchObject({ state: "out of date", because: "base changed" });
  });

  it("says so of an upload that another took the place of", async () => {
    await estimated();
    open.db.delete(uploads).run();
    addUpload("u.csv", "1");
    service.changed(STUDY);
    const { survey, base } = await settled();
    expect(survey.state).toBe("current");
    expect(base).toMatchObject({ state: "out of date", because: "upload replaced by u.csv" });
  });

  it("is brought up to date together", async () => {
    cells.set("other", { kind: "system", source: "data: survey\nform: les\n" });
    await estimated();
    edit("base", "data: survey\nform: aids\n");
    await settled();
    await service.bringUpToDate(STUDY, "u1");
    expect(pool.open.map(({ job }) => job.specification.kind)).toEqual(["system", "system"]);
    pool.finish("system");
    pool.finish("system");
    expect(await states()).toEqual(["current", "current", "current", "current"]);
  });
});

describe("an estimation", () => {
  it("shows how far it is", async () => {
    await settled();
    await service.estimate(STUDY, "base", "u1");
    pool.report("system", { step: "iterating", iteration: 7, logLikelihood: 42.5, gradient: 0.02 });
    const { base } = await settled();
    expect(base.state).toBe("estimating");
    expect(base.progress).toMatchObject({ step: "iterating", iteration: 7, logLikelihood: 42.5 });
    expect(base.progress?.aboutMs).toBeGreaterThan(0);
  });

  it("waits for its data", async () => {
    pool.prompt.delete("data");
    await settled();
    await service.estimate(STUDY, "base", "u1");
    expect((await settled()).base.progress?.step).toBe("waiting for survey");
    pool.finish("data");
    await settled();
    pool.finish("system");
    expect((await settled()).base.state).toBe("current");
  });

  it("stores its finding under the question it was started with, though the cell was edited meanwhile", async () => {
    const before = await settled();
    await service.estimate(STUDY, "base", "u1");
    edit("base", "data: survey\nform: aids\n");
    expect((await settled()).base.state).toBe("draft");
    pool.finish("system");
    const { base } = await settled();
    expect(base).toMatchObject({ state: "out of date", because: "form changed from la-aids to aids" });
    expect(base.last).toMatchObject({ fingerprint: before.base.fingerprint, source: "data: survey\nform: la-aids\n" });
    expect(await service.finding(STUDY, base.fingerprint ?? "")).toBeUndefined();
    expect(await service.finding(STUDY, before.base.fingerprint ?? "")).toBeDefined();
    edit("base", "data: survey\nform: la-aids\n");
    expect((await settled()).base.state).toBe("current");
  });

  it("may be cancelled and asked for again", async () => {
    await settled();
    await service.estimate(STUDY, "base", "u1");
    await service.cancel(STUDY, "base");
    expect((await settled()).base).toMatchObject({ state: "draft", because: "cancelled" });
    expect(pool.open).toHaveLength(0);
    expect((await estimated()).base.state).toBe("current");
  });

  it("stops without a fault when its study is removed, and nothing of it is kept", async () => {
    await service.estimate(STUDY, "base", "u1");
    const [{ signal }] = pool.open;
    open.db.delete(studies).run();
    service.removed(STUDY);
    expect([signal.aborted, pool.open.length]).toEqual([true, 0]);
    await new Promise((later) => setTimeout(later, 20));
    expect(faults).toEqual([]);
  });

  it("ends when its cell is removed", async () => {
    await settled();
    await service.estimate(STUDY, "base", "u1");
    cells.delete("base");
    service.changed(STUDY);
    const { matrix } = await settled();
    expect(pool.open).toHaveLength(0);
    expect(matrix).toMatchObject({ state: "failed", because: "at system, before estimation" });
  });

  it("fails in words, at the place of the key", async () => {
    await settled();
    await service.estimate(STUDY, "base", "u1");
    pool.refuse("system", "form cannot be fitted.", ["form"]);
    const { base, matrix } = await settled();
    expect(base).toMatchObject({ state: "failed", because: "at form" });
    expect(base.problems).toEqual([
      { sentence: "form cannot be fitted.", key: ["form"], place: { line: 2, column: 7, from: 19, to: 26 } },
    ]);
    expect(matrix.because).toBe("waits for base, which failed at form");
    expect((await estimated()).base.state).toBe("current");
  });

  it("that the program itself fails at is reported and says so", async () => {
    await settled();
    await service.estimate(STUDY, "base", "u1");
    pool.crash("system", "out of memory");
    expect((await settled()).base.state).toBe("failed");
    expect(faults).toHaveLength(1);
  });

  it("that was interrupted says so after a restart", async () => {
    await settled();
    await service.estimate(STUDY, "base", "u1");
    service.close();
    await settled();
    pool = new FakePool();
    service = begin();
    const { base, survey } = await settled();
    expect(survey.state).toBe("current");
    expect(base).toMatchObject({ state: "draft", because: "its estimation was interrupted when the program stopped" });
    expect(pool.started).toEqual([]);
    expect((await estimated()).base.state).toBe("current");
    service.close();
    service = begin();
    expect((await settled()).base.state).toBe("current");
  });

  it("is shared by cells that ask the same", async () => {
    cells.set("same", { kind: "system", source: "# again\ndata: survey\nform: la-aids" });
    await settled();
    await service.estimate(STUDY, "base", "u1");
    await service.estimate(STUDY, "same", "u1");
    expect(pool.open).toHaveLength(1);
    pool.finish("system");
    expect(await states()).toEqual(["current", "current", "current", "current"]);
  });
});

describe("refused", () => {
  it("is an estimation of a cell with problems, of one whose data have some, and of none", async () => {
    edit("base", "data: survey\nform: aid\n");
    await expect(service.estimate(STUDY, "base", "u1")).rejects.toMatchObject({
      status: 422,
      message: /nearest to aid is aids/,
    });
    edit("base", "data: survey\nform: aids\n");
    edit("survey", SURVEY.replace("p_a", "p_x"));
    await expect(service.estimate(STUDY, "base", "u1")).rejects.toMatchObject({
      status: 409,
      message: "base waits for survey, which failed at price of a, before estimation.",
    });
    await expect(service.estimate(STUDY, "gone", "u1")).rejects.toMatchObject({ status: 404 });
  });

  it("is an estimation on data that the engine refused", async () => {
    pool.prompt.delete("data");
    await settled();
    await service.estimate(STUDY, "base", "u1");
    pool.refuse("data", "p_a of row 3 is text.", ["goods", "a", "price"]);
    const { survey, base } = await settled();
    expect(survey).toMatchObject({ state: "failed", because: "at price of a" });
    expect(base).toMatchObject({ state: "draft", because: "waits for survey, which failed at price of a" });
    await expect(service.estimate(STUDY, "base", "u1")).rejects.toMatchObject({ status: 409 });
  });
});
