import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type OpenDatabase, openDatabase } from "../../../server/db/client.ts";
import { findings, studies, uploadChunks, uploadColumns, uploads } from "../../../server/db/schema/index.ts";
import { runData, runSlutsky, runSystem } from "../../../server/engine/cells/index.ts";
import { readCsv } from "../../../server/engine/columns/read-csv.ts";
import { Refusal } from "../../../server/engine/refusal.ts";
import { Cancelled } from "../../../server/engine/run.ts";
import type { CellJob, ProgressNow } from "../../../server/jobs/job.ts";
import { createPool, type JobPool } from "../../../server/jobs/pool.ts";
import { loadTable } from "../../../server/jobs/upload-tables.ts";
import { seededRandom } from "../../../shared/numerics/random.ts";
import type { SpecificationOf } from "../../../shared/schemas/cell.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { temporaryFolder } from "../../support/temporary.ts";
import { workbookParts, zipOf } from "../../support/zip.ts";

const TUNA = readFileSync(new URL("../../reference/fixtures/tuna-weekly.csv", import.meta.url));
const GOODS = [1, 2, 3, 4, 5, 6, 7].map((i) => `  brand${i}: {price: p${i}, quantity: q${i}}`).join("\n");
const data = specification("data", `upload: tuna.csv\ngoods:\n${GOODS}\ntime: week\n`);
const system = specification("system", "data: weeks\nform: aids\nimpose: [homogeneity, symmetry]\n");
const slutsky = specification("slutsky", "system: base\nat: {row: 5}\n");

let folder: ReturnType<typeof temporaryFolder>;
let open: OpenDatabase;
let pool: JobPool;
/** With one thread for cells; its threads take a while to start, so two tests share it. */
let single: JobPool;
const signal = new AbortController().signal;

beforeAll(async () => {
  folder = temporaryFolder();
  open = openDatabase(`${folder.path}/test.sqlite`);
  const now = new Date();
  open.db.insert(studies).values({ id: "s", title: "Tuna", createdAt: now, changedAt: now }).run();
  addUpload("tuna", TUNA);
  pool = createPool({ databasePath: open.path, threads: 2 });
  single = createPool({ databasePath: open.path, threads: 1 });
});

afterAll(async () => {
  await pool.close();
  await single.close();
  open.close();
  folder.remove();
});

function specification<K extends "data" | "system" | "slutsky">(kind: K, source: string) {
  const parsed = parseCell(kind, source).specification;
  if (parsed?.kind !== kind) throw new Error("the source is not sound");
  return parsed as SpecificationOf<K>;
}

function addUpload(id: string, bytes: Buffer, ending = "csv") {
  open.db
    .insert(uploads)
    .values({
      id,
      studyId: "s",
      name: `${id}.${ending}`,
      bytes: bytes.length,
      state: "receiving",
      uploadedBy: "u",
      uploadedAt: new Date(),
    })
    .run();
  const size = 10_000;
  open.db.transaction((tx) => {
    for (let from = 0; from < bytes.length; from += size) {
      tx.insert(uploadChunks)
        .values({ uploadId: id, position: from / size, bytes: bytes.subarray(from, from + size) })
        .run();
    }
  });
}

/** Rows enough for half a minute of reading; made when first asked for. */
let longTable: Buffer | undefined;
function longFile(): Buffer {
  longTable ??= Buffer.from(
    `a,b,c\n${Array.from({ length: 400_000 }, (_, i) => `${i},${i * 7},word ${i}`).join("\n")}\n`,
  );
  return longTable;
}

const job = (fingerprint: string, specification: CellJob["specification"]): CellJob => ({
  studyId: "s",
  fingerprint,
  specification,
  data: { fingerprint: "d", specification: data, uploadId: "tuna" },
  systemFingerprint: "base",
});

async function parsed(id: string) {
  const result = await pool.parseUpload(id, () => {}, signal);
  const { rows, sha256, separator, decimalComma } = result;
  open.sqlite
    .prepare("UPDATE uploads SET rows = ?, sha256 = ?, separator = ?, decimal_comma = ?, state = 'ready' WHERE id = ?")
    .run(rows, sha256, separator, decimalComma ? 1 : 0, id);
  return result;
}

/** Prices and quantities that know nothing of one another. */
function wideTable(goods: number, rows: number): string {
  const random = seededRandom(4);
  const places = Array.from({ length: goods }, (_, i) => i);
  const header = [...places.map((i) => `p${i}`), ...places.map((i) => `q${i}`)].join(",");
  const line = () => Array.from({ length: 2 * goods }, () => Math.exp(0.2 * random.normal()).toFixed(4)).join(",");
  return `${[header, ...Array.from({ length: rows }, line)].join("\n")}\n`;
}

describe("the worker threads", () => {
  it("read an upload into columns that are the file's own", async () => {
    const direct = await readCsv(
      (async function* () {
        yield TUNA;
      })(),
      "tuna.csv",
    );
    const result = await parsed("tuna");
    expect(result).toEqual({
      rows: 338,
      sha256: direct.table.sha256,
      format: "csv",
      separator: ",",
      decimalComma: false,
    });
    expect(loadTable(open.db, "tuna")).toEqual(direct.table);
  });

  it("read the sheet of a workbook that is asked for, and the first when none is", async () => {
    const sheet = (name: string, head: string, numbers: readonly number[]) => {
      const rows = numbers.map((value, at) => `<row r="${at + 2}"><c r="A${at + 2}"><v>${value}</v></c></row>`);
      const first = `<row r="1"><c r="A1" t="inlineStr"><is><t>${head}</t></is></c></row>`;
      return { name, xml: `<sheetData>${first}${rows.join("")}</sheetData>` };
    };
    const book = zipOf(workbookParts([sheet("Rows", "p1", [1.5, 2.5]), sheet("Codes", "code", [7, 8, 9])]));
    for (const [id, asked, expected] of [
      ["book", undefined, { rows: 2, sheet: "Rows", columns: [["p1", [1.5, 2.5]]] }],
      ["codes", "Codes", { rows: 3, sheet: "Codes", columns: [["code", [7, 8, 9]]] }],
    ] as const) {
      addUpload(id, Buffer.from(book), "xlsx");
      const { rows, sha256, ...read } = await pool.parseUpload(id, () => {}, signal, asked);
      open.sqlite.prepare("UPDATE uploads SET rows = ?, sha256 = ? WHERE id = ?").run(rows, sha256, id);
      const columns = loadTable(open.db, id).columns.map((column) => [
        column.name,
        column.type === "number" ? [...column.values] : [],
      ]);
      expect({ rows, columns, ...read }).toEqual({ ...expected, format: "xlsx", sheets: ["Rows", "Codes"] });
    }
  });

  it("refuse a file with its problems, and keep nothing of it", async () => {
    addUpload("ragged", Buffer.from("a,b\n1,2\n3\n"));
    const refusal = await pool.parseUpload("ragged", () => {}, signal).catch((error: unknown) => error);
    expect(refusal).toBeInstanceOf(Refusal);
    expect((refusal as Refusal).problems[0]).toMatchObject({ row: 2 });
    const kept = open.db.select({ id: uploadColumns.uploadId }).from(uploadColumns).all();
    expect(kept.map(({ id }) => id)).not.toContain("ragged");
    expect(kept.map(({ id }) => id)).toContain("tuna");
  });

  it("find what the engine finds on this thread, to the last digit", async () => {
    const prepared = runData(data, loadTable(open.db, "tuna"));
    const fitted = runSystem(system, prepared);
    const matrix = runSlutsky(slutsky, fitted, prepared);
    const steps = new Set<string>();
    const hear = ({ step }: ProgressNow) => void steps.add(step);
    const found = await pool.runCell(job("d", data), hear, signal);
    expect(JSON.parse(found.finding)).toEqual(prepared.finding);
    const estimated = await pool.runCell(job("base", system), hear, signal);
    expect(JSON.parse(estimated.finding)).toEqual(JSON.parse(JSON.stringify(fitted)));
    open.db
      .insert(findings)
      .values({
        studyId: "s",
        fingerprint: "base",
        kind: "system",
        finding: estimated.finding,
        tookMs: 1,
        foundAt: new Date(),
      })
      .run();
    const checked = await pool.runCell(job("matrix", slutsky), hear, signal);
    expect(JSON.parse(checked.finding)).toEqual(JSON.parse(JSON.stringify(matrix)));
    expect(steps).toContain("checking rows");
    expect(estimated.tookMs).toBeGreaterThan(0);
  });

  it("bring a refusal over with its problems", async () => {
    const left = specification("slutsky", "system: base\nat: {row: 339}\n");
    const refusal = await pool.runCell(job("m", left), () => {}, signal).catch((error: unknown) => error);
    expect(refusal).toBeInstanceOf(Refusal);
    expect((refusal as Refusal).problems).toEqual([
      { sentence: "The upload has 338 rows; there is no row 339.", key: ["at", "row"], row: 339 },
    ]);
  });

  it("compute cells while a file is read, neither waiting for the other", async () => {
    addUpload("meanwhile", longFile());
    const stopper = new AbortController();
    let isRead = false;
    let reading: Promise<unknown> = Promise.resolve();
    await new Promise<void>((begun) => {
      reading = single
        .parseUpload("meanwhile", () => begun(), stopper.signal)
        .catch((error: unknown) => error)
        .finally(() => {
          isRead = true;
        });
    });
    await single.runCell(job("d", data), () => {}, signal);
    expect(isRead).toBe(false);
    stopper.abort();
    await reading;
  });

  it("compute what is soon done while an estimation takes the only thread for cells", async () => {
    const goods = 16;
    addUpload("wide", Buffer.from(wideTable(goods, 600)));
    await parsed("wide");
    const mapped = Array.from({ length: goods }, (_, i) => `  g${i}: {price: p${i}, quantity: q${i}}`).join("\n");
    const wide = specification("data", `upload: wide.csv\ngoods:\n${mapped}\n`);
    // So many replicates that it is never done before it is stopped, on whatever machine.
    const endless = specification(
      "system",
      "data: weeks\nform: aids\nstandard errors: {bootstrap: rows, replicates: 10000}\n",
    );
    const long = { ...job("wide", endless), data: { fingerprint: "w", specification: wide, uploadId: "wide" } };
    const stopper = new AbortController();
    let isFound = false;
    let estimating: Promise<unknown> = Promise.resolve();
    await new Promise<void>((begun) => {
      estimating = single
        .runCell(long, ({ step }) => step === "iterating" && begun(), stopper.signal)
        .catch((error: unknown) => error)
        .finally(() => {
          isFound = true;
        });
    });
    await single.runCell(job("d", data), () => {}, signal);
    expect(isFound).toBe(false);
    stopper.abort();
    await estimating;
  });

  it("stop within a row's time when cancelled, and go on with the next", async () => {
    addUpload("long", longFile());
    const stopper = new AbortController();
    let ended: Promise<unknown> = Promise.resolve();
    await new Promise<void>((begun) => {
      ended = pool.parseUpload("long", () => begun(), stopper.signal).catch((error: unknown) => error);
    });
    const asked = performance.now();
    stopper.abort();
    expect(await ended).toBeInstanceOf(Cancelled);
    await pool.runCell(job("d", data), () => {}, signal);
    expect(performance.now() - asked).toBeLessThan(4_000);
    await expect(pool.runCell(job("d", data), () => {}, stopper.signal)).rejects.toBeInstanceOf(Cancelled);
  });
});
