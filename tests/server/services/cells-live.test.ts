import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { type OpenDatabase, openDatabase } from "../../../server/db/client.ts";
import { studies, uploadChunks, uploads, user } from "../../../server/db/schema/index.ts";
import { createPool, type JobPool } from "../../../server/jobs/pool.ts";
import { createCellService } from "../../../server/services/cells.ts";
import type { StudyStatus } from "../../../shared/schemas/status.ts";
import { suggestData } from "../../../shared/study/suggest.ts";
import { temporaryFolder } from "../../support/temporary.ts";

const STUDY = "tuna";
const TUNA = readFileSync(new URL("../../reference/fixtures/tuna-weekly.csv", import.meta.url));

/** The cell service over real worker threads and a real database; only the shared document is the test's own. */
let folder: ReturnType<typeof temporaryFolder>;
let open: OpenDatabase;
let pool: JobPool;
let service: ReturnType<typeof createCellService>;
const sources = new Map<string, { kind: string; source: string }>();
const waiting: { until: (status: StudyStatus) => boolean; done: (status: StudyStatus) => void }[] = [];

beforeAll(async () => {
  folder = temporaryFolder();
  open = openDatabase(`${folder.path}/test.sqlite`);
  pool = createPool({ databasePath: open.path, threads: 1 });
  const now = new Date();
  const person = { id: "u", name: "Ilse Marchetti", email: "ilse@vihe.example", createdAt: now, updatedAt: now };
  open.db.insert(user).values(person).run();
  open.db.insert(studies).values({ id: STUDY, title: "Tuna", createdAt: now, changedAt: now }).run();
  const upload = { id: "up", studyId: STUDY, name: "tuna.csv", bytes: TUNA.length, uploadedBy: "u", uploadedAt: now };
  open.db
    .insert(uploads)
    .values({ ...upload, state: "receiving" })
    .run();
  open.db.insert(uploadChunks).values({ uploadId: "up", position: 0, bytes: TUNA }).run();
  const parsed = await pool.parseUpload("up", () => {}, new AbortController().signal);
  open.db.update(uploads).set({ rows: parsed.rows, sha256: parsed.sha256, state: "ready" }).run();
  service = begin();
});

afterAll(async () => {
  service.close();
  await pool.close();
  open.close();
  folder.remove();
});

function begin() {
  return createCellService({
    db: open.db,
    pool,
    sourcesOf: () => [...sources].map(([name, cell], i) => ({ id: name, name, order: `${i + 1}`, ...cell })),
    publish: (_, status) => {
      for (const one of waiting.filter(({ until }) => until(status))) one.done(status);
    },
    report: (error) => {
      throw error;
    },
    restMs: 5,
  });
}

/** Resolves once what everyone is told fits. */
function toldThat(until: (status: StudyStatus) => boolean): Promise<StudyStatus> {
  return new Promise((done) => {
    waiting.push({ until, done });
  });
}
const stateOf = (name: string, state: string) => (status: StudyStatus) =>
  status.cells.some((cell) => cell.name === name && cell.state === state);

describe("a study over real threads", () => {
  it("goes from an upload to a checked matrix, each step told to everyone", async () => {
    const columns = TUNA.toString("utf8")
      .split("\n")[0]
      .split(",")
      .map((name) => ({ name, type: "number" as const }));
    sources.set("weeks", { kind: "data", source: suggestData("tuna.csv", columns) });
    sources.set("base", { kind: "system", source: "data: weeks\nform: aids\nimpose: [homogeneity, symmetry]\n" });
    sources.set("matrix", { kind: "slutsky", source: "system: base\n" });
    const prepared = toldThat(stateOf("weeks", "current"));
    service.changed(STUDY);
    await prepared;
    const matrix = toldThat(stateOf("matrix", "current"));
    await service.estimate(STUDY, "base", "u");
    const { cells } = await matrix;
    expect(cells.map(({ state }) => state)).toEqual(["current", "current", "current"]);
    const found = await service.finding(STUDY, cells[2].fingerprint ?? "");
    expect(found?.finding).toMatchObject({
      kind: "slutsky",
      pointName: "base point",
      at: { checks: { symmetry: { status: "imposed" } } },
    });
  });

  it("follows an edit of the point without an estimation", async () => {
    sources.set("matrix", { kind: "slutsky", source: "system: base\nat: {x: quantile 0.9}\n" });
    const follows = toldThat(
      (status) => status.cells[2].state === "current" && status.cells[2].last?.source.includes("0.9") === true,
    );
    service.changed(STUDY);
    const { cells } = await follows;
    const found = await service.finding(STUDY, cells[2].fingerprint ?? "");
    expect(found?.finding).toMatchObject({ pointName: "quantile 0.9 of expenditure" });
  });

  it("says at its key what the engine refuses", async () => {
    sources.set("matrix", { kind: "slutsky", source: "system: base\nat: {row: 999}\n" });
    const fails = toldThat(stateOf("matrix", "failed"));
    service.changed(STUDY);
    const { cells } = await fails;
    expect(cells[2].problems).toMatchObject([
      { sentence: "The upload has 338 rows; there is no row 999.", place: { line: 2, column: 11 } },
    ]);
  });

  it("answers from the store after a restart", async () => {
    sources.set("matrix", { kind: "slutsky", source: "system: base\n" });
    service.close();
    const computes = vi.spyOn(pool, "runCell");
    service = begin();
    const { cells } = await service.status(STUDY);
    expect(cells.map(({ state }) => state)).toEqual(["current", "current", "current"]);
    expect(computes).not.toHaveBeenCalled();
  });
});
