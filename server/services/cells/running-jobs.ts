import type { Problem } from "../../../shared/schemas/problem.ts";
import type { Progress } from "../../../shared/schemas/status.ts";
import { Refusal } from "../../engine/refusal.ts";
import { Cancelled } from "../../engine/run.ts";
import type { CellJob, CellResult, ProgressNow } from "../../jobs/job.ts";
import type { JobPool } from "../../jobs/pool.ts";

/** Why a job was stopped: someone cancelled it, or nobody asks its question any more. */
export type StopReason = "cancelled" | "superseded";

export interface RunningJob {
  readonly cellId: string;
  readonly userId?: string;
  readonly source: string;
  readonly job: CellJob;
  readonly startedAt: number;
  readonly aboutMs?: number;
  readonly controller: AbortController;
  now: ProgressNow;
  stopped?: StopReason;
}

export type Ending =
  | { readonly ended: "found"; readonly result: CellResult }
  | { readonly ended: "failed"; readonly problems: readonly Problem[]; readonly fault?: unknown }
  | { readonly ended: "stopped"; readonly reason?: StopReason };

interface Start extends Pick<RunningJob, "cellId" | "userId" | "source" | "job" | "aboutMs"> {}

/** The jobs of a study that are under way, by the fingerprint they were started with. */
export class RunningJobs {
  readonly #jobs = new Map<string, RunningJob>();
  readonly #pool: Pick<JobPool, "runCell">;

  constructor(pool: Pick<JobPool, "runCell">) {
    this.#pool = pool;
  }

  has(fingerprint: string): boolean {
    return this.#jobs.has(fingerprint);
  }

  all(): RunningJob[] {
    return [...this.#jobs.values()];
  }

  /** Starts a job; the returned promise never rejects. */
  async start(start: Start, onProgress: () => void): Promise<Ending> {
    const running: RunningJob = {
      ...start,
      startedAt: Date.now(),
      controller: new AbortController(),
      now: { step: "waiting for its turn" },
    };
    this.#jobs.set(start.job.fingerprint, running);
    const hear = (now: ProgressNow) => {
      running.now = now;
      onProgress();
    };
    try {
      return { ended: "found", result: await this.#pool.runCell(start.job, hear, running.controller.signal) };
    } catch (error) {
      if (error instanceof Cancelled) return { ended: "stopped", reason: running.stopped };
      if (error instanceof Refusal) return { ended: "failed", problems: error.problems };
      const sentence = "The program itself failed while computing this; its log says where.";
      return { ended: "failed", problems: [{ sentence }], fault: error };
    } finally {
      this.#jobs.delete(start.job.fingerprint);
    }
  }

  stop(running: RunningJob, reason: StopReason): void {
    running.stopped ??= reason;
    running.controller.abort();
  }

  /** By fingerprint; a job that is about to stop is no longer told of. */
  progress(time = Date.now()): Map<string, Progress> {
    const going = this.all().filter(({ stopped }) => stopped === undefined);
    return new Map(going.map((running) => [running.job.fingerprint, progressOf(running, time)]));
  }
}

function progressOf({ now, startedAt, aboutMs }: RunningJob, time: number): Progress {
  return { ...now, elapsedMs: Math.max(0, time - startedAt), ...(aboutMs !== undefined && { aboutMs }) };
}
