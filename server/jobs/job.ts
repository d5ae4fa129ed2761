import type { MessagePort } from "node:worker_threads";
import type { CellSpecification } from "../../shared/schemas/cell.ts";
import type { DataSpecification } from "../../shared/schemas/data.ts";
import type { Problem } from "../../shared/schemas/problem.ts";
import type { RowsAsked } from "../../shared/schemas/rows.ts";
import type { SystemSpecification } from "../../shared/schemas/system.ts";
import type { BundleJob } from "../bundle/bundle-job.ts";
import type { FileFormat } from "../engine/columns/file-format.ts";
import type { RunControl } from "../engine/run.ts";

/** A cell to compute: its question, and what it rests on. Plain data, so that it crosses threads. */
export interface CellJob {
  readonly studyId: string;
  /** Under which its finding will be stored, whatever becomes of the cell meanwhile. */
  readonly fingerprint: string;
  readonly specification: CellSpecification;
  /** The data cell at the root; of a data cell, itself. */
  readonly data: JobData;
  /** Where the system's finding is stored and what was asked of it, for what rests on one. */
  readonly systemFingerprint?: string;
  readonly systemSpecification?: SystemSpecification;
  /** Where the price change's finding is stored, for a figure drawn of one. */
  readonly priceChangeFingerprint?: string;
  /** Of a second, broader system that the cell names. */
  readonly broader?: { readonly data: JobData; readonly systemFingerprint: string };
}

/** A data cell, and the upload it reads. */
interface JobData {
  readonly fingerprint: string;
  readonly specification: DataSpecification;
  readonly uploadId: string;
  /** Kept beside the finding, to say later that another file took its place. */
  readonly uploadSha256?: string;
}

export type ProgressNow = Parameters<RunControl["progress"]>[0];

/** A finding as JSON of its schema: made and checked by the worker, stored as it is. */
export interface CellResult {
  readonly finding: string;
  readonly tookMs: number;
}

export interface ParsedUploadResult {
  readonly rows: number;
  readonly sha256: string;
  readonly format: FileFormat;
  readonly separator?: string;
  readonly decimalComma?: boolean;
  readonly sheet?: string;
  readonly sheets?: readonly string[];
}

/** Rows to be looked at: of an upload as it stands, or those that something found of a data cell is about. */
export type LookJob =
  | { readonly of: "upload"; readonly uploadId: string; readonly asked: RowsAsked }
  | { readonly of: "cell"; readonly data: CellJob["data"]; readonly about: string; readonly asked: RowsAsked };

export type Task =
  | { readonly kind: "cell"; readonly job: CellJob }
  | { readonly kind: "parse upload"; readonly uploadId: string; readonly sheet?: string }
  | { readonly kind: "look"; readonly look: LookJob }
  | { readonly kind: "write bundle"; readonly bundle: BundleJob };

/** What a task is sent with: how to stop it, and where it reports. */
export interface Sent {
  readonly task: Task;
  /** One Int32; not zero once cancelled. */
  readonly flag: SharedArrayBuffer;
  readonly port: MessagePort;
}

/** How a task ended. Errors cross threads as data, so that a refusal keeps its problems. */
export type Outcome<T> =
  | { readonly ended: "done"; readonly result: T }
  | { readonly ended: "refused"; readonly problems: readonly Problem[] }
  | { readonly ended: "cancelled" };

/** What a worker is told once, when it starts. */
export interface WorkerSettings {
  readonly databasePath: string;
  /** Among how many threads, its own included, a worker may divide one computation. */
  readonly threadsEach: number;
}
