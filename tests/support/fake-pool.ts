import { Refusal } from "../../server/engine/refusal.ts";
import { Cancelled } from "../../server/engine/run.ts";
import type { CellJob, CellResult, ProgressNow } from "../../server/jobs/job.ts";
import type { JobPool } from "../../server/jobs/pool.ts";
import type { CellKind } from "../../shared/schemas/cell.ts";
import { exampleFindings } from "./findings.ts";

interface FakeJob {
  readonly job: CellJob;
  readonly report: (now: ProgressNow) => void;
  readonly signal: AbortSignal;
  readonly settle: (result: CellResult) => void;
  readonly fail: (error: Error) => void;
}

/** A fake of the worker threads: jobs stand until the test says how they end, with findings that mean nothing. */
export class FakePool implements Pick<JobPool, "runCell"> {
  /** Every job that was ever started, as "kind fingerprint". */
  readonly started: string[] = [];
  readonly open: FakeJob[] = [];
  /** Kinds that end by themselves at once. */
  readonly prompt = new Set<CellKind>();

  runCell(job: CellJob, report: (now: ProgressNow) => void, signal: AbortSignal): Promise<CellResult> {
    this.started.push(`${job.specification.kind} ${job.fingerprint}`);
    return new Promise((settle, fail) => {
      const fake = { job, report, signal, settle, fail };
      signal.addEventListener("abort", () => this.#close(fake, () => fail(new Cancelled("cancelled"))));
      this.open.push(fake);
      if (this.prompt.has(job.specification.kind)) queueMicrotask(() => this.finish(job.specification.kind));
    });
  }

  /** Ends the oldest open job of a kind with a finding. */
  finish(kind: CellKind, tookMs = 12): void {
    const fake = this.#oldest(kind);
    this.#close(fake, () =>
      fake.settle({
        finding: JSON.stringify(exampleFindings()[kind as keyof ReturnType<typeof exampleFindings>]),
        tookMs,
      }),
    );
  }

  refuse(kind: CellKind, sentence: string, key?: string[]): void {
    const fake = this.#oldest(kind);
    this.#close(fake, () => fake.fail(new Refusal([{ sentence, ...(key && { key }) }])));
  }

  crash(kind: CellKind, message: string): void {
    const fake = this.#oldest(kind);
    this.#close(fake, () => fake.fail(new Error(message)));
  }

  report(kind: CellKind, now: ProgressNow): void {
    this.#oldest(kind).report(now);
  }

  #oldest(kind: CellKind): FakeJob {
    const fake = this.open.find(({ job }) => job.specification.kind === kind);
    if (!fake) throw new Error(`no ${kind} job is open`);
    return fake;
  }

  #close(fake: FakeJob, end: () => void): void {
    const at = this.open.indexOf(fake);
    if (at < 0) return;
    this.open.splice(at, 1);
    end();
  }
}
