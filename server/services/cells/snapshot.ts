import type { CellSpecification } from "../../../shared/schemas/cell.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { type ResolvedCell, resolveCells } from "../../../shared/study/resolve.ts";
import { uploadRead, versionInWords } from "../../../shared/study/uploads.ts";
import type { CellJob } from "../../jobs/job.ts";
import type { Work } from "./durations.ts";
import type { StudyUpload } from "./study-uploads.ts";

/** A study's cells as they stand at one moment: read, looked up, fingerprinted. Never changed. */
export class Snapshot {
  readonly cells: readonly ResolvedCell[];
  /** By cell id. */
  readonly fingerprints: ReadonlyMap<string, string>;
  readonly #uploads: readonly StudyUpload[];
  readonly #byName: ReadonlyMap<string, ResolvedCell>;

  constructor(sources: readonly CellSource[], uploads: readonly StudyUpload[]) {
    this.cells = resolveCells(sources, uploads);
    this.fingerprints = fingerprintCells(this.cells, uploads);
    this.#uploads = uploads;
    this.#byName = new Map(this.cells.toReversed().map((cell) => [cell.name, cell]));
  }

  cell(cellId: string): ResolvedCell | undefined {
    return this.cells.find(({ id }) => id === cellId);
  }

  fingerprintOf(name: string): string | undefined {
    const cell = this.#byName.get(name);
    return cell && this.fingerprints.get(cell.id);
  }

  /** The job that answers a cell; none while it, or one it reads, has problems. */
  job(studyId: string, cell: ResolvedCell): CellJob | undefined {
    const fingerprint = this.fingerprints.get(cell.id);
    const data = this.#jobData(this.#dataBelow(cell));
    const specification = cell.specification;
    if (!specification || !fingerprint || !data) return undefined;
    return {
      studyId,
      fingerprint,
      specification,
      data,
      ...this.#systemBelow(specification),
      ...this.#priceChangeBelow(specification),
      ...this.#broaderSystem(specification),
    };
  }

  #jobData(cell: ResolvedCell | undefined): CellJob["data"] | undefined {
    const fingerprint = cell && this.fingerprints.get(cell.id);
    if (cell?.specification?.kind !== "data" || !fingerprint) return undefined;
    const upload = uploadRead(this.#uploads, cell.specification);
    return (
      upload && { fingerprint, specification: cell.specification, uploadId: upload.id, uploadSha256: upload.sha256 }
    );
  }

  /** The second system a cell names, which must be there when the cell has a fingerprint. */
  #broaderSystem(specification: CellSpecification): Pick<CellJob, "broader"> {
    if (specification.kind !== "elasticities" || specification.within === undefined) return {};
    const system = this.#byName.get(specification.within);
    const systemFingerprint = this.fingerprintOf(specification.within);
    const data = this.#jobData(system && this.#dataBelow(system));
    return data && systemFingerprint ? { broader: { data, systemFingerprint } } : {};
  }

  #systemBelow(specification: CellSpecification): Pick<CellJob, "systemFingerprint" | "systemSpecification"> {
    if (!("system" in specification) || specification.system === undefined) return {};
    const system = this.#byName.get(specification.system)?.specification;
    return {
      systemFingerprint: this.fingerprintOf(specification.system),
      ...(system?.kind === "system" && { systemSpecification: system }),
    };
  }

  #priceChangeBelow(specification: CellSpecification): Pick<CellJob, "priceChangeFingerprint"> {
    if (specification.kind !== "figure" || specification["price change"] === undefined) return {};
    const priceChangeFingerprint = this.fingerprintOf(specification["price change"]);
    return priceChangeFingerprint === undefined ? {} : { priceChangeFingerprint };
  }

  /** The upload beneath a cell. */
  uploadBelow(cell: ResolvedCell): StudyUpload | undefined {
    const data = this.#dataBelow(cell)?.specification;
    return data?.kind === "data" ? uploadRead(this.#uploads, data) : undefined;
  }

  /**
   * By cell id: what stands in the place of the upload that the cell's last finding rested on, in words.
   *
   * @param rested by cell id, the SHA-256 of that upload
   */
  replacedUploads(rested: ReadonlyMap<string, string>): Map<string, string> {
    const replaced = new Map<string, string>();
    for (const cell of this.cells) {
      const before = rested.get(cell.id);
      const now = before === undefined ? undefined : this.uploadBelow(cell);
      if (now && now.sha256 !== before) replaced.set(cell.id, versionInWords(this.#uploads, now));
    }
    return replaced;
  }

  /** What an estimation of the cell has to go through. */
  work(cell: ResolvedCell): Work | undefined {
    const data = this.#dataBelow(cell);
    if (data?.specification?.kind !== "data") return undefined;
    const { goods } = data.specification;
    const upload = uploadRead(this.#uploads, data.specification);
    return upload && { rows: upload.rows, goods: Object.keys(goods).length };
  }

  #dataBelow(cell: ResolvedCell): ResolvedCell | undefined {
    let at: ResolvedCell | undefined = cell;
    while (at && at.kind !== "data") at = this.#byName.get(readOf(at.specification) ?? "");
    return at;
  }
}

function readOf(specification: CellSpecification | undefined): string | undefined {
  if (!specification || specification.kind === "data") return undefined;
  if ("system" in specification && specification.system !== undefined) return specification.system;
  if (specification.kind === "figure" && specification["price change"]) return specification["price change"];
  return "data" in specification ? specification.data : undefined;
}
