import type { CellStatus, StudyStatus } from "../../../shared/schemas/status.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { describeChanges } from "../../../shared/study/changes.ts";
import type { UploadShape } from "../../../shared/study/columns.ts";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { inOrder } from "../../../shared/study/order.ts";
import { parseCell, type StudyCell } from "../../../shared/study/parse-cell.ts";
import { type ResolvedCell, resolveParsed } from "../../../shared/study/resolve.ts";
import { lacksUpload } from "./cell-words.ts";
import type { Standing } from "./standing.ts";
import { writtenStanding } from "./written-standing.ts";

export { freshName, freshSource, nameOfCopy } from "./cell-words.ts";
export { sourcesAfterRenaming } from "./rename.ts";
export { sourcesAfterRenamingGood } from "./rename-good.ts";

/** Reads a cell's text once for as long as it stays as it is: whoever types changes one text of many. */
const known = new WeakMap<CellSource, StudyCell>();

function read(cell: CellSource): StudyCell {
  const before = known.get(cell);
  if (before) return before;
  const now = { ...cell, parsed: parseCell(cell.kind, cell.source) };
  known.set(cell, now);
  return now;
}

/** The cells set beside each other, as their texts say. */
export const resolveHere = (cells: readonly CellSource[], uploads: readonly UploadShape[]): ResolvedCell[] =>
  resolveParsed(inOrder(cells).map(read), uploads);

/** Where every cell stands by its text as it is here. */
export function readStandings(
  cells: readonly CellSource[],
  resolved: readonly ResolvedCell[],
  uploads: readonly UploadShape[],
  status: StudyStatus | undefined,
): Standing[] {
  return standingsOf(cells, resolved, fingerprintCells(resolved, uploads), status);
}

/**
 * Where every cell stands, in order. The document here may be ahead of the server: a finding is shown only
 * while its fingerprint is that of the question as it stands here.
 */
export function standingsOf(
  cells: readonly CellSource[],
  resolved: readonly ResolvedCell[],
  fingerprints: ReadonlyMap<string, string>,
  status: StudyStatus | undefined,
): Standing[] {
  const statuses = new Map(status?.cells.map((one) => [one.cellId, one]));
  const isAhead = (own: ResolvedCell) => {
    const told = statuses.get(own.id);
    return told?.state === "current" && told.fingerprint !== fingerprints.get(own.id);
  };
  const ahead = new Set(resolved.filter(isAhead).map(({ name }) => name));
  const standings = cells.flatMap((cell): Standing[] => {
    const own = resolved.find(({ id }) => id === cell.id);
    if (!own) return [];
    const readBy = resolved.filter(({ reads }) => reads.includes(cell.name)).map(({ name }) => name);
    const common = { cell, kind: own.kind, reads: own.reads, readBy };
    return [{ ...common, ...stands(own, cell, statuses.get(cell.id), ahead) }];
  });
  return standings.map((standing) => (standing.kind === "text" ? writtenStanding(standing, standings) : standing));
}

function stands(own: ResolvedCell, cell: CellSource, status: CellStatus | undefined, ahead: ReadonlySet<string>) {
  const kept = { ...(status?.last && { last: status.last }), ...(status && { status }), problems: [] };
  if (lacksUpload(cell)) return { ...kept, state: "draft" as const, because: "waits for a file", waitsForFile: true };
  if (own.problems.length > 0) {
    const told = status?.state === "failed" ? status.because : undefined;
    return { ...kept, state: "failed" as const, because: told ?? "before estimation", problems: own.problems };
  }
  if (!status) return { ...kept, state: "draft" as const };
  if (ahead.has(own.name)) return { ...kept, state: "out of date" as const, because: whyAhead(own, status, ahead) };
  const { state, because, problems, aboutMs, progress, fingerprint } = status;
  return {
    ...kept,
    state,
    problems,
    ...(because !== undefined && { because }),
    ...(aboutMs !== undefined && { aboutMs }),
    ...(progress && { progress }),
    ...(state === "current" && fingerprint && { fingerprint }),
  };
}

/** What has changed here and not reached the server yet. */
function whyAhead(own: ResolvedCell, { last }: CellStatus, ahead: ReadonlySet<string>): string {
  const above = own.reads.find((name) => ahead.has(name));
  const changed = last && describeChanges(last.source, own.source);
  return changed ?? (above ? `${above} changed` : "what it rests on changed; load the page again if this stays");
}
