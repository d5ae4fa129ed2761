import { createHash } from "node:crypto";
import { createWriteStream } from "node:fs";
import { copyFile, mkdir, mkdtemp, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { basename, join } from "node:path";
import { pipeline } from "node:stream/promises";
import type { Finding } from "../../shared/schemas/cell.ts";
import type { BundledCell, BundledData } from "../../shared/schemas/replication-bundle.ts";
import { resolveParsed } from "../../shared/study/resolve.ts";
import { parseStudyFile } from "../../shared/study/study-file.ts";
import { compareFindings } from "../bundle/compare-findings.ts";
import { ReadBundle } from "../bundle/read-bundle.ts";
import { Refusal } from "../engine/refusal.ts";
import type { RunControl } from "../engine/run.ts";
import { estimateStudy } from "./estimate-study.ts";
import { withFileOnDisk } from "./file-on-disk.ts";
import { replicateWithoutData } from "./replicate-without-data.ts";
import type { ReplicatedCell, ReplicatedData, Replication } from "./replication.ts";

/**
 * Estimates the study of a bundle again, from its own data or from files given, and compares every number. Where data
 * are absent, systems are estimated from stored moments and matrices computed from coefficients; the rest says why it
 * could not be checked. Errors: `Refusal` for a bundle that cannot be read, or a file that the bundle does not name.
 */
export async function replicateBundle(
  bundlePath: string,
  given: readonly string[],
  control: RunControl,
): Promise<Replication> {
  const folder = await mkdtemp(join(tmpdir(), "tangency-replicate-"));
  try {
    return await withFileOnDisk(bundlePath, async (file) => {
      const bundle = await ReadBundle.open(file);
      await mkdir(join(folder, "data"));
      const data = await bringData(bundle, given, folder);
      return await replicateIn(folder, bundle, data, control);
    });
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

async function replicateIn(
  folder: string,
  bundle: ReadBundle,
  data: readonly ReplicatedData[],
  control: RunControl,
): Promise<Replication> {
  const { manifest } = bundle;
  const text = await bundle.text(manifest.specification);
  const absent = new Set(data.filter(({ standing }) => standing === "absent").map(({ file }) => file));
  const without = cellsWithout(
    text,
    manifest.data.filter(({ file }) => absent.has(file)).flatMap(({ cells }) => cells),
  );
  const only = manifest.cells.map(({ name }) => name).filter((name) => !without.has(name));
  const sheets = new Map(
    manifest.data.flatMap(({ file, sheet }) => (sheet === undefined ? [] : [[file, sheet] as const])),
  );
  const path = join(folder, "study.yaml");
  await writeFile(path, text);
  const { findings, complaints } =
    only.length === 0 ? { findings: {}, complaints: [] } : await estimateStudy(text, path, { only, sheets, control });
  const cells: ReplicatedCell[] = [];
  for (const cell of manifest.cells) {
    cells.push(
      without.has(cell.name)
        ? await replicateWithoutData(bundle, cell, text, control)
        : await comparedWith(bundle, cell, findings[cell.name]),
    );
  }
  const { study, program, madeAt, leftOut } = manifest;
  return { bundle: { study, program, madeAt, leftOut }, data, cells, complaints };
}

async function comparedWith(
  bundle: ReadBundle,
  cell: BundledCell,
  found: Finding | undefined,
): Promise<ReplicatedCell> {
  const { name, kind, finding } = cell;
  if (found === undefined) return { name, kind, because: "The program refuses it now." };
  if (finding === undefined) return { name, kind, from: "data", because: "Nothing of its own is stored to compare." };
  // By way of JSON, as the bundled one came: no undefined members, no negative zeros.
  const again: unknown = JSON.parse(JSON.stringify(found));
  return { name, kind, from: "data", compared: compareFindings(await bundle.json(finding), again) };
}

/** The cells that rest on some cells, and these. */
function cellsWithout(text: string, names: readonly string[]): Set<string> {
  const without = new Set(names);
  const cells = resolveParsed(parseStudyFile(text).cells, []);
  for (let before = -1; before !== without.size; ) {
    before = without.size;
    for (const { name, reads } of cells) if (reads.some((read) => without.has(read))) without.add(name);
  }
  return without;
}

/** Puts every file there is where the study file says it lies. */
async function bringData(bundle: ReadBundle, given: readonly string[], folder: string): Promise<ReplicatedData[]> {
  const files = await Promise.all(given.map(async (path) => ({ path, sha256: await sha256OfFile(path) })));
  const unclaimed = new Set(files);
  const brought: ReplicatedData[] = [];
  for (const one of bundle.manifest.data) {
    const fitting = chosen([...unclaimed], one, bundle.manifest.data.length);
    if (fitting !== undefined) unclaimed.delete(fitting);
    brought.push(await bring(bundle, one, fitting, folder));
  }
  const [left] = unclaimed;
  if (left === undefined) return brought;
  const names = bundle.manifest.data.map(({ file }) => basename(file)).join(", ");
  throw new Refusal(
    `${basename(left.path)} is none of the ${bundle.manifest.data.length} files that the bundle names: ${names}.`,
  );
}

/** The very file, or one of its name; where only one is named and one is given, that one. */
function chosen<F extends { path: string; sha256: string }>(
  files: readonly F[],
  one: BundledData,
  named: number,
): F | undefined {
  const exact = files.find(({ sha256 }) => sha256 === one.sha256);
  const called = files.find(({ path }) => basename(path) === basename(one.file));
  return exact ?? called ?? (named === 1 && files.length === 1 ? files[0] : undefined);
}

async function bring(
  bundle: ReadBundle,
  { file, sha256: expected, included }: BundledData,
  given: { readonly path: string; readonly sha256: string } | undefined,
  folder: string,
): Promise<ReplicatedData> {
  const target = join(folder, "data", basename(file));
  if (given !== undefined) {
    await copyFile(given.path, target);
    return { file, standing: "given", sha256: given.sha256, ...(expected && { expected }) };
  }
  if (!included) return { file, standing: "absent", ...(expected && { expected }) };
  const hash = createHash("sha256");
  await pipeline(
    bundle.pieces(file),
    async function* (pieces: AsyncIterable<Uint8Array>) {
      for await (const piece of pieces) {
        hash.update(piece);
        yield piece;
      }
    },
    createWriteStream(target),
  );
  return { file, standing: "in the bundle", sha256: hash.digest("hex"), ...(expected && { expected }) };
}

async function sha256OfFile(path: string): Promise<string> {
  const hash = createHash("sha256");
  await withFileOnDisk(path, async (file) => {
    for await (const piece of file.pieces()) hash.update(piece);
  });
  return hash.digest("hex");
}
