import { counted, listSome } from "./words.ts";

/** As much of an upload as tells it from others: its name, and which version of it it is (the first, unless said). */
export interface UploadVersion {
  readonly name: string;
  readonly version?: number;
}

/** What a data cell writes of its upload, as it writes it. */
export interface UploadNamed {
  readonly upload?: unknown;
  readonly version?: unknown;
}

export const versionOf = ({ version = 1 }: UploadVersion): number => version;

/** The upload a data cell reads: the version it names, otherwise the latest of the name. */
export function uploadRead<U extends UploadVersion>(
  uploads: readonly U[],
  { upload, version }: UploadNamed,
): U | undefined {
  const versions = versionsOf(uploads, upload);
  if (version === undefined || version === null) return versions[0];
  // On the command line a file is what it is, whichever version a study pins.
  return versions.find((one) => one.version === undefined || one.version === version);
}

/** Every version of a name, the latest first. */
export function versionsOf<U extends UploadVersion>(uploads: readonly U[], name: unknown): U[] {
  return uploads.filter((one) => one.name === name).sort((a, b) => versionOf(b) - versionOf(a));
}

/** The latest version of each name, in the order in which the names first stand. */
export function latestUploads<U extends UploadVersion>(uploads: readonly U[]): U[] {
  return [...new Set(uploads.map(({ name }) => name))].map((name) => versionsOf(uploads, name)[0]);
}

/** "version 2 of purchases.csv"; of one that has no other, its name. */
export function versionInWords(uploads: readonly UploadVersion[], upload: UploadVersion): string {
  const only = versionsOf(uploads, upload.name).length < 2;
  return only ? upload.name : `version ${versionOf(upload)} of ${upload.name}`;
}

interface Described {
  readonly rows?: number;
  readonly columns: readonly { readonly name: string; readonly type: "number" | "text" }[];
}

const NAMED = 4;

/** What a version changed against the one before: "12 rows more; no column is new, age is gone". */
export function versionChange(before: Described, now: Described): string {
  const had = new Map(before.columns.map((column) => [column.name, column.type]));
  const has = new Map(now.columns.map((column) => [column.name, column.type]));
  const added = [...has.keys()].filter((name) => !had.has(name));
  const removed = [...had.keys()].filter((name) => !has.has(name));
  const retyped = [...has].filter(([name, type]) => had.has(name) && had.get(name) !== type);
  const asNumbers = retyped.filter(([, type]) => type === "number").map(([name]) => name);
  const asText = retyped.filter(([, type]) => type === "text").map(([name]) => name);
  const told = [
    rowChange(before.rows ?? 0, now.rows ?? 0),
    added.length > 0 && `new ${plural(added, "column")}: ${listSome(added, NAMED)}`,
    removed.length > 0 && `gone: ${listSome(removed, NAMED)}`,
    asNumbers.length > 0 && `now numbers: ${listSome(asNumbers, NAMED)}`,
    asText.length > 0 && `now text: ${listSome(asText, NAMED)}`,
  ].filter((words) => words !== false);
  const same = added.length + removed.length + retyped.length === 0;
  return same ? `${told[0]}, the same columns` : told.join("; ");
}

function rowChange(before: number, now: number): string {
  if (now === before) return "as many rows";
  return `${counted(Math.abs(now - before), "row")} ${now > before ? "more" : "fewer"}`;
}

const plural = (names: readonly string[], word: string) => (names.length === 1 ? word : `${word}s`);
