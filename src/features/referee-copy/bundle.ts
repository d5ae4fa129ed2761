import { strToU8, zipSync } from "fflate";
import { bundleContents, type ContentCell } from "../../../shared/bundle/contents.ts";
import { readMe } from "../../../shared/bundle/read-me.ts";
import type { Finding } from "../../../shared/schemas/cell.ts";
import type { RefereeCopy, SealedContent } from "../../../shared/schemas/referee-copy.ts";
import { type BundleManifest, bundleManifest } from "../../../shared/schemas/replication-bundle.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";

/**
 * A replication bundle of what a referee copy holds, made in the reader's browser: no rows and no moments, so that the
 * matrix is computed again from the coefficients, and everything else by whoever has the data.
 */
export function sealedBundle({ content }: RefereeCopy): Uint8Array {
  const { cells, study } = content;
  const kept = cells.sources.filter(({ kind }) => kind !== "text");
  const files = filesOf(kept);
  const { parts, listed } = bundleContents(
    { title: study.title, lede: "", isWithheld: true, files: Object.fromEntries(files.flatMap(namesWithFile)) },
    kept.map((cell) => ({ cell, ...sealedOf(content, cell.name, cell.source) })),
  );
  const manifest = bundleManifest.parse({
    format: "tangency replication bundle 1",
    program: content.program,
    study: study.title,
    madeAt: content.sealedAt,
    specification: "study.yaml",
    cells: listed,
    leftOut: cells.sources
      .filter(({ kind }) => kind === "text")
      .map(({ name }) => ({ name, because: "A text is read in the referee copy, as it stood when it was sealed." })),
    data: files.map(({ file, names }) => ({ file, cells: names, included: false })),
  } satisfies BundleManifest);
  const all = [
    ...parts,
    { name: "README.txt", content: readMe(manifest) },
    { name: "bundle.json", content: `${JSON.stringify(manifest, undefined, 2)}\n` },
  ];
  return zipSync(Object.fromEntries(all.map(({ name, content }) => [name, strToU8(content)])));
}

interface ReadFile {
  readonly file: string;
  readonly names: string[];
}

/** The files that data cells read, under plain names: a file's own may be withheld, and may say whose it is. */
function filesOf(sources: SealedContent["cells"]["sources"]): ReadFile[] {
  const byUpload = new Map<string, string[]>();
  for (const { name, source } of sources.filter(({ kind }) => kind === "data")) {
    const { upload, version } = parseCell("data", source).written;
    const key = `${String(upload)} ${String(version)}`;
    byUpload.set(key, [...(byUpload.get(key) ?? []), name]);
  }
  return [...byUpload.values()].map((names, at) => ({ file: `data/file-${at + 1}`, names }));
}

const namesWithFile = ({ file, names }: ReadFile) => names.map((name) => [name, file] as const);

/** What is sealed of a cell; nothing of those that the sealed ones only rest on. */
function sealedOf(content: SealedContent, name: string, source: string): Omit<ContentCell, "cell"> {
  const { cells, slutsky, system, data, accounting, also = [] } = content;
  if (name === cells.data) {
    const { meanTotal, weighted, fingerprint: dataFingerprint } = data;
    return { sums: { kind: "data", dataFingerprint, meanTotal, weighted, accounting } };
  }
  const finding =
    name === cells.matrix ? slutsky : name === cells.system ? system : also.find((one) => one.name === name)?.finding;
  if (finding === undefined || finding.kind === "text") return {};
  const { specification: asked } = parseCell(finding.kind, source);
  return {
    finding: whole(finding),
    ...(asked?.kind === "system" && { asked }),
  };
}

/** Sealed without its rows; a bundle without data leaves them out again. */
function whole(finding: Exclude<Finding, { kind: "slutsky" | "text" }> | SealedContent["slutsky"]): Finding {
  return finding.kind === "slutsky" ? { ...finding, brokenRows: [] } : finding;
}
