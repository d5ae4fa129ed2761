import type { Finding } from "../../shared/schemas/cell.ts";
import type { RowsPage } from "../../shared/schemas/rows.ts";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import type { BundleJob, BundleWritten } from "../bundle/bundle-job.ts";
import type { CellJob, LookJob } from "../jobs/job.ts";

/**
 * What the services of this folder need of the rest of the house. They say it here themselves, so
 * that none of them knows a socket or a worker; `main.ts` puts the real ones in.
 */
export interface Cells {
  /** Something the study's cells rest on has changed. */
  changed(studyId: string): void;
  status(studyId: string): Promise<StudyStatus> | StudyStatus;
  estimate(studyId: string, cellId: string, userId: string): Promise<void> | void;
  cancel(studyId: string, cellId: string): Promise<void> | void;
  bringUpToDate(studyId: string, userId: string): Promise<void> | void;
  /** The study is gone: what runs for it stops, and nothing is kept of it. */
  removed(studyId: string): void;
  /** What a data cell reads and asks, as it stands; none while it has problems, or for a cell of another kind. */
  dataOf(studyId: string, cellId: string): Promise<CellJob["data"] | undefined> | CellJob["data"] | undefined;
  finding(studyId: string, fingerprint: string): Promise<StoredFinding | undefined> | StoredFinding | undefined;
}

export interface StoredFinding {
  readonly finding: Finding;
  readonly foundAt: Date;
  readonly tookMs: number;
}

/** The cells of a study as they stand in its document now. */
export type SourcesOf = (studyId: string) => Promise<readonly CellSource[]> | readonly CellSource[];

/** Closes a person's open sockets, in one study or everywhere. */
export type ClosePerson = (userId: string, studyId?: string) => void;

export interface ParsedUpload {
  readonly rows: number;
  readonly sha256: string;
  readonly format: "csv" | "parquet" | "xlsx";
  readonly separator?: string;
  readonly decimalComma?: boolean;
  readonly sheet?: string;
  readonly sheets?: readonly string[];
}

/** Reads a stored upload into its columns, away from the request's thread. Throws `Refusal` with its problems. */
export type ParseUpload = (uploadId: string, signal: AbortSignal, sheet?: string) => Promise<ParsedUpload>;

/** A page of rows, put together away from the request's thread. */
export type LookAtRows = (look: LookJob, signal: AbortSignal) => Promise<RowsPage>;

/** Writes a replication bundle to the file it names, away from the request's thread. */
export type WriteBundle = (job: BundleJob, signal: AbortSignal) => Promise<BundleWritten>;
