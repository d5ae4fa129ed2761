import type { CellKind, FindingOf } from "../../shared/schemas/cell.ts";
import type { ElasticitiesFinding } from "../../shared/schemas/elasticities.ts";
import { ALSO_KINDS, type AlsoKind } from "../../shared/schemas/referee-copy.ts";
import type { pointSpecification } from "../../shared/schemas/slutsky.ts";
import type { CellStatus } from "../../shared/schemas/status.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { parseCell } from "../../shared/study/parse-cell.ts";
import { conflict, notFound } from "../errors.ts";
import type { Cells, SourcesOf } from "./ports.ts";
import type { AlsoCell, SealedCells } from "./sealed-content.ts";

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
    if (!kinds.some((kind) => kind === status.kind)) {
      throw conflict(`${status.name} is a ${status.kind} cell; a ${kinds.join(" or ")} cell is needed here.`);
    }
    if (status.state !== "current" || status.fingerprint === undefined) {
      const because = status.because === undefined ? "" : ` (${status.because.replace(/\.$/, "")})`;
      throw conflict(`${status.name} is ${status.state}${because}, and only a current finding is sealed.`);
    }
    const stored = await cells.finding(study.studyId, status.fingerprint);
    const cell = study.sources.find(({ id }) => id === status.cellId);
    if (stored === undefined || cell === undefined) throw conflict(`${status.name} is changing; seal it again.`);
    return { cell, finding: stored.finding as FindingOf<K> };
  }

  async function alsoCell(study: Standing, cellId: string): Promise<AlsoCell> {
    const found = await current<AlsoKind>(study, statusOf(study, cellId), ALSO_KINDS);
    refuseOneHousehold(found);
    return found;
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

/** Quantiles nearer the ends than this are the total of the poorest or the richest household asked. */
const OUTERMOST_QUANTILE = 0.01;

/**
 * Groups of fewer households are not sealed. From practice: many statistics offices ask for ten or more behind a
 * published figure; what the data's owner asks comes first.
 */
const SMALLEST_GROUP = 10;

/** What stands at a row of the upload, or for a handful of them, would show a referee those households. */
function refuseOneHousehold({ cell, finding }: { cell: CellSource; finding: FindingOf<CellKind> }): void {
  const { name, source } = cell;
  if (finding.kind === "elasticities") refuseSmallGroups(name, finding);
  if (finding.kind !== "slutsky" && finding.kind !== "elasticities") return;
  const { specification } = parseCell(finding.kind, source);
  if (specification?.kind !== finding.kind) throw conflict(`${name} is changing; seal it again.`);
  const pointName = finding.kind === "slutsky" ? finding.pointName : finding.groups[0].name;
  if (specification.at !== undefined) refuseOnePoint(name, pointName, specification.at);
}

function refuseOnePoint(name: string, pointName: string, at: typeof pointSpecification._output): void {
  if (typeof at === "string" || "prices" in at) return;
  if ("row" in at) {
    throw conflict(
      `${name} stands at ${pointName}, the prices and total of one household: seal it at the base point or the mean.`,
    );
  }
  const fraction = Number(at.x.slice("quantile ".length));
  if (fraction >= OUTERMOST_QUANTILE && fraction <= 1 - OUTERMOST_QUANTILE) return;
  throw conflict(
    `${name} stands at ${pointName}, the total of one household: seal it at a quantile from ${OUTERMOST_QUANTILE} to ${1 - OUTERMOST_QUANTILE}.`,
  );
}

function refuseSmallGroups(name: string, { groups, without }: ElasticitiesFinding): void {
  const small = [...groups, ...without].find(({ rows }) => rows !== undefined && rows < SMALLEST_GROUP);
  if (small === undefined) return;
  throw conflict(
    `${name} has a group of ${small.rows} ${small.rows === 1 ? "row" : "rows"} (${small.name}), and groups of fewer than ${SMALLEST_GROUP} are not sealed: they may show whose they are.`,
  );
}
