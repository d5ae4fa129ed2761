import { CELL_KINDS, type CellKind, type FindingOf } from "../../shared/schemas/cell.ts";
import { ALSO_KINDS, type AlsoKind } from "../../shared/schemas/referee-copy.ts";
import type { CellStatus } from "../../shared/schemas/status.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { conflict, notFound } from "../errors.ts";
import { refuseOneHousehold } from "./one-household.ts";
import type { Cells, SourcesOf } from "./ports.ts";
import type { AlsoCell, SealedCells } from "./sealed-content.ts";
import { sealText } from "./sealed-text.ts";

interface Collaborators {
  readonly cells: Pick<Cells, "status" | "finding">;
  readonly sourcesOf: SourcesOf;
}

/** A study as it stands while something of it is sealed. */
interface Standing {
  readonly studyId: string;
  readonly statuses: readonly CellStatus[];
  readonly sources: readonly CellSource[];
}

/** Collects what a referee copy is made of. Throws 409 when a cell is not current, or shows a single household. */
export function collectSealedCells({ cells, sourcesOf }: Collaborators) {
  /** The current finding of a cell with its source. */
  async function current<K extends CellKind>(study: Standing, status: CellStatus, kinds: readonly K[]) {
    const cell = currentCell(study, status, kinds);
    const { name, fingerprint } = status;
    const stored = fingerprint === undefined ? undefined : await cells.finding(study.studyId, fingerprint);
    if (fingerprint === undefined || stored === undefined) throw conflict(`${name} is changing; seal it again.`);
    return { cell, fingerprint, finding: stored.finding as FindingOf<K> };
  }

  async function alsoCell(study: Standing, cellId: string): Promise<AlsoCell> {
    const status = statusOf(study, cellId);
    if (status.kind === "text") return alsoText(study, status);
    const { cell, finding } = await current<ComputedKind>(study, status, ALSO_KINDS.filter(isComputed));
    refuseOneHousehold({ cell, finding });
    return { cell, finding };
  }

  /** Of a text nothing is stored: its numbers are those of the cells it quotes, which are current when it is. */
  async function alsoText(study: Standing, status: CellStatus): Promise<AlsoCell> {
    const cell = currentCell(study, status, ["text"]);
    const named = study.statuses.filter(({ name }) => status.reads.includes(name));
    const quoted = await Promise.all(named.map((one) => current(study, one, CELL_KINDS)));
    return { cell, finding: sealText(cell, new Map(quoted.map((one) => [one.cell.name, one]))) };
  }

  return async (studyId: string, cellId: string, alsoIds: readonly string[]): Promise<SealedCells> => {
    const [{ cells: statuses }, sources] = await Promise.all([cells.status(studyId), sourcesOf(studyId)]);
    const study: Standing = { studyId, statuses, sources };
    const wanted = statusOf(study, cellId);
    const matrix = await current(study, wanted, ["slutsky"]);
    const system = await current(study, readBy(study, wanted), ["system"]);
    const data = await current(study, readBy(study, readBy(study, wanted)), ["data"]);
    refuseOneHousehold(matrix);
    const furtherIds = [...new Set(alsoIds)].filter((id) => id !== matrix.cell.id);
    const also = await Promise.all(furtherIds.map((id) => alsoCell(study, id)));
    const named = new Set([matrix, system, data, ...also].map(({ cell }) => cell.id));
    return { matrix, system, data, also, read: readByAll(study, also).filter(({ id }) => !named.has(id)) };
  };
}

type ComputedKind = Exclude<AlsoKind, "text">;
const isComputed = (kind: AlsoKind): kind is ComputedKind => kind !== "text";

/** The source of a cell that is current, and of a kind that is wanted. */
function currentCell(study: Standing, status: CellStatus, kinds: readonly CellKind[]): CellSource {
  const { name, kind, state, because } = status;
  if (!kinds.some((one) => one === kind)) {
    throw conflict(`${name} is a ${kind} cell; a ${kinds.join(" or ")} cell is needed here.`);
  }
  if (state !== "current") {
    const told = because === undefined ? "" : ` (${because.replace(/\.$/, "")})`;
    throw conflict(`${name} is ${state}${told}, and only a current ${kind === "text" ? "text" : "finding"} is sealed.`);
  }
  const cell = study.sources.find(({ id }) => id === status.cellId);
  if (cell === undefined) throw conflict(`${name} is changing; seal it again.`);
  return cell;
}

function statusOf({ statuses }: Standing, cellId: string): CellStatus {
  const status = statuses.find((each) => each.cellId === cellId);
  if (status === undefined) throw notFound("There is no such cell in this study.");
  return status;
}

/** The other cell that a cell reads, as its source names it first. */
function readBy({ statuses }: Standing, reader: CellStatus): CellStatus {
  const read = statuses.find(({ name }) => name === reader.reads[0]);
  if (read === undefined) {
    throw conflict(`${reader.name} reads ${reader.reads[0] ?? "no cell"}, which is not in the study.`);
  }
  return read;
}

/** Every cell that some cells rest on, in the study's order. */
function readByAll({ statuses, sources }: Standing, readers: readonly AlsoCell[]): CellSource[] {
  const reached = new Set(readers.map(({ cell }) => cell.name));
  // A set grows while it is walked, and what is added is walked too.
  for (const name of reached) {
    for (const read of statuses.find((status) => status.name === name)?.reads ?? []) reached.add(read);
  }
  return sources.filter(({ name }) => reached.has(name));
}
