import { createHash, randomUUID } from "node:crypto";
import type { Database } from "../db/client.ts";
import {
  appendChunk,
  changeUpload,
  type DescribedUpload,
  deleteUnfinishedUploads,
  deleteUpload,
  describe,
  findUpload,
  insertUpload,
  type UploadRow,
  uploadNames,
  uploadsOf,
} from "../db/queries/uploads.ts";
import { Refusal } from "../engine/refusal.ts";
import { Cancelled } from "../engine/run.ts";
import { conflict, invalid, notFound, refused, tooLarge } from "../errors.ts";
import type { Actor } from "../policies/can.ts";
import { inPieces } from "../storage/pieces.ts";
import type { Access } from "./access.ts";
import type { RecordInJournal } from "./journal.ts";
import type { Cells, ParseUpload, SourcesOf } from "./ports.ts";
import { cellsNamingUpload, freeName, inMegabytes, LARGEST_UPLOAD, plainName } from "./upload-names.ts";

export type { DescribedUpload };

const PIECE = 1024 * 1024;

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly parseUpload: ParseUpload;
  readonly sourcesOf: SourcesOf;
  readonly cells: Pick<Cells, "changed">;
  readonly record: RecordInJournal;
}

export type UploadService = ReturnType<typeof createUploadService>;

export function createUploadService({ db, access, parseUpload, sourcesOf, cells, record }: Collaborators) {
  async function storePieces(uploadId: string, stream: AsyncIterable<Uint8Array>): Promise<void> {
    const hash = createHash("sha256");
    let position = 0;
    let bytes = 0;
    for await (const piece of inPieces(stream, PIECE)) {
      bytes += piece.length;
      if (bytes > LARGEST_UPLOAD) throw tooLarge(sizeRefusal(`more than ${inMegabytes(LARGEST_UPLOAD)}`));
      hash.update(piece);
      appendChunk(db, uploadId, position++, piece);
    }
    changeUpload(db, uploadId, { bytes, sha256: hash.digest("hex") });
  }

  return {
    list(actor: Actor, studyId: string): DescribedUpload[] {
      access.allow(actor, "upload.read", studyId);
      return uploadsOf(db, studyId);
    },

    mayAdd: (actor: Actor, studyId: string) => void access.allow(actor, "upload.add", studyId),

    /** Stores the file as it comes in. It is no upload of the study until `finish` has read it. */
    async store(actor: Actor, studyId: string, name: string, stream: AsyncIterable<Uint8Array>): Promise<string> {
      access.allow(actor, "upload.add", studyId);
      const row: UploadRow = {
        id: randomUUID(),
        studyId,
        name: freeName(plainName(name), uploadNames(db, studyId)),
        version: 1,
        fileName: null,
        format: "csv",
        sheet: null,
        sheets: null,
        bytes: 0,
        state: "receiving",
        sha256: null,
        rows: null,
        separator: null,
        decimalComma: null,
        uploadedBy: actor.id,
        uploadedAt: new Date(),
      };
      insertUpload(db, row);
      try {
        await storePieces(row.id, stream);
      } catch (error) {
        deleteUpload(db, row.id);
        throw error;
      }
      return row.id;
    },

    /** Reads the stored file's columns; a file that will not do is removed whole, and its problems told. */
    async finish(studyId: string, uploadId: string, signal: AbortSignal): Promise<DescribedUpload> {
      try {
        const { rows, sha256, separator, decimalComma } = await parseUpload(uploadId, signal);
        changeUpload(db, uploadId, { rows, sha256, separator, decimalComma, state: "ready" });
      } catch (error) {
        deleteUpload(db, uploadId);
        if (error instanceof Refusal) throw refused(error.message, error.problems);
        throw error instanceof Cancelled ? brokenOff() : error;
      }
      const upload = findUpload(db, studyId, uploadId);
      if (upload === undefined) throw notFound("The study was removed while the file was read.");
      record({ studyId, actor: { id: upload.uploadedBy }, action: "upload added", subject: upload.name });
      cells.changed(studyId);
      return describe(db, upload);
    },

    discard: (uploadId: string) => deleteUpload(db, uploadId),

    /** An upload that a cell names stays. */
    async remove(actor: Actor, studyId: string, uploadId: string): Promise<void> {
      access.allow(actor, "upload.remove", studyId);
      const upload = findUpload(db, studyId, uploadId);
      if (upload === undefined || upload.state !== "ready") throw notFound("There is no such upload in this study.");
      const named = cellsNamingUpload(await sourcesOf(studyId), upload.name);
      if (named.length > 0) {
        const [which, verb] = named.length === 1 ? ["the cell", "names"] : ["the cells", "name"];
        throw conflict(`${upload.name} stays: ${which} ${named.join(", ")} ${verb} it.`);
      }
      deleteUpload(db, uploadId);
      record({ studyId, actor, action: "upload removed", subject: upload.name });
      cells.changed(studyId);
    },

    /** At start: what was still coming in when the program last stopped. Returns how many there were. */
    removeUnfinished: () => deleteUnfinishedUploads(db),
  };
}

/** Nobody is there to read it any more; it is what the log calls it. */
export const brokenOff = () => invalid("The upload broke off before it was whole; nothing of it is kept.");

export function sizeRefusal(size: string): string {
  return `The file has ${size}, and an upload may have ${inMegabytes(LARGEST_UPLOAD)}.`;
}
