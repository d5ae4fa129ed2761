import { and, asc, desc, eq } from "drizzle-orm";
import type { Database } from "../client.ts";
import { user } from "../schema/auth.ts";
import { uploadChunks, uploadColumns, uploads } from "../schema/uploads.ts";

export type UploadRow = typeof uploads.$inferSelect;

/** An upload with the name of who brought it and its columns' descriptions (JSON), in file order. */
export interface DescribedUpload {
  readonly upload: UploadRow;
  readonly uploadedByName: string;
  readonly descriptions: readonly string[];
}

export function insertUpload(db: Database, row: UploadRow): void {
  db.insert(uploads).values(row).run();
}

export function appendChunk(db: Database, uploadId: string, position: number, bytes: Buffer): void {
  db.insert(uploadChunks).values({ uploadId, position, bytes }).run();
}

export function changeUpload(db: Database, uploadId: string, change: Partial<UploadRow>): void {
  db.update(uploads).set(change).where(eq(uploads.id, uploadId)).run();
}

/** The stored pieces of an upload, one after the other, with a breath between for whoever else waits. */
export async function* chunksOf(db: Database, uploadId: string): AsyncGenerator<Buffer> {
  for (let position = 0; ; position++) {
    const piece = db
      .select({ bytes: uploadChunks.bytes })
      .from(uploadChunks)
      .where(and(eq(uploadChunks.uploadId, uploadId), eq(uploadChunks.position, position)))
      .get();
    if (piece === undefined) return;
    yield piece.bytes;
    await new Promise((breath) => setImmediate(breath));
  }
}

/** Versions of a name that are whole, the latest first. */
export function readyVersions(db: Pick<Database, "select">, studyId: string, name: string): UploadRow[] {
  return db
    .select()
    .from(uploads)
    .where(and(eq(uploads.studyId, studyId), eq(uploads.name, name), eq(uploads.state, "ready")))
    .orderBy(desc(uploads.version))
    .all();
}

/** Makes a file that has been read the latest version of its name, and returns undefined; or the version it repeats. */
export function publishVersion(
  db: Database,
  { id, studyId, name }: UploadRow,
  read: Partial<UploadRow>,
): UploadRow | undefined {
  return db.transaction((transaction) => {
    const versions = readyVersions(transaction, studyId, name);
    const same = versions.find(({ sha256 }) => sha256 === read.sha256);
    if (same) return same;
    const version = 1 + (versions.at(0)?.version ?? 0);
    transaction
      .update(uploads)
      .set({ ...read, version, state: "ready" })
      .where(eq(uploads.id, id))
      .run();
    return undefined;
  });
}

export function deleteUpload(db: Database, uploadId: string): void {
  db.delete(uploads).where(eq(uploads.id, uploadId)).run();
}

/** Uploads that were still coming in when the program last stopped. Returns how many. */
export function deleteUnfinishedUploads(db: Database): number {
  return db.delete(uploads).where(eq(uploads.state, "receiving")).run().changes;
}

export function findUpload(db: Database, studyId: string, uploadId: string): UploadRow | undefined {
  return db
    .select()
    .from(uploads)
    .where(and(eq(uploads.studyId, studyId), eq(uploads.id, uploadId)))
    .get();
}

export function uploadNames(db: Database, studyId: string): string[] {
  return db
    .select({ name: uploads.name })
    .from(uploads)
    .where(eq(uploads.studyId, studyId))
    .all()
    .map((row) => row.name);
}

/** The study's uploads that are whole, newest first. */
export function uploadsOf(db: Database, studyId: string): DescribedUpload[] {
  return db
    .select()
    .from(uploads)
    .where(and(eq(uploads.studyId, studyId), eq(uploads.state, "ready")))
    .orderBy(desc(uploads.uploadedAt))
    .all()
    .map((upload) => describe(db, upload));
}

export function describe(db: Database, upload: UploadRow): DescribedUpload {
  const columns = db
    .select({ description: uploadColumns.description })
    .from(uploadColumns)
    .where(eq(uploadColumns.uploadId, upload.id))
    .orderBy(asc(uploadColumns.position))
    .all();
  const by = db.select({ name: user.name }).from(user).where(eq(user.id, upload.uploadedBy)).get();
  return {
    upload,
    uploadedByName: by?.name ?? "someone no longer here",
    descriptions: columns.map((column) => column.description),
  };
}
