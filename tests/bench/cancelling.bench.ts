import { setTimeout as after } from "node:timers/promises";
import { openDatabase } from "../../server/db/client.ts";
import { studies, uploadChunks, uploads } from "../../server/db/schema/index.ts";
import { Cancelled } from "../../server/engine/run.ts";
import type { CellJob, ProgressNow } from "../../server/jobs/job.ts";
import { createPool } from "../../server/jobs/pool.ts";
import type { SpecificationOf } from "../../shared/schemas/cell.ts";
import { parseCell } from "../../shared/study/parse-cell.ts";
import { purchasesCsv } from "../support/purchases-csv.ts";
import { temporaryFolder } from "../support/temporary.ts";
import { say } from "./timing.ts";

/**
 * How long a person waits for a cancelled estimation of very many goods to stop, from the wish to the outcome and
 * through the pool, at moments from its start into its iterations. What the thread has not heard within the grace it
 * is given is ended with it: the next job then finds a new thread, whose answer is timed too.
 */
const GOODS = 45;
const ROWS = 3000;
const SECONDS = [0.2, 1, 2, 4, 7, 11, 16, 22, 30, 45, 60];
const MOST_MS = 2000;

const folder = temporaryFolder();
const open = openDatabase(`${folder.path}/bench.sqlite`);
const pool = createPool({ databasePath: open.path, threads: 1 });
const never = new AbortController().signal;
try {
  await upload("wide", Buffer.from(purchasesCsv({ goods: GOODS, rows: ROWS, seed: 5 })));
  for (const form of ["aids", "quaids"]) await benchCancelling(form);
} finally {
  await pool.close();
  open.close();
  folder.remove();
}

async function benchCancelling(form: string): Promise<void> {
  const mapped = Array.from({ length: GOODS }, (_, i) => `  g${i + 1}: {price: p${i + 1}, quantity: q${i + 1}}`);
  const data = specification("data", `upload: wide.csv\ngoods:\n${mapped.join("\n")}\n`);
  const system = specification("system", `data: rows\nform: ${form}\nimpose: [homogeneity, symmetry]\n`);
  const job = (cell: CellJob["specification"], fingerprint: string): CellJob => ({
    studyId: "s",
    fingerprint,
    specification: cell,
    data: { fingerprint: "rows", specification: data, uploadId: "wide" },
  });
  let longestMs = 0;
  for (const seconds of SECONDS) {
    // The rows stand ready, as they do for someone who has just looked at them.
    await pool.runCell(job(data, "rows"), () => {}, never);
    const stopper = new AbortController();
    let step = "";
    const hear = (now: ProgressNow) => {
      step = now.step;
    };
    const outcome = pool.runCell(job(system, form), hear, stopper.signal).catch((error: unknown) => error);
    await after(1000 * seconds);
    const during = step;
    const asked = performance.now();
    const before = process.cpuUsage();
    stopper.abort();
    const ended = await outcome;
    const ms = Math.round(performance.now() - asked);
    longestMs = Math.max(longestMs, ms);
    const { user, system: inSystem } = process.cpuUsage(before);
    await pool.runCell(job(data, "rows"), () => {}, never);
    say({
      figure: "cancelling",
      form,
      goods: GOODS,
      rows: ROWS,
      afterSeconds: seconds,
      during,
      cancelled: ended instanceof Cancelled,
      ms,
      processorMs: Math.round((user + inSystem) / 1000),
      atMostMs: MOST_MS,
      nextJobMs: Math.round(performance.now() - asked - ms),
    });
  }
  say({ figure: "cancelling", form, goods: GOODS, rows: ROWS, what: "longest", ms: longestMs, atMostMs: MOST_MS });
}

function specification<K extends "data" | "system">(kind: K, source: string): SpecificationOf<K> {
  const parsed = parseCell(kind, source).specification;
  if (parsed?.kind !== kind) throw new Error(`the source of the ${kind} cell is not sound`);
  return parsed as SpecificationOf<K>;
}

async function upload(id: string, bytes: Buffer): Promise<void> {
  const now = new Date();
  open.db.insert(studies).values({ id: "s", title: "Cancelling", createdAt: now, changedAt: now }).run();
  const row = { id, studyId: "s", name: `${id}.csv`, bytes: bytes.length, uploadedBy: "u", uploadedAt: now };
  open.db
    .insert(uploads)
    .values({ ...row, state: "receiving" })
    .run();
  open.db.insert(uploadChunks).values({ uploadId: id, position: 0, bytes }).run();
  const { rows, sha256, separator } = await pool.parseUpload(id, () => {}, never);
  open.sqlite
    .prepare("UPDATE uploads SET rows = ?, sha256 = ?, separator = ?, decimal_comma = 0, state = 'ready' WHERE id = ?")
    .run(rows, sha256, separator, id);
}
