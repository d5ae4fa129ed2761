import { workerData } from "node:worker_threads";
import type { RowsPage } from "../../shared/schemas/rows.ts";
import type { BundleWritten } from "../bundle/bundle-job.ts";
import { connectDatabase } from "../db/client.ts";
import { startThreads } from "../engine/threads/start-threads.ts";
import { workerControl } from "./control.ts";
import type { CellResult, Outcome, ParsedUploadResult, Sent, WorkerSettings } from "./job.ts";
import { lookAtRows } from "./look-at-rows.ts";
import { outcomeOf } from "./outcome.ts";
import { runCellJob, WorkerMemory } from "./run-cell.ts";
import { parseStoredUpload } from "./upload-tables.ts";
import { writeBundle } from "./write-bundle.ts";

type Result = CellResult | ParsedUploadResult | RowsPage | BundleWritten;

/** A worker thread: its own connection to the database, its own memory, one task at a time. */
const { databasePath, threadsEach } = settings();
const { db } = connectDatabase(databasePath);
const threads = startThreads(threadsEach);
const memory = new WorkerMemory();

export default async function run({ task, flag, port }: Sent): Promise<Outcome<Result>> {
  const control = workerControl(port, flag, threads);
  try {
    // Cancelled while it stood in the queue.
    if (control.cancelled()) return { ended: "cancelled" };
    return await outcomeOf<Result>(() => {
      if (task.kind === "cell") return runCellJob(task.job, db, memory, control);
      if (task.kind === "look") return lookAtRows(task.look, db, memory, control);
      if (task.kind === "write bundle") return writeBundle(task.bundle, db, memory, control);
      return parseStoredUpload(db, task, control);
    });
  } finally {
    port.close();
  }
}

/** The pool hands a worker's data over as the last of a list of its own. */
function settings(): WorkerSettings {
  const given: unknown = Array.isArray(workerData) ? workerData.at(-1) : workerData;
  return given as WorkerSettings;
}
