import { createReadStream, readSync } from "node:fs";
import { type FileHandle, open } from "node:fs/promises";
import type { FileBytes } from "../engine/columns/file-bytes.ts";

/** A file of this machine, read where it lies, for as long as `use` does. Rejects with the system's code where it cannot. */
export async function withFileOnDisk<T>(path: string, use: (file: FileBytes) => Promise<T>): Promise<T> {
  const handle = await open(path);
  try {
    return await use(await bytesOf(handle, path));
  } finally {
    await handle.close();
  }
}

async function bytesOf(handle: FileHandle, path: string): Promise<FileBytes> {
  const { size } = await handle.stat();
  return {
    size,
    slice(from, to) {
      const bytes = new Uint8Array(Math.max(0, to - from));
      let read = 0;
      while (read < bytes.length) {
        const got = readSync(handle.fd, bytes, read, bytes.length - read, from + read);
        if (got === 0) throw new Error(`${path} became shorter while it was read`);
        read += got;
      }
      return bytes;
    },
    pieces: () => createReadStream(path),
  };
}
