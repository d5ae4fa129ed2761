import type { UploadShape } from "./columns.ts";
import { fingerprintCell } from "./fingerprint.ts";
import { PROGRAM_VERSION } from "./program.ts";
import type { ResolvedCell } from "./resolve.ts";
import { sortByReading } from "./topology.ts";
import { uploadRead } from "./uploads.ts";

/**
 * The fingerprint of every cell that is sound and whose reading, all the way up, is sound too; by cell id.
 * Nothing has to be computed for it: a cell's fingerprint rests on the questions above it, not their findings.
 */
export function fingerprintCells(
  cells: readonly ResolvedCell[],
  uploads: readonly UploadShape[],
  engineVersion: string = PROGRAM_VERSION,
): Map<string, string> {
  const sound = new Map(cells.flatMap((cell) => (cell.specification ? [[cell.name, cell] as const] : [])));
  const byName = new Map<string, string>();
  const byId = new Map<string, string>();
  const { order } = sortByReading(new Map([...sound].map(([name, { reads }]) => [name, reads])));
  for (const name of order) {
    const { id, specification, reads } = sound.get(name)!;
    const upstream = reads.map((read) => byName.get(read));
    if (!specification || !upstream.every((fingerprint) => fingerprint !== undefined)) continue;
    const upload = specification.kind === "data" ? uploadRead(uploads, specification) : undefined;
    const fingerprint = fingerprintCell({
      kind: specification.kind,
      specification,
      upstream,
      ...(upload && { uploadSha: upload.sha256 }),
      engineVersion,
    });
    byName.set(name, fingerprint);
    byId.set(id, fingerprint);
  }
  return byId;
}
