import { copyFileSync, readFileSync, writeFileSync } from "node:fs";
import { strFromU8, unzipSync } from "fflate";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { replicateBundle } from "../../../server/bin/replicate-bundle.ts";
import type { Replication } from "../../../server/bin/replication.ts";
import { isReplicated, replicationInWords } from "../../../server/bin/replication-words.ts";
import { type OpenDatabase, openDatabase } from "../../../server/db/client.ts";
import { studies, studyMembers, uploadChunks, uploads, user } from "../../../server/db/schema/index.ts";
import { QUIET } from "../../../server/engine/run.ts";
import { createPool, type JobPool } from "../../../server/jobs/pool.ts";
import { createAccess } from "../../../server/services/access.ts";
import { createCellService } from "../../../server/services/cells.ts";
import {
  createReplicationBundleService,
  type ReplicationBundleService,
} from "../../../server/services/replication-bundles.ts";
import { suggestData } from "../../../shared/study/suggest.ts";
import { temporaryFolder } from "../../support/temporary.ts";

/** A bundle as the workspace writes it, over real threads, and the command that takes it apart again. */
const STUDY = "tuna";
const TUNA = readFileSync(new URL("../../reference/fixtures/tuna-weekly.csv", import.meta.url));
const OWNER = { id: "ilse-account" };
const ADDRESS = "ilse@vihe.example";
const SYMMETRIC = "impose: [homogeneity, symmetry]\n";
const SOURCES = new Map([
  ["base", ["system", `data: weeks\nform: aids\n${SYMMETRIC}`]],
  ["robust", ["system", `data: weeks\nform: la-aids\nstandard errors: heteroskedastic\n${SYMMETRIC}`]],
  ["curved", ["system", `data: weeks\nform: quaids\n${SYMMETRIC}`]],
  ["matrix", ["slutsky", "system: base\n"]],
  ["week 12", ["slutsky", "system: base\nat: {row: 12}\n"]],
  ["eta", ["elasticities", "system: base\n"]],
  ["laws", ["tests", "system: base\n"]],
  ["levy", ["price change", "system: base\nprices: {good1: {ad valorem: 20}}\n"]],
  ["curve", ["figure", "system: base\nshow: engel curves\nat: {row: 12}\n"]],
  ["fit", ["figure", "system: base\nshow: fit of shares\n"]],
  ["argument", ["text", "Brand 1 has {base: eta, good1}.\n"]],
  ["draft", ["system", "data: weeks\nform: no such form\n"]],
  ["draft matrix", ["slutsky", "system: draft\n"]],
]);

const folder = temporaryFolder();
let open: OpenDatabase;
let pool: JobPool;
let cells: ReturnType<typeof createCellService>;
let bundles: ReplicationBundleService;
const recorded: unknown[] = [];

beforeAll(async () => {
  open = openDatabase(`${folder.path}/test.sqlite`);
  pool = createPool({ databasePath: open.path, threads: 1 });
  await store();
  const columns = TUNA.toString("utf8").split("\n")[0].split(",");
  const weeks = suggestData(
    "tuna.csv",
    columns.map((name) => ({ name, type: "number" as const })),
  );
  const all = [["weeks", "data", weeks], ...[...SOURCES].map(([name, [kind, source]]) => [name, kind, source])];
  const sourcesOf = () =>
    all.map(([name, kind, source], i) => ({ id: `id of ${name}`, name, kind, source, order: `a${i + 10}` }));
  let told = () => {};
  cells = createCellService({ db: open.db, pool, sourcesOf, publish: () => told(), report: fail, restMs: 1 });
  bundles = createReplicationBundleService({
    db: open.db,
    access: createAccess(open.db),
    cells,
    sourcesOf,
    writeBundle: (job, signal) => pool.writeBundle(job, signal),
    record: (note) => void recorded.push(note),
    program: "Tangency test",
  });
  await cells.bringUpToDate(STUDY, OWNER.id);
  for (let isDone = false; !isDone; ) {
    const change = new Promise<void>((heard) => {
      told = heard;
    });
    isDone = (await cells.status(STUDY)).cells.every(({ state }) => state !== "estimating" && state !== "out of date");
    if (!isDone) await change;
  }
});

afterAll(async () => {
  cells?.close();
  await pool.close();
  open.close();
  folder.remove();
});

function fail(error: unknown): never {
  throw error;
}

async function store(): Promise<void> {
  const now = new Date();
  const person = { id: OWNER.id, name: "Ilse Marchetti", email: ADDRESS, createdAt: now, updatedAt: now };
  open.db.insert(user).values(person).run();
  open.db.insert(studies).values({ id: STUDY, title: "Tuna by the week", createdAt: now, changedAt: now }).run();
  open.db.insert(studyMembers).values({ studyId: STUDY, userId: OWNER.id, role: "owner", addedAt: now }).run();
  const upload = {
    id: "up",
    studyId: STUDY,
    name: "tuna.csv",
    bytes: TUNA.length,
    uploadedBy: OWNER.id,
    uploadedAt: now,
  };
  open.db
    .insert(uploads)
    .values({ ...upload, state: "receiving" })
    .run();
  open.db.insert(uploadChunks).values({ uploadId: "up", position: 0, bytes: TUNA }).run();
  const { rows, sha256 } = await pool.parseUpload("up", () => {}, new AbortController().signal);
  open.db.update(uploads).set({ rows, sha256, state: "ready", version: 1 }).run();
}

/** Makes a bundle and keeps it under a name. */
async function made(data: "included" | "withheld"): Promise<string> {
  const { path, remove, name } = await bundles.make(OWNER, STUDY, { data }, new AbortController().signal);
  expect(name).toBe("replication-tuna-by-the-week.zip");
  const kept = `${folder.path}/${data}.zip`;
  copyFileSync(path, kept);
  await remove();
  return kept;
}

/** By another unpacker than the product's own. */
const unpacked = (path: string) => unzipSync(readFileSync(path));
const unzipped = (path: string, part: string) => strFromU8(unpacked(path)[part]);
const partsOf = (path: string) => Object.keys(unpacked(path));
const cellOf = ({ cells }: Replication, name: string) => cells.find((cell) => cell.name === name)!;

describe("a bundle with its data", () => {
  let path: string;
  beforeAll(async () => {
    path = await made("included");
  });

  it("holds specification, findings, tables, coefficients, methods and data, and opens with any unpacker", () => {
    expect(partsOf(path)).toEqual(
      expect.arrayContaining([
        "study.yaml",
        "findings/week_12.json",
        "tables/base.csv",
        "tables/base.tex",
        "coefficients/base.csv",
        "methods/base.txt",
        "methods/base.bib",
        "data/tuna.csv",
        "README.txt",
        "bundle.json",
      ]),
    );
    expect(unzipped(path, "data/tuna.csv")).toBe(TUNA.toString("utf8"));
    const { leftOut } = JSON.parse(unzipped(path, "bundle.json"));
    expect(leftOut.map(({ name }: { name: string }) => name)).toEqual(["draft", "draft matrix"]);
  });

  it("is estimated again to the last bit", async () => {
    const replication = await replicateBundle(path, [], QUIET);
    for (const { name, from, compared } of replication.cells) {
      expect([name, from]).toEqual([name, "data"]);
      if (name === "argument") continue;
      expect(compared!.numbers, name).toBeGreaterThan(10);
      expect({ ...compared, numbers: 0, same: 0 }, name).toEqual({
        numbers: 0,
        same: 0,
        apart: [],
        apartCount: 0,
        unlike: [],
        unlikeCount: 0,
      });
    }
    expect(replicationInWords(replication, "Tangency test")).toMatch(
      /^base +system: .* all the same to the last bit\.$/m,
    );
    expect(isReplicated(replication)).toBe(true);
  });

  it("says which numbers are others, by how many digits, where the data are others", async () => {
    const other = `${folder.path}/tuna.csv`;
    const [head, first, ...rest] = TUNA.toString("utf8").split("\n");
    const fields = first.split(",");
    writeFileSync(other, [head, [...fields.slice(0, -1), Number(fields.at(-1)) * 1.001].join(","), ...rest].join("\n"));
    const replication = await replicateBundle(path, [other], QUIET);
    expect(isReplicated(replication)).toBe(false);
    expect(replication.data[0].sha256).not.toBe(replication.data[0].expected);
    const { compared } = cellOf(replication, "base");
    expect(compared!.apartCount).toBeGreaterThan(20);
    expect(compared!.apart[0].digits).toBeLessThan(8);
    expect(replicationInWords(replication, "now")).toMatch(/ANOTHER FILE, given[\s\S]*DIFFER within 8 digits/);
  });

  it("refuses a file that it does not name, and a bundle cut short", async () => {
    const stray = `${folder.path}/stray.csv`;
    writeFileSync(stray, "p1\n1\n");
    const tuna = `${folder.path}/data-of-the-tuna.csv`;
    writeFileSync(tuna, TUNA);
    await expect(replicateBundle(path, [tuna, stray], QUIET)).rejects.toThrow(
      "stray.csv is none of the 1 files that the bundle names: tuna.csv.",
    );
    writeFileSync(stray, readFileSync(path).subarray(0, 5_000));
    await expect(replicateBundle(stray, [], QUIET)).rejects.toThrow("The bundle is cut short");
  });

  it("leaves no address, account or path of whoever made it", () => {
    for (const part of partsOf(path)) {
      const text = unzipped(path, part);
      for (const told of [ADDRESS, OWNER.id, "Ilse", folder.path, "id of "])
        expect(text, `${told} in ${part}`).not.toContain(told);
    }
    expect(recorded.at(-1)).toMatchObject({ action: "replication bundle made", subject: "data included" });
  });
});

describe("a bundle without its data", () => {
  let path: string;
  beforeAll(async () => {
    path = await made("withheld");
  });

  it("holds moments in place of rows, and of no single row anything", () => {
    const parts = partsOf(path);
    expect(parts.filter((part) => part.startsWith("data/"))).toEqual([]);
    expect(parts).toContain("moments/base.json");
    const { leftOut, cells } = JSON.parse(unzipped(path, "bundle.json"));
    for (const one of ["week 12", "curve"]) {
      const because = leftOut.find(({ name }: { name: string }) => name === one)?.because;
      expect(because, one).toMatch(/row 12.*one household/);
    }
    expect(parts).toContain("findings/fit.json");
    expect(cells.find(({ name }: { name: string }) => name === "curved").moments.absent).toMatch(
      /move with its coefficients/,
    );
    for (const part of parts.filter((part) => part.startsWith("findings/"))) {
      for (const key of ["brokenRows", "firstRows", "rowNumbers", "cycle", "priceRange", "unseen"]) {
        expect(unzipped(path, part), `${key} in ${part}`).not.toContain(`"${key}"`);
      }
    }
  });

  it("gives the coefficients from the moments and the matrix from the coefficients", async () => {
    const replication = await replicateBundle(path, [], QUIET);
    const base = cellOf(replication, "base");
    expect(base).toMatchObject({ from: "moments", compared: { apartCount: 0, unlikeCount: 0 } });
    const size = Math.sqrt(base.compared!.numbers + 0.25) - 0.5;
    expect(size, "k coefficients and k² covariances").toBe(Math.round(size));
    expect(cellOf(replication, "robust")).toMatchObject({
      from: "moments",
      because: expect.stringMatching(/needs the rows/),
    });
    expect(cellOf(replication, "matrix")).toMatchObject({
      from: "coefficients",
      compared: { apartCount: 0, unlikeCount: 0 },
    });
    expect(cellOf(replication, "curved").because).toMatch(/move with its coefficients/);
    expect(isReplicated(replication)).toBe(false);
    expect(replicationInWords(replication, "now")).toMatch(/could not be checked; the rest agrees\.\n$/);
  });

  it("is estimated again in full by whoever has the file", async () => {
    const given = `${folder.path}/weeks-of-tuna.csv`;
    writeFileSync(given, TUNA);
    const replication = await replicateBundle(path, [given], QUIET);
    expect(replication.data[0]).toMatchObject({ standing: "given" });
    expect(replicationInWords(replication, "now")).toMatch(/Everything agrees\.\n$/);
  });
});
