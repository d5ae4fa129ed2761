import { and, asc, eq } from "drizzle-orm";
import type { Database } from "../db/client.ts";
import { uploadChunks, uploadColumns, uploads } from "../db/schema/uploads.ts";
import type { UploadTable } from "../engine/columns/prepared-data.ts";
import { type ReadCsv, readCsv } from "../engine/columns/read-csv.ts";
import { Refusal } from "../engine/refusal.ts";
import type { RunControl } from "../engine/run.ts";
import type { ParsedUploadResult } from "./job.ts";
import { loadColumn, storeColumn } from "./stored-columns.ts";

/** The stored bytes of an upload, a piece at a time. */
async function* piecesOf(db: Database, uploadId: string): AsyncGenerator<Uint8Array> {
  for (let position = 0; ; position++) {
    const piece = db
      .select({ bytes: uploadChunks.bytes })
      .from(uploadChunks)
      .where(and(eq(uploadChunks.uploadId, uploadId), eq(uploadChunks.position, position)))
      .get();
    if (!piece) return;
    yield piece.bytes;
  }
}

/** Reads a stored file into its columns and keeps them, all or none. Errors: `Refusal`, `Cancelled`. */
export async function parseStoredUpload(
  db: Database,
  uploadId: string,
  control: RunControl,
): Promise<ParsedUploadResult> {
  const upload = db.select({ name: uploads.name }).from(uploads).where(eq(uploads.id, uploadId)).get();
  if (!upload) throw new Refusal("The upload was removed before it was read.");
  const parsed = await readCsv(piecesOf(db, uploadId), upload.name, control);
  saveColumns(db, uploadId, parsed);
  const { table, separator, decimalComma } = parsed;
  return { rows: table.rows, sha256: table.sha256, separator, decimalComma };
}

function saveColumns(db: Database, uploadId: string, { table, columns }: ReadCsv): void {
  db.transaction((transaction) => {
    transaction.delete(uploadColumns).where(eq(uploadColumns.uploadId, uploadId)).run();
    table.columns.forEach((column, position) => {
      const stored = storeColumn(column, columns[position], position);
      transaction
        .insert(uploadColumns)
        .values({ uploadId, ...stored })
        .run();
    });
  });
}

/** An upload as the engine reads it. */
export function loadTable(db: Database, uploadId: string): UploadTable {
  const upload = db.select().from(uploads).where(eq(uploads.id, uploadId)).get();
  if (!upload || upload.rows === null || upload.sha256 === null) {
    throw new Refusal("The upload that the data cell names is no longer there.");
  }
  const { name, sha256, rows } = upload;
  const stored = db
    .select()
    .from(uploadColumns)
    .where(eq(uploadColumns.uploadId, uploadId))
    .orderBy(asc(uploadColumns.position))
    .all();
  return { name, sha256, rows, columns: stored.map((column) => loadColumn(column, rows)) };
}

export function bytesOf(table: UploadTable): number {
  return table.columns.reduce((sum, column) => sum + table.rows * (column.type === "number" ? 8 : 4), 0);
}
