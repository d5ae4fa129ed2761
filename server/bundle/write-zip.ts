import { once } from "node:events";
import { createWriteStream } from "node:fs";
import { finished } from "node:stream/promises";
import { Zip, ZipDeflate } from "fflate";

/** A part of an archive: a text, or bytes as they come. */
export interface ZipPart {
  readonly name: string;
  readonly content: string | AsyncIterable<Uint8Array>;
}

/** Writes an archive to a file of this machine, one part after the other, never a whole one in memory. Returns its bytes. */
export async function writeZip(
  path: string,
  parts: AsyncIterable<ZipPart>,
  madeAt: Date,
  poll: () => void = () => {},
): Promise<number> {
  const file = createWriteStream(path, { flags: "wx" });
  let bytes = 0;
  let failure: Error | undefined;
  const zip = new Zip((error, piece, isLast) => {
    if (error) failure = error;
    else {
      bytes += piece.length;
      file.write(piece);
    }
    if (isLast) file.end();
  });
  const settle = async () => {
    if (failure) throw failure;
    if (file.writableNeedDrain) await once(file, "drain");
    poll();
  };
  try {
    for await (const { name, content } of parts) {
      const part = new ZipDeflate(name, { level: 6 });
      part.mtime = madeAt;
      zip.add(part);
      if (typeof content === "string") part.push(new TextEncoder().encode(content), true);
      else {
        for await (const piece of content) {
          // The packer keeps no copy of its own of what it is handed, and what is stored must not change under it.
          part.push(Uint8Array.from(piece));
          await settle();
        }
        part.push(new Uint8Array(0), true);
      }
      await settle();
    }
    zip.end();
    await finished(file);
    if (failure) throw failure;
    return bytes;
  } catch (error) {
    file.destroy();
    throw error;
  }
}
