import type { Problem } from "../../../shared/schemas/problem.ts";
import type { CellStatus, StudyStatus } from "../../../shared/schemas/status.ts";
import type { ResolvedCell } from "../../../shared/study/resolve.ts";
import { cellStatuses } from "../../../shared/study/states.ts";
import type { Database } from "../../db/client.ts";
import { conflict, notFound, refused } from "../../errors.ts";
import type { CellJob } from "../../jobs/job.ts";
import type { JobPool } from "../../jobs/pool.ts";
import type { SourcesOf } from "../ports.ts";
import type { Durations } from "./durations.ts";
import { Ledger } from "./ledger.ts";
import { type Ending, RunningJobs } from "./running-jobs.ts";
import { Snapshot } from "./snapshot.ts";
import { studyUploads } from "./study-uploads.ts";

interface Parts {
  readonly studyId: string;
  readonly db: Database;
  readonly pool: Pick<JobPool, "runCell">;
  readonly durations: Durations;
  readonly sources: () => ReturnType<SourcesOf>;
  readonly publish: (status: StudyStatus) => void;
  readonly report: (error: unknown) => void;
}

const MILLISECONDS_BETWEEN_REPORTS = 200;

/**
 * One study's cells: looks at them whenever something changed, answers from the ledger, starts what may
 * start, and tells everyone. What is known of a question (failed, stopped, found) is kept under its
 * fingerprint, so that nothing is ever said of a question that was not asked.
 */
export class Conductor {
  readonly #parts: Parts;
  readonly #ledger: Ledger;
  readonly #jobs: RunningJobs;
  readonly #failed = new Map<string, readonly Problem[]>();
  readonly #stopped = new Map<string, string>();
  /** Cells that someone has asked to estimate, with who did: they start once what they read is current. */
  readonly #wanted = new Map<string, string>();
  #snapshot: Snapshot | undefined;
  #refreshing: Promise<void> | undefined;
  #again = false;
  #published = "";
  #report: NodeJS.Timeout | undefined;
  #closed = false;

  constructor(parts: Parts) {
    this.#parts = parts;
    this.#ledger = new Ledger(parts.db, parts.studyId);
    this.#jobs = new RunningJobs(parts.pool);
    for (const { fingerprint } of this.#ledger.interrupted()) {
      this.#stopped.set(fingerprint, "its estimation was interrupted when the program stopped");
    }
  }

  get isReady(): boolean {
    return this.#snapshot !== undefined;
  }

  /** Looks at the study again; asked twice at once, it looks a second time after the first. */
  refresh(): Promise<void> {
    this.#again = true;
    this.#refreshing ??= this.#refresh().finally(() => {
      this.#refreshing = undefined;
    });
    return this.#refreshing;
  }

  async #refresh(): Promise<void> {
    while (this.#again && !this.#closed) {
      this.#again = false;
      const sources = await this.#parts.sources();
      const { db, studyId } = this.#parts;
      this.#snapshot = new Snapshot(sources, studyUploads(db, studyId));
      this.#advance();
    }
  }

  status(): StudyStatus {
    const { studyId, durations } = this.#parts;
    const { cells, fingerprints } = this.#read();
    const aboutMs = new Map<string, number>();
    const running = this.#jobs.progress();
    for (const cell of cells) {
      const work = this.#read().work(cell);
      if (cell.specification?.kind !== "system" || !work) continue;
      const about = durations.about(cell.specification, work);
      aboutMs.set(cell.id, about);
      const fingerprint = fingerprints.get(cell.id);
      if (!this.#wanted.has(cell.id) || !fingerprint || running.has(fingerprint)) continue;
      running.set(fingerprint, { step: `waiting for ${cell.specification.data}`, elapsedMs: 0, aboutMs: about });
    }
    const found = this.#ledger.found([...fingerprints.values()]);
    const last = this.#ledger.last();
    const replaced = this.#read().replacedUploads(this.#ledger.lastUploads());
    const [failed, stopped] = [this.#failed, this.#stopped];
    return {
      studyId,
      cells: cellStatuses({ cells, fingerprints, found, running, failed, stopped, last, aboutMs, replaced }),
    };
  }

  async estimate(cellId: string, userId: string): Promise<void> {
    await this.refresh();
    const status = this.#statusOf(cellId);
    if (status.state === "current" || status.state === "estimating") return;
    if (!status.fingerprint) {
      const [problem] = status.problems;
      if (problem) throw refused(problem.sentence, status.problems);
      throw conflict(`${status.name} ${status.because ?? "waits for a cell it reads"}.`);
    }
    this.#forget(status.fingerprint);
    // A new question of a cell puts an end to the one it asked before.
    for (const running of this.#jobs.all()) {
      if (running.cellId === cellId) this.#jobs.stop(running, "superseded");
    }
    if (status.kind === "system") this.#wanted.set(cellId, userId);
    this.#advance();
    const now = this.#statusOf(cellId);
    if (now.state !== "estimating" && now.state !== "current") {
      throw conflict(`${now.name} ${now.because ?? "cannot be estimated now"}.`);
    }
  }

  /** What a data cell reads and asks. */
  dataOf(cellId: string): CellJob["data"] | undefined {
    const snapshot = this.#read();
    const cell = snapshot.cell(cellId);
    return cell?.kind === "data" ? snapshot.job(this.#parts.studyId, cell)?.data : undefined;
  }

  async cancel(cellId: string): Promise<void> {
    if (!this.isReady) await this.refresh();
    const fingerprint = this.#read().fingerprints.get(cellId);
    this.#wanted.delete(cellId);
    for (const running of this.#jobs.all()) {
      if (running.cellId !== cellId && running.job.fingerprint !== fingerprint) continue;
      this.#jobs.stop(running, "cancelled");
      this.#stopped.set(running.job.fingerprint, "cancelled");
    }
    this.#publish();
  }

  /** Estimates every system that is a draft or out of date and has no problem. */
  async bringUpToDate(userId: string): Promise<void> {
    await this.refresh();
    for (const { cellId, kind, state, fingerprint } of this.status().cells) {
      if (kind !== "system" || !fingerprint || (state !== "draft" && state !== "out of date")) continue;
      this.#forget(fingerprint);
      this.#wanted.set(cellId, userId);
    }
    this.#advance();
  }

  close(): void {
    this.#closed = true;
    clearTimeout(this.#report);
    for (const running of this.#jobs.all()) running.controller.abort();
  }

  #read(): Snapshot {
    if (!this.#snapshot) throw new Error("the study has not been read yet");
    return this.#snapshot;
  }

  #statusOf(cellId: string): CellStatus {
    const status = this.status().cells.find((cell) => cell.cellId === cellId);
    if (!status) throw notFound("There is no such cell in this study.");
    return status;
  }

  #forget(fingerprint: string): void {
    this.#failed.delete(fingerprint);
    this.#stopped.delete(fingerprint);
  }

  /** Everything that follows from the study as it stands: what is answered, what stops, what starts. */
  #advance(): void {
    const snapshot = this.#read();
    this.#stopOutdated(snapshot);
    this.#ledger.remember(snapshot);
    const found = this.#ledger.found([...snapshot.fingerprints.values()]);
    for (const cell of snapshot.cells) this.#startIfDue(cell, snapshot, found);
    this.#publish();
  }

  #stopOutdated(snapshot: Snapshot): void {
    const asked = new Set(snapshot.fingerprints.values());
    for (const running of this.#jobs.all()) {
      if (asked.has(running.job.fingerprint)) continue;
      // A long estimation goes on while its cell is being edited: its answer is kept under its own question.
      const isLong = running.job.specification.kind === "system";
      if (!isLong || !snapshot.cell(running.cellId)) this.#jobs.stop(running, "superseded");
    }
  }

  #startIfDue(cell: ResolvedCell, snapshot: Snapshot, found: ReadonlySet<string>): void {
    const fingerprint = snapshot.fingerprints.get(cell.id);
    const userId = this.#wanted.get(cell.id);
    if (!fingerprint || found.has(fingerprint)) {
      this.#wanted.delete(cell.id);
      return;
    }
    const above = cell.reads.map((name) => snapshot.fingerprintOf(name));
    if (above.some((one) => one && this.#failed.has(one))) this.#wanted.delete(cell.id);
    if (this.#jobs.has(fingerprint) || this.#failed.has(fingerprint) || this.#stopped.has(fingerprint)) return;
    if (cell.kind === "system" && userId === undefined) return;
    if (!above.every((one) => one !== undefined && found.has(one))) return;
    const job = snapshot.job(this.#parts.studyId, cell);
    if (!job) return;
    this.#wanted.delete(cell.id);
    const work = snapshot.work(cell);
    const { specification } = job;
    const aboutMs = specification.kind === "system" && work && this.#parts.durations.about(specification, work);
    if (specification.kind === "system") this.#ledger.begin(cell.id, fingerprint);
    const start = { cellId: cell.id, source: cell.source, job, ...(userId && { userId }), ...(aboutMs && { aboutMs }) };
    void this.#jobs
      .start(start, () => this.#publishSoon())
      .then((ending) => {
        if (ending.ended === "found" && work) this.#parts.durations.learn(specification, work, ending.result.tookMs);
        this.#end(start, ending);
      });
  }

  #end(start: Parameters<RunningJobs["start"]>[0], ending: Ending): void {
    const { fingerprint } = start.job;
    // What ends because the program does is left as begun, so that the next start can say so.
    const isInterrupted = ending.ended === "stopped" && ending.reason === undefined;
    if (this.#closed || isInterrupted) return;
    try {
      if (ending.ended === "found") this.#ledger.store(start, ending.result);
      this.#ledger.end(fingerprint);
      if (ending.ended === "failed") {
        this.#failed.set(fingerprint, ending.problems);
        if (ending.fault !== undefined) this.#parts.report(ending.fault);
      }
      this.#advance();
    } catch (error) {
      // The study may have been removed while its cell was computed.
      this.#parts.report(error);
    }
  }

  #publish(): void {
    if (this.#closed || !this.#snapshot) return;
    clearTimeout(this.#report);
    this.#report = undefined;
    const status = this.status();
    const text = JSON.stringify(status);
    if (text === this.#published) return;
    this.#published = text;
    this.#parts.publish(status);
  }

  #publishSoon(): void {
    this.#report ??= setTimeout(() => {
      try {
        this.#publish();
      } catch (error) {
        // Outside any request, what is thrown here would end the program.
        this.#parts.report(error);
      }
    }, MILLISECONDS_BETWEEN_REPORTS);
  }
}
