import { asc, eq } from "drizzle-orm";
import type { Database } from "../db/client.ts";
import { uploadColumns, uploads } from "../db/schema/uploads.ts";
import type { UploadTable } from "../engine/columns/prepared-data.ts";
import { type ReadTable, readTable } from "../engine/columns/read-table.ts";
import { Refusal } from "../engine/refusal.ts";
import type { RunControl } from "../engine/run.ts";
import type { ParsedUploadResult, Task } from "./job.ts";
import { loadColumn, storeColumn } from "./stored-columns.ts";
import { uploadedFile } from "./uploaded-file.ts";

/** Reads a stored file into its columns and keeps them, all or none. Errors: `Refusal`, `Cancelled`. */
export async function parseStoredUpload(
  db: Database,
  { uploadId, sheet }: Pick<Extract<Task, { kind: "parse upload" }>, "uploadId" | "sheet">,
  control: RunControl,
): Promise<ParsedUploadResult> {
  const where = eq(uploads.id, uploadId);
  const upload = db
    .select({ name: uploads.name, fileName: uploads.fileName, bytes: uploads.bytes })
    .from(uploads)
    .where(where)
    .get();
  if (!upload) throw new Refusal("The upload was removed before it was read.");
  const file = uploadedFile(db, uploadId, upload.bytes);
  const read = await readTable(file, upload.fileName ?? upload.name, { sheet, control });
  saveColumns(db, uploadId, read);
  const { table, format, csv, workbook } = read;
  return { rows: table.rows, sha256: table.sha256, format, ...csv, ...workbook };
}

function saveColumns(db: Database, uploadId: string, { table, columns }: ReadTable): void {
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
