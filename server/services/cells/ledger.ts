import type { LastFinding } from "../../../shared/study/states.ts";
import type { Database } from "../../db/client.ts";
import {
  beginEstimation,
  type EstimationRow,
  endEstimation,
  estimationsOf,
  foundAmong,
  insertFinding,
  lastFindings,
  lastUploads,
  setLastFinding,
} from "../../db/queries/findings.ts";
import type { CellResult } from "../../jobs/job.ts";
import type { RunningJob } from "./running-jobs.ts";
import type { Snapshot } from "./snapshot.ts";

/** A study's findings: which questions are answered, and which answer each cell last had. */
export class Ledger {
  readonly #db: Database;
  readonly #studyId: string;

  constructor(db: Database, studyId: string) {
    this.#db = db;
    this.#studyId = studyId;
  }

  /** Of these fingerprints, those that have a finding. */
  found(fingerprints: readonly string[]): Set<string> {
    return new Set(foundAmong(this.#db, this.#studyId, fingerprints).map(({ fingerprint }) => fingerprint));
  }

  /** By cell id. */
  last(): Map<string, LastFinding> {
    return new Map(
      lastFindings(this.#db, this.#studyId).map(({ cellId, fingerprint, source, foundAt, tookMs, by }) => [
        cellId,
        { fingerprint, source, at: foundAt.toISOString(), tookMs, ...(by !== null && { by }) },
      ]),
    );
  }

  /** By cell id: the SHA-256 of the upload its last finding rested on, where that is known. */
  lastUploads(): Map<string, string> {
    return lastUploads(this.#db, this.#studyId);
  }

  /** Under the fingerprint its job was started with, whatever the cell asks by now. */
  store({ job, cellId, source, userId }: Pick<RunningJob, "job" | "cellId" | "source" | "userId">, result: CellResult) {
    const foundAt = new Date();
    const { fingerprint, specification } = job;
    const { finding, tookMs } = result;
    const studyId = this.#studyId;
    insertFinding(this.#db, { studyId, fingerprint, kind: specification.kind, finding, tookMs, foundAt });
    const { uploadSha256 } = job.data;
    setLastFinding(this.#db, {
      studyId,
      cellId,
      fingerprint,
      source,
      userId: userId ?? null,
      uploadSha256,
      at: foundAt,
    });
  }

  /** Cells whose question turns out to be answered already now have that answer. */
  remember(snapshot: Snapshot): void {
    const { cells, fingerprints } = snapshot;
    const last = this.last();
    const found = this.found([...fingerprints.values()]);
    for (const cell of cells) {
      const { id, source } = cell;
      const fingerprint = fingerprints.get(id);
      if (!fingerprint || !found.has(fingerprint) || last.get(id)?.fingerprint === fingerprint) continue;
      const uploadSha256 = snapshot.uploadBelow(cell)?.sha256;
      const row = {
        studyId: this.#studyId,
        cellId: id,
        fingerprint,
        source,
        userId: null,
        uploadSha256,
        at: new Date(),
      };
      setLastFinding(this.#db, row);
    }
  }

  interrupted(): EstimationRow[] {
    return estimationsOf(this.#db, this.#studyId);
  }

  begin(cellId: string, fingerprint: string): void {
    beginEstimation(this.#db, { studyId: this.#studyId, cellId, fingerprint, startedAt: new Date() });
  }

  end(fingerprint: string): void {
    endEstimation(this.#db, this.#studyId, fingerprint);
  }
}
