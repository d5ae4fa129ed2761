import { parseDocument } from "yaml";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { LONGEST_SOURCE } from "../../shared/study/document.ts";
import { type UploadNamed, type UploadVersion, uploadRead } from "../../shared/study/uploads.ts";

export const LARGEST_UPLOAD = 100 * 1024 * 1024;
const LONGEST_NAME = 200;

/** The file's own name: no folders, no control characters, not empty. */
export function plainName(given: string): string {
  const last = given.split(/[/\\]/).at(-1) ?? "";
  const clean = last.replace(/\p{C}/gu, "").trim().slice(0, LONGEST_NAME);
  return clean === "" ? "upload.csv" : clean;
}

/** The name, told apart from those taken: tuna.csv, tuna (2).csv, tuna (3).csv. */
export function freeName(name: string, taken: readonly string[]): string {
  const dot = name.lastIndexOf(".");
  const [stem, ending] = dot > 0 ? [name.slice(0, dot), name.slice(dot)] : [name, ""];
  let free = name;
  for (let number = 2; taken.includes(free); number += 1) free = `${stem} (${number})${ending}`;
  return free;
}

/**
 * Names of the data cells that read a version of an upload, in their order, however far their writing has come: those
 * that name it, and where they pin no version, if it is the latest.
 * Of a source too long for a cell only as much is read as a cell could have: reading is on the requests' thread.
 */
export function cellsReadingUpload(
  sources: readonly CellSource[],
  upload: UploadVersion,
  versions: readonly UploadVersion[],
): string[] {
  return sources
    .filter(({ kind, source }) => {
      if (kind !== "data") return false;
      const read = uploadRead(versions, namedIn(source.slice(0, LONGEST_SOURCE)));
      return read !== undefined && read.version === upload.version;
    })
    .map(({ name }) => name);
}

function namedIn(source: string): UploadNamed {
  const document = parseDocument(source);
  const version = document.get("version");
  return { upload: document.get("upload"), ...(typeof version === "number" && { version }) };
}

export function inMegabytes(bytes: number): string {
  return `${(bytes / 1024 / 1024).toFixed(1).replace(/\.0$/, "")} MB`;
}
