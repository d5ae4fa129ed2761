import { randomUUID } from "node:crypto";
import { rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { BundleManifest, NewReplicationBundle } from "../../shared/schemas/replication-bundle.ts";
import { resolveCells } from "../../shared/study/resolve.ts";
import { formulasUsedOn } from "../../shared/study/unconditional-of.ts";
import { versionsOf } from "../../shared/study/uploads.ts";
import type { BundleJob, DataRead } from "../bundle/bundle-job.ts";
import type { Database } from "../db/client.ts";
import { peopleOf } from "../db/queries/people.ts";
import { findStudy } from "../db/queries/studies.ts";
import { findUpload, type UploadRow, uploadsOf } from "../db/queries/uploads.ts";
import { conflict } from "../errors.ts";
import type { Actor } from "../policies/can.ts";
import { type Access, noSuchStudy } from "./access.ts";
import { type BundledSource, cellsToBundle } from "./bundled-cells.ts";
import { studyUploads } from "./cells/study-uploads.ts";
import type { RecordInJournal } from "./journal.ts";
import type { Cells, SourcesOf, WriteBundle } from "./ports.ts";

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly cells: Pick<Cells, "status" | "finding" | "dataOf">;
  readonly sourcesOf: SourcesOf;
  readonly writeBundle: WriteBundle;
  readonly record: RecordInJournal;
  /** Name and version of the program. */
  readonly program: string;
}

/** A bundle as it lies on this machine until it is sent. */
export interface MadeBundle {
  readonly path: string;
  readonly bytes: number;
  /** What the file is called where it arrives. */
  readonly name: string;
  readonly remove: () => Promise<void>;
}

/** A file of the study that cells of the bundle read, under the name it has there. */
interface BundledFile {
  readonly file: string;
  readonly upload: UploadRow;
  readonly cells: readonly string[];
}

export type ReplicationBundleService = ReturnType<typeof createReplicationBundleService>;

export function createReplicationBundleService({
  db,
  access,
  cells,
  sourcesOf,
  writeBundle,
  record,
  program,
}: Collaborators) {
  async function readsOf(studyId: string, sources: readonly BundledSource[]): Promise<Map<string, DataRead>> {
    const reads = new Map<string, DataRead>();
    for (const { cell } of sources.filter(({ cell }) => cell.kind === "data")) {
      const read = await cells.dataOf(studyId, cell.id);
      if (read === undefined) throw conflict(`${cell.name} is changing; make the bundle again.`);
      reads.set(cell.name, read);
    }
    return reads;
  }

  function filesOf(studyId: string, reads: ReadonlyMap<string, DataRead>): BundledFile[] {
    const all = uploadsOf(db, studyId).map(({ upload }) => upload);
    const byUpload = new Map<string, string[]>();
    for (const [name, { uploadId }] of reads) byUpload.set(uploadId, [...(byUpload.get(uploadId) ?? []), name]);
    return [...byUpload].map(([uploadId, names]) => {
      const upload = findUpload(db, studyId, uploadId);
      if (upload === undefined) throw conflict(`The file that ${names[0]} reads is gone; make the bundle again.`);
      return { file: `data/${nameInBundle(upload, all)}`, upload, cells: names };
    });
  }

  return {
    /**
     * Writes the study's current findings with all they rest on into one archive on this machine.
     * Throws 404 and 403 as the policies say, 409 where nothing is current or where a text to go along holds the address
     * of one of the study's people.
     */
    async make(
      actor: Actor,
      studyId: string,
      { data }: NewReplicationBundle,
      signal: AbortSignal,
    ): Promise<MadeBundle> {
      access.allow(actor, "replication bundle.make", studyId);
      const study = findStudy(db, studyId);
      if (study === undefined) throw noSuchStudy();
      const isWithheld = data === "withheld";
      const [{ cells: statuses }, sources] = await Promise.all([cells.status(studyId), sourcesOf(studyId)]);
      const chosen = await cellsToBundle({
        statuses,
        sources,
        resolved: resolveCells(sources, studyUploads(db, studyId)),
        findingOf: async (fingerprint) => (await cells.finding(studyId, fingerprint))?.finding,
        isWithheld,
      });
      if (chosen.cells.every(({ finding }) => finding === undefined)) {
        throw conflict("No cell of this study is current, and a bundle holds findings that are.");
      }
      const reads = await readsOf(studyId, chosen.cells);
      const files = filesOf(studyId, reads);
      refuseAddresses(chosen.cells, peopleOf(db, studyId));
      const path = join(tmpdir(), `tangency-bundle-${randomUUID()}.zip`);
      const remove = () => rm(path, { force: true });
      const job: BundleJob = {
        path,
        manifest: {
          format: "tangency replication bundle 1",
          program,
          study: study.title,
          madeAt: new Date().toISOString(),
          specification: "study.yaml",
          leftOut: [...chosen.leftOut],
          data: files.map((one) => listedFile(db, one, !isWithheld)),
        },
        about: {
          title: study.title,
          lede: study.lede,
          isWithheld,
          files: Object.fromEntries(files.flatMap(({ file, cells }) => cells.map((name) => [name, file]))),
        },
        cells: chosen.cells.map((one) => contentOf(one, chosen.cells)),
        uploads: files.map(({ file, upload }) => ({ file, uploadId: upload.id, bytes: upload.bytes })),
        moments: isWithheld ? momentsOf(chosen.cells, reads) : [],
      };
      try {
        const { bytes } = await writeBundle(job, signal);
        record({ studyId, actor, action: "replication bundle made", subject: `data ${data}` });
        return { path, bytes, name: `replication-${slug(study.title)}.zip`, remove };
      } catch (error) {
        await remove();
        throw error;
      }
    },
  };
}

function contentOf({ cell, resolved, fingerprint, finding }: BundledSource, all: readonly BundledSource[]) {
  const { specification } = resolved;
  const formulas = () =>
    formulasUsedOn(
      cell.name,
      all.map((one) => one.resolved),
    );
  return {
    cell,
    ...(fingerprint !== undefined && { fingerprint }),
    ...(finding !== undefined && { finding }),
    ...(specification?.kind === "system" && { asked: specification, unconditional: formulas() }),
  };
}

function momentsOf(cells: readonly BundledSource[], reads: ReadonlyMap<string, DataRead>): BundleJob["moments"] {
  return cells.flatMap(({ cell, resolved: { specification } }) => {
    const data = specification?.kind === "system" ? reads.get(specification.data) : undefined;
    if (specification?.kind !== "system" || data === undefined) return [];
    return [{ cell: cell.name, specification, data }];
  });
}

/** The latest version has the name of its upload; an older one says which it is. */
function nameInBundle(upload: UploadRow, all: readonly UploadRow[]): string {
  const isLatest = versionsOf(all, upload.name)[0]?.id === upload.id;
  const plain = upload.name.replaceAll(/[\\/]/g, "_");
  return isLatest ? plain : `version-${upload.version}-${plain}`;
}

function listedFile(
  db: Database,
  { file, upload, cells }: BundledFile,
  included: boolean,
): BundleManifest["data"][number] {
  const shape = studyUploads(db, upload.studyId).find(({ id }) => id === upload.id);
  return {
    cells: [...cells],
    file,
    bytes: upload.bytes,
    rows: upload.rows ?? 0,
    columns: shape?.columns.length ?? 0,
    ...(upload.sheet !== null && { sheet: upload.sheet }),
    included,
  };
}

/** Comments and prose are written by people, and an address among them would leave with the bundle. */
function refuseAddresses(cells: readonly BundledSource[], people: readonly { email: string }[]): void {
  for (const { cell } of cells) {
    const lower = cell.source.toLowerCase();
    const found = people.find(({ email }) => lower.includes(email.toLowerCase()));
    if (found === undefined) continue;
    throw conflict(
      `${cell.name} holds the address ${found.email}, which would leave with the bundle: take it out first.`,
    );
  }
}

function slug(title: string): string {
  const plain = title.normalize("NFKD").replaceAll(/\p{M}/gu, "").toLowerCase();
  return (
    plain
      .replaceAll(/[^a-z0-9]+/g, "-")
      .replaceAll(/^-|-$/g, "")
      .slice(0, 60) || "study"
  );
}
