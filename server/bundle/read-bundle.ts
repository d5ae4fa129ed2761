import { type BundleManifest, bundleManifest } from "../../shared/schemas/replication-bundle.ts";
import type { FileBytes } from "../engine/columns/file-bytes.ts";
import { ZipEntries } from "../engine/columns/workbook/zip-entries.ts";
import { Refusal } from "../engine/refusal.ts";

/** More than any list of contents or study file. */
const LONGEST_TEXT = 64 * 1024 ** 2;

/** A replication bundle, opened; its parts are read as they are asked for, within the limits of any archive. */
export class ReadBundle {
  readonly manifest: BundleManifest;
  private readonly entries: ZipEntries;

  private constructor(entries: ZipEntries, manifest: BundleManifest) {
    this.entries = entries;
    this.manifest = manifest;
  }

  /** Errors: `Refusal` for what is no bundle, is cut short, or has parts larger than any bundle's. */
  static async open(file: FileBytes): Promise<ReadBundle> {
    const entries = new ZipEntries(file, "bundle");
    const read = bundleManifest.safeParse(jsonOf("bundle.json", await textOf(entries, "bundle.json")));
    if (!read.success) {
      const [{ path, message }] = read.error.issues;
      throw new Refusal(`bundle.json of the bundle, ${path.join(".") || "as a whole"}: ${message}.`);
    }
    return new ReadBundle(entries, read.data);
  }

  text(name: string): Promise<string> {
    return textOf(this.entries, name);
  }

  async json(name: string): Promise<unknown> {
    return jsonOf(name, await this.text(name));
  }

  pieces(name: string): AsyncIterable<Uint8Array> {
    return this.entries.read(name);
  }
}

async function textOf(entries: ZipEntries, name: string): Promise<string> {
  const pieces: Uint8Array[] = [];
  let bytes = 0;
  for await (const piece of entries.read(name)) {
    bytes += piece.length;
    if (bytes > LONGEST_TEXT)
      throw new Refusal(`${name} of the bundle has more than ${LONGEST_TEXT} bytes and is not read.`);
    pieces.push(piece);
  }
  return Buffer.concat(pieces).toString("utf8");
}

function jsonOf(name: string, text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    throw new Refusal(`${name} of the bundle is no JSON: ${(error as Error).message}.`);
  }
}
