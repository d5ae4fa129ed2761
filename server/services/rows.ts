import type { RowsAsked, RowsPage } from "../../shared/schemas/rows.ts";
import type { Database } from "../db/client.ts";
import { findUpload } from "../db/queries/uploads.ts";
import { Refusal } from "../engine/refusal.ts";
import { Cancelled } from "../engine/run.ts";
import { conflict, invalid, notFound, refused } from "../errors.ts";
import type { LookJob } from "../jobs/job.ts";
import type { Actor } from "../policies/can.ts";
import type { Access } from "./access.ts";
import type { Cells, LookAtRows } from "./ports.ts";

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly cells: Pick<Cells, "dataOf">;
  readonly lookAtRows: LookAtRows;
}

export interface OfCell {
  readonly studyId: string;
  readonly cellId: string;
  /** Which rows: the key of a flag's part, or of a reason for leaving rows out. */
  readonly about: string;
  /** Of the finding that said so. */
  readonly fingerprint: string;
}

/** Rows of microdata, for those who may read a study's uploads; a referee is none of them. */
export function createRowService({ db, access, cells, lookAtRows }: Collaborators) {
  async function look(job: LookJob, signal: AbortSignal): Promise<RowsPage> {
    try {
      return await lookAtRows(job, signal);
    } catch (error) {
      if (error instanceof Refusal) throw refused(error.message, error.problems);
      throw error instanceof Cancelled ? invalid("Nobody waits for these rows any more.") : error;
    }
  }

  return {
    /** The rows of an upload as they stand in the file. */
    async ofUpload(actor: Actor, studyId: string, uploadId: string, asked: RowsAsked, signal: AbortSignal) {
      access.allow(actor, "upload.read", studyId);
      const upload = findUpload(db, studyId, uploadId);
      if (upload?.state !== "ready") throw notFound("There is no such upload in this study.");
      return look({ of: "upload", uploadId, asked }, signal);
    },

    /** The rows that something said of a data cell is about. */
    async ofCell(actor: Actor, { studyId, cellId, about, fingerprint }: OfCell, asked: RowsAsked, signal: AbortSignal) {
      access.allow(actor, "upload.read", studyId);
      const data = await cells.dataOf(studyId, cellId);
      if (data === undefined) throw notFound("There is no such data cell in this study, or it has problems.");
      if (data.fingerprint !== fingerprint) {
        throw conflict("The cell asks something else by now; look at its rows in its present finding.");
      }
      return look({ of: "cell", data, about, asked }, signal);
    },
  };
}
