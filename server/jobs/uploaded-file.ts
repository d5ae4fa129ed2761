import { and, eq } from "drizzle-orm";
import type { Database } from "../db/client.ts";
import { uploadChunks } from "../db/schema/uploads.ts";
import type { FileBytes } from "../engine/columns/file-bytes.ts";

/** The stored bytes of an upload: kept in pieces of one length, the last one shorter. */
export function uploadedFile(db: Database, uploadId: string, size: number): FileBytes {
  const piece = (position: number): Buffer | undefined =>
    db
      .select({ bytes: uploadChunks.bytes })
      .from(uploadChunks)
      .where(and(eq(uploadChunks.uploadId, uploadId), eq(uploadChunks.position, position)))
      .get()?.bytes;
  const first = piece(0);
  let recent = { position: 0, bytes: first };
  const recentPiece = (position: number) => {
    if (recent.position !== position) recent = { position, bytes: piece(position) };
    return recent.bytes;
  };
  return {
    size,
    slice(from, to) {
      const slice = new Uint8Array(Math.max(0, to - from));
      const length = first?.length ?? 1;
      for (let at = from; at < to; ) {
        const position = Math.floor(at / length);
        const bytes = recentPiece(position);
        if (bytes === undefined) throw new Error(`piece ${position} of upload ${uploadId} is missing`);
        const part = bytes.subarray(at - position * length, to - position * length);
        if (part.length === 0) throw new Error(`upload ${uploadId} ends before byte ${to}`);
        slice.set(part, at - from);
        at += part.length;
      }
      return slice;
    },
    async *pieces() {
      for (let position = 0; ; position++) {
        const bytes = piece(position);
        if (bytes === undefined) return;
        yield bytes;
      }
    },
  };
}
