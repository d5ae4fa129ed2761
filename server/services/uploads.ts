import { createHash, randomUUID } from "node:crypto";
import { versionInWords } from "../../shared/study/uploads.ts";
import { listWords } from "../../shared/study/words.ts";
import type { Database } from "../db/client.ts";
import {
  appendChunk,
  changeUpload,
  chunksOf,
  type DescribedUpload,
  deleteUnfinishedUploads,
  deleteUpload,
  describe,
  findUpload,
  insertUpload,
  publishVersion,
  readyVersions,
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
import type { Cells, LookAtRows, ParseUpload, SourcesOf } from "./ports.ts";
import { createRowService } from "./rows.ts";
import { cellsReadingUpload, freeName, inMegabytes, LARGEST_UPLOAD, plainName } from "./upload-names.ts";

export type { DescribedUpload };

const PIECE = 1024 * 1024;

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly parseUpload: ParseUpload;
  readonly sourcesOf: SourcesOf;
  readonly cells: Pick<Cells, "changed" | "dataOf">;
  readonly lookAtRows: LookAtRows;
  readonly record: RecordInJournal;
}

/** Whether a file is a new version of an upload, or stands beside one of its name; as it is, of its own name. */
export interface AddAs {
  readonly replaces?: string;
  readonly beside?: boolean;
}

type Known = Pick<UploadRow, "studyId" | "name" | "fileName" | "uploadedBy">;

export type UploadService = ReturnType<typeof createUploadService>;

export function createUploadService({ db, access, parseUpload, sourcesOf, cells, record, lookAtRows }: Collaborators) {
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

  async function receive(known: Known, stream: AsyncIterable<Uint8Array>): Promise<string> {
    const row = receiving(known);
    insertUpload(db, row);
    try {
      await storePieces(row.id, stream);
    } catch (error) {
      deleteUpload(db, row.id);
      throw error;
    }
    return row.id;
  }

  function findReady(studyId: string, uploadId: string): UploadRow {
    const upload = findUpload(db, studyId, uploadId);
    if (upload === undefined || upload.state !== "ready") throw notFound("There is no such upload in this study.");
    return upload;
  }

  return {
    rows: createRowService({ db, access, cells, lookAtRows }),

    list(actor: Actor, studyId: string): DescribedUpload[] {
      access.allow(actor, "upload.read", studyId);
      return uploadsOf(db, studyId);
    },

    /** Everything that can be refused before the file is there. */
    mayAdd(actor: Actor, studyId: string, { replaces }: AddAs = {}): void {
      access.allow(actor, "upload.add", studyId);
      if (replaces !== undefined && readyVersions(db, studyId, replaces).length === 0) {
        throw notFound(`There is no upload called ${replaces} in this study to put a new version of.`);
      }
    },

    /** Stores the file as it comes in. It is no upload of the study until `finish` has read it. */
    async store(
      actor: Actor,
      studyId: string,
      name: string,
      stream: AsyncIterable<Uint8Array>,
      { replaces, beside = false }: AddAs = {},
    ): Promise<string> {
      access.allow(actor, "upload.add", studyId);
      const own = plainName(name);
      const kept = replaces ?? (beside ? freeName(own, uploadNames(db, studyId)) : own);
      return receive({ studyId, name: kept, fileName: own === kept ? null : own, uploadedBy: actor.id }, stream);
    },

    /**
     * Reads the stored file's columns; it is then the latest version of its name. A file that will not do, or that is
     * the same as a version kept already, is removed whole, and why is told.
     *
     * @param sheet of a workbook; otherwise that of the version before, where the workbook has one of its name
     */
    async finish(studyId: string, uploadId: string, signal: AbortSignal, sheet?: string): Promise<DescribedUpload> {
      const stored = findUpload(db, studyId, uploadId);
      if (stored === undefined) throw notFound("The study was removed while the file came in.");
      const before = readyVersions(db, studyId, stored.name).at(0)?.sheet ?? undefined;
      try {
        const { sheets, ...parsed } = await parseUpload(uploadId, signal, sheet ?? before);
        const same = publishVersion(db, stored, { ...parsed, sheets: sheets ? JSON.stringify(sheets) : null });
        if (same) throw conflict(sameSentence(same, readyVersions(db, studyId, stored.name)));
      } catch (error) {
        deleteUpload(db, uploadId);
        if (error instanceof Refusal) throw refused(error.message, error.problems);
        throw error instanceof Cancelled ? brokenOff() : error;
      }
      const upload = findUpload(db, studyId, uploadId);
      if (upload === undefined) throw notFound("The study was removed while the file was read.");
      const { version, name, uploadedBy } = upload;
      const subject = version > 1 ? `${name}, version ${version}` : name;
      record({ studyId, actor: { id: uploadedBy }, action: "upload added", subject });
      cells.changed(studyId);
      return describe(db, upload);
    },

    /** Another sheet of a workbook that is here already, as an upload of its own, to be read by `finish`. */
    async addSheet(actor: Actor, studyId: string, uploadId: string, sheet: string): Promise<string> {
      access.allow(actor, "upload.add", studyId);
      const upload = findReady(studyId, uploadId);
      const sheets: string[] = JSON.parse(upload.sheets ?? "[]");
      if (!sheets.includes(sheet)) {
        const there = sheets.length > 0 ? `its sheets are ${sheets.join(", ")}` : "it is no workbook";
        throw invalid(`${upload.name} has no sheet ${sheet}: ${there}.`);
      }
      const fileName = upload.fileName ?? upload.name;
      const name = plainName(`${fileName} (${sheet})`);
      return receive({ studyId, name, fileName, uploadedBy: actor.id }, chunksOf(db, uploadId));
    },

    discard: (uploadId: string) => deleteUpload(db, uploadId),

    /** What a cell reads stays. */
    async remove(actor: Actor, studyId: string, uploadId: string): Promise<void> {
      access.allow(actor, "upload.remove", studyId);
      const upload = findReady(studyId, uploadId);
      const all = readyVersions(db, studyId, upload.name);
      const reading = cellsReadingUpload(await sourcesOf(studyId), upload, all);
      if (reading.length > 0) {
        const [which, verb] = reading.length === 1 ? ["the cell", "reads"] : ["the cells", "read"];
        throw conflict(`${versionInWords(all, upload)} stays: ${which} ${listWords(reading)} ${verb} it.`);
      }
      deleteUpload(db, uploadId);
      record({ studyId, actor, action: "upload removed", subject: versionInWords(all, upload) });
      cells.changed(studyId);
    },

    /** At start: what was still coming in when the program last stopped. Returns how many there were. */
    removeUnfinished: () => deleteUnfinishedUploads(db),
  };
}

function sameSentence(same: UploadRow, all: readonly UploadRow[]): string {
  return `The file is the same as ${versionInWords(all, same)}, byte for byte; nothing was added.`;
}

/** Of no version until it has been read. */
function receiving(known: Known): UploadRow {
  return {
    ...known,
    id: randomUUID(),
    version: 0,
    format: "csv",
    sheet: null,
    sheets: null,
    bytes: 0,
    state: "receiving",
    sha256: null,
    rows: null,
    separator: null,
    decimalComma: null,
    uploadedAt: new Date(),
  };
}

/** Nobody is there to read it any more; it is what the log calls it. */
export const brokenOff = () => invalid("The upload broke off before it was whole; nothing of it is kept.");

export function sizeRefusal(size: string): string {
  return `The file has ${size}, and an upload may have ${inMegabytes(LARGEST_UPLOAD)}.`;
}
