import { Refusal } from "../refusal.ts";
import type { FileBytes } from "./file-bytes.ts";

export const FILE_FORMATS = ["csv", "parquet", "xlsx"] as const;
export type FileFormat = (typeof FILE_FORMATS)[number];

const WORDS: Readonly<Record<FileFormat, string>> = { csv: "a CSV", parquet: "a Parquet file", xlsx: "a workbook" };

const ZIP = [0x50, 0x4b];
const PARQUET = [0x50, 0x41, 0x52, 0x31];
const ENCRYPTED_PARQUET = [0x50, 0x41, 0x52, 0x45];
/** The container of the older binary office formats, and of workbooks with a password. */
const COMPOUND = [0xd0, 0xcf, 0x11, 0xe0];

/**
 * What a file is, by its first bytes; its name decides nothing. A name that promises another format than text is
 * held to it, so that a broken file is not read as one long line.
 */
export function fileFormat(file: FileBytes, name: string): FileFormat {
  if (file.size === 0) throw new Refusal("The file is empty: it has 0 bytes.");
  const head = file.slice(0, Math.min(8, file.size));
  const begins = (bytes: readonly number[]) => bytes.every((byte, at) => head[at] === byte);
  if (begins(PARQUET)) return "parquet";
  if (begins(ZIP)) return "xlsx";
  if (begins(ENCRYPTED_PARQUET)) throw new Refusal("The file is an encrypted Parquet file; write it without a key.");
  if (begins(COMPOUND)) {
    throw new Refusal(
      "The file is a workbook of the older binary kind, or one with a password; save it as XLSX without one.",
    );
  }
  const promised = promisedBy(name);
  if (promised !== "csv") {
    throw new Refusal(`The name ${name} promises ${WORDS[promised]}, and the file is none: its first bytes are not.`);
  }
  return "csv";
}

/** The format that a file's name promises. */
function promisedBy(name: string): FileFormat {
  if (/\.(parquet|pq)$/i.test(name)) return "parquet";
  return /\.xlsx$/i.test(name) ? "xlsx" : "csv";
}
