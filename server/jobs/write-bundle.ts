import { createHash } from "node:crypto";
import { bundleContents, fileStems } from "../../shared/bundle/contents.ts";
import { readMe } from "../../shared/bundle/read-me.ts";
import { type BundledCell, type BundleManifest, bundleManifest } from "../../shared/schemas/replication-bundle.ts";
import { canonicalJson } from "../../shared/study/canonical-json.ts";
import type { BundleJob, BundleWritten } from "../bundle/bundle-job.ts";
import { writeZip, type ZipPart } from "../bundle/write-zip.ts";
import type { Database } from "../db/client.ts";
import { momentsToStore } from "../engine/cells/stored-moments.ts";
import { polling, type RunControl } from "../engine/run.ts";
import { prepared, type WorkerMemory } from "./run-cell.ts";
import { uploadedFile } from "./uploaded-file.ts";

type Moments = BundledCell["moments"];

/** Writes a replication bundle: texts, moments or data, and last the list of what lies in it. Errors: `Cancelled`. */
export async function writeBundle(
  job: BundleJob,
  db: Database,
  memory: WorkerMemory,
  control: RunControl,
): Promise<BundleWritten> {
  const hashes = new Map<string, string>();
  const moments = new Map<string, Moments>();
  const poll = polling(control, "writing the bundle");
  let manifest: BundleManifest | undefined;

  async function* parts(): AsyncGenerator<ZipPart> {
    const contents = bundleContents(job.about, job.cells);
    yield* contents.parts;
    const stems = fileStems(job.cells.map(({ cell }) => cell.name));
    for (const { cell, specification, data } of job.moments) {
      const stored = momentsToStore(specification, prepared({ data }, db, memory, control), control);
      const file = `moments/${stems.get(cell)}.json`;
      moments.set(cell, "absent" in stored ? stored : { file });
      if (!("absent" in stored)) yield { name: file, content: `${canonicalJson(stored)}\n` };
    }
    for (const { file, uploadId, bytes } of job.uploads) {
      const hash = createHash("sha256");
      const pieces = hashed(uploadedFile(db, uploadId, bytes).pieces(), hash);
      const isIncluded = job.manifest.data.some((one) => one.file === file && one.included);
      if (isIncluded) yield { name: file, content: pieces };
      else for await (const _ of pieces) poll();
      hashes.set(file, hash.digest("hex"));
    }
    manifest = completed(job.manifest, contents.listed, hashes, moments);
    yield { name: "README.txt", content: readMe(manifest) };
    yield { name: "bundle.json", content: `${JSON.stringify(manifest, undefined, 2)}\n` };
  }

  const bytes = await writeZip(job.path, parts(), new Date(job.manifest.madeAt), poll);
  if (manifest === undefined) throw new Error("an archive was written without its list of contents");
  return { bytes, manifest };
}

async function* hashed(pieces: AsyncIterable<Uint8Array>, hash: ReturnType<typeof createHash>) {
  for await (const piece of pieces) {
    hash.update(piece);
    yield piece;
  }
}

function completed(
  manifest: BundleJob["manifest"],
  cells: readonly BundledCell[],
  hashes: ReadonlyMap<string, string>,
  moments: ReadonlyMap<string, Moments>,
): BundleManifest {
  return bundleManifest.parse({
    ...manifest,
    cells: cells.map((cell) => {
      const stored = moments.get(cell.name);
      return stored === undefined ? cell : { ...cell, moments: stored };
    }),
    data: manifest.data.map((one) => ({ ...one, sha256: hashes.get(one.file) ?? one.sha256 })),
  });
}
