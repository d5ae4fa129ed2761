import { availableParallelism } from "node:os";
import { MessageChannel } from "node:worker_threads";
import { Piscina } from "piscina";
import type { CellSpecification } from "../../shared/schemas/cell.ts";
import type { RowsPage } from "../../shared/schemas/rows.ts";
import type { BundleJob, BundleWritten } from "../bundle/bundle-job.ts";
import { Cancelled } from "../engine/run.ts";
import type {
  CellJob,
  CellResult,
  LookJob,
  Outcome,
  ParsedUploadResult,
  ProgressNow,
  Sent,
  Task,
  WorkerSettings,
} from "./job.ts";
import { resultOf } from "./outcome.ts";

/** Long computations, away from the thread that answers requests. */
export interface JobPool {
  /** Errors: `Refusal` with the engine's problems, `Cancelled` once the signal says so. */
  runCell(job: CellJob, onProgress: (now: ProgressNow) => void, signal: AbortSignal): Promise<CellResult>;
  parseUpload(
    uploadId: string,
    onProgress: (now: ProgressNow) => void,
    signal: AbortSignal,
    sheet?: string,
  ): Promise<ParsedUploadResult>;
  /** A page of rows, on a thread beside the estimations. */
  look(look: LookJob, signal: AbortSignal): Promise<RowsPage>;
  /** A replication bundle, on the same thread. */
  writeBundle(bundle: BundleJob, signal: AbortSignal): Promise<BundleWritten>;
  /** Cancels what runs and waits until every thread has ended. */
  close(): Promise<void>;
}

interface PoolSettings extends Pick<WorkerSettings, "databasePath">, Partial<Pick<WorkerSettings, "threadsEach">> {
  /**
   * For cells; one more reads uploads, and one more computes what is soon done while estimations take all of these.
   * Default: the processors there are, less the one that answers requests.
   */
  readonly threads?: number;
}

/** What takes minutes on large data. Everything else is soon done, and does not wait for it. */
const LONG: ReadonlySet<CellSpecification["kind"]> = new Set(["system"]);

/** A task asks its flag several times a second; one that has not heard after so long is ended with its thread. */
const GRACE_MILLISECONDS = 1_500;

export function createPool({
  databasePath,
  threads = Math.max(1, availableParallelism() - 1),
  threadsEach = 1,
}: PoolSettings): JobPool {
  const settings = { databasePath, threadsEach };
  const cells = threadsFor(settings, threads, 1);
  // Someone waits for an answer: neither a file nor a cell that is soon done stands behind other people's estimations.
  const uploads = threadsFor(settings, 1, 0);
  const aside = threadsFor(settings, 1, 0);
  const running = new Set<AbortController>();
  let inCells = 0;

  /** A thread that has just computed the rows beneath a cell still has them, so `aside` is for when none is free. */
  function poolFor(task: Task): Piscina {
    if (task.kind === "parse upload") return uploads;
    if (task.kind === "look" || task.kind === "write bundle") return aside;
    return inCells >= threads && !LONG.has(task.job.specification.kind) ? aside : cells;
  }

  async function send<T>(task: Task, onProgress: (now: ProgressNow) => void, signal: AbortSignal): Promise<T> {
    if (signal.aborted) throw new Cancelled("cancelled");
    const stopper = new AbortController();
    const ender = new AbortController();
    const flag = new SharedArrayBuffer(Int32Array.BYTES_PER_ELEMENT);
    const { port1, port2 } = new MessageChannel();
    let grace: NodeJS.Timeout | undefined;
    const stop = () => {
      Atomics.store(new Int32Array(flag), 0, 1);
      grace ??= setTimeout(() => ender.abort(), GRACE_MILLISECONDS);
    };
    stopper.signal.addEventListener("abort", stop, { once: true });
    signal.addEventListener("abort", stop, { once: true });
    port1.on("message", onProgress);
    running.add(stopper);
    const pool = poolFor(task);
    if (pool === cells) inCells++;
    try {
      const sent: Sent = { task, flag, port: port2 };
      const outcome: Outcome<T> = await pool.run(sent, { transferList: [port2], signal: ender.signal });
      return resultOf(outcome);
    } catch (error) {
      if (ender.signal.aborted || stopper.signal.aborted) throw new Cancelled("cancelled");
      throw error;
    } finally {
      clearTimeout(grace);
      signal.removeEventListener("abort", stop);
      running.delete(stopper);
      if (pool === cells) inCells--;
      port1.close();
    }
  }

  return {
    runCell: (job, onProgress, signal) => send<CellResult>({ kind: "cell", job }, onProgress, signal),
    parseUpload: (uploadId, onProgress, signal, sheet) =>
      send<ParsedUploadResult>({ kind: "parse upload", uploadId, ...(sheet && { sheet }) }, onProgress, signal),
    look: (look, signal) => send<RowsPage>({ kind: "look", look }, () => {}, signal),
    writeBundle: (bundle, signal) => send<BundleWritten>({ kind: "write bundle", bundle }, () => {}, signal),
    async close() {
      for (const stopper of running) stopper.abort();
      await Promise.all([cells, uploads, aside].map((pool) => pool.destroy()));
    },
  };
}

function threadsFor(settings: WorkerSettings, most: number, fewest: number): Piscina {
  const isSource = import.meta.url.endsWith(".ts");
  return new Piscina({
    filename: new URL(isSource ? "./worker.ts" : "./worker.js", import.meta.url).href,
    // From the TypeScript sources, a worker needs the same loader as the program.
    ...(isSource && { execArgv: ["--import", "tsx"] }),
    workerData: settings,
    minThreads: fewest,
    maxThreads: most,
    idleTimeout: 5 * 60_000,
  });
}
