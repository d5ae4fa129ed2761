import { and, eq } from "drizzle-orm";
import type { Finding } from "../../shared/schemas/cell.ts";
import { type PriceChangeFinding, priceChangeFinding } from "../../shared/schemas/price-change.ts";
import { type SystemFinding, systemFinding } from "../../shared/schemas/system.ts";
import type { Database } from "../db/client.ts";
import { findings } from "../db/schema/findings.ts";
import {
  runData,
  runElasticities,
  runFigure,
  runPriceChange,
  runSlutsky,
  runSystem,
  runTests,
} from "../engine/cells/index.ts";
import type { PreparedData, UploadTable } from "../engine/columns/prepared-data.ts";
import { Refusal } from "../engine/refusal.ts";
import type { RunControl } from "../engine/run.ts";
import type { CellJob, CellResult } from "./job.ts";
import { Recent } from "./recent.ts";
import { bytesOf, loadTable } from "./upload-tables.ts";

const MEGABYTE = 1024 * 1024;

/** What a worker keeps between jobs: uploads as read, and data cells' rows ready for estimation. */
export class WorkerMemory {
  readonly tables = new Recent<UploadTable>(256 * MEGABYTE);
  /** By the data cell's fingerprint. */
  readonly prepared = new Recent<PreparedData>(512 * MEGABYTE);
}

/** Computes a cell's finding. Errors: `Refusal`, `Cancelled`. */
export function runCellJob(job: CellJob, db: Database, memory: WorkerMemory, control: RunControl): CellResult {
  const started = performance.now();
  const finding = find(job, db, memory, control);
  return { finding: JSON.stringify(finding), tookMs: performance.now() - started };
}

function find(job: CellJob, db: Database, memory: WorkerMemory, control: RunControl): Finding {
  const { specification } = job;
  if (specification.kind === "text") throw new Error("a text is read, not computed");
  const data = prepared(job, db, memory, control);
  if (specification.kind === "data") return data.finding;
  if (specification.kind === "system") return runSystem(specification, data, control);
  if (specification.kind === "tests") {
    const { systemSpecification } = job;
    const system = systemSpecification && { specification: systemSpecification, finding: storedSystem(job, db) };
    return runTests(specification, data, system, control);
  }
  if (specification.kind === "figure") {
    if (specification["price change"] !== undefined) {
      return runFigure(specification, storedPriceChange(job, db), data, control);
    }
    const basis = specification.system === undefined ? undefined : storedSystem(job, db);
    return runFigure(specification, basis, data, control);
  }
  const system = storedSystem(job, db);
  if (specification.kind === "elasticities") {
    const broader = job.broader && {
      finding: storedSystem({ ...job.broader, studyId: job.studyId }, db),
      data: prepared(job.broader, db, memory, control),
    };
    return runElasticities(specification, system, data, control, broader);
  }
  if (specification.kind === "price change") return runPriceChange(specification, system, data, control);
  return runSlutsky(specification, system, data, control);
}

export function prepared(
  { data }: Pick<CellJob, "data">,
  db: Database,
  memory: WorkerMemory,
  control: RunControl,
): PreparedData {
  const known = memory.prepared.get(data.fingerprint);
  if (known) return known;
  const table = tableOf(data.uploadId, db, memory);
  const fresh = runData(data.specification, table, control);
  const columns = 2 * fresh.goods.length + fresh.numeric.size + (fresh.labelled?.size ?? 0) / 2 + 3;
  memory.prepared.set(data.fingerprint, fresh, 8 * fresh.rows * columns);
  return fresh;
}

export function tableOf(uploadId: string, db: Database, memory: WorkerMemory): UploadTable {
  const table = memory.tables.get(uploadId) ?? loadTable(db, uploadId);
  memory.tables.set(uploadId, table, bytesOf(table));
  return table;
}

function storedSystem(
  { studyId, systemFingerprint }: Pick<CellJob, "studyId" | "systemFingerprint">,
  db: Database,
): SystemFinding {
  return systemFinding.parse(storedFinding(studyId, systemFingerprint, "system", db));
}

function storedPriceChange({ studyId, priceChangeFingerprint }: CellJob, db: Database): PriceChangeFinding {
  return priceChangeFinding.parse(storedFinding(studyId, priceChangeFingerprint, "price change", db));
}

function storedFinding(studyId: string, fingerprint: string | undefined, kind: string, db: Database): unknown {
  const where = and(eq(findings.studyId, studyId), eq(findings.fingerprint, fingerprint ?? ""));
  const stored = db.select({ finding: findings.finding }).from(findings).where(where).get();
  if (!stored) throw new Refusal(`The ${kind} that this cell reads has no finding yet.`);
  return JSON.parse(stored.finding);
}
