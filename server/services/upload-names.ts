import { parseDocument } from "yaml";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { LONGEST_SOURCE } from "../../shared/study/document.ts";

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
 * Names of the data cells whose source says `upload: <name>`, in their order, however far their writing has come.
 * Of a source too long for a cell only as much is read as a cell could have: reading is on the requests' thread.
 */
export function cellsNamingUpload(sources: readonly CellSource[], upload: string): string[] {
  return sources
    .filter(({ kind, source }) => kind === "data" && uploadOf(source.slice(0, LONGEST_SOURCE)) === upload)
    .map(({ name }) => name);
}

function uploadOf(source: string): unknown {
  return parseDocument(source).get("upload");
}

export function inMegabytes(bytes: number): string {
  return `${(bytes / 1024 / 1024).toFixed(1).replace(/\.0$/, "")} MB`;
}
