import type { CellKind } from "../../../shared/schemas/cell.ts";
import type { Problem } from "../../../shared/schemas/problem.ts";
import type { CellStatus, Progress, StudyStatus } from "../../../shared/schemas/status.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { describeChanges } from "../../../shared/study/changes.ts";
import type { ResolvedCell } from "../../../shared/study/resolve.ts";

/** A cell as its band shows it: the document as it is here, with what the server has said of it. */
export interface Standing {
  readonly cell: CellSource;
  readonly kind: CellKind | null;
  readonly state: CellStatus["state"];
  readonly because?: string;
  readonly problems: readonly Problem[];
  /** Of the finding that answers this very source; absent in every state but current. */
  readonly fingerprint?: string;
  readonly last?: NonNullable<CellStatus["last"]>;
  readonly aboutMs?: number;
  readonly progress?: Progress;
  /** Names of the cells it reads, and of those that read it. */
  readonly reads: readonly string[];
  readonly readBy: readonly string[];
  readonly status?: CellStatus;
}

/**
 * Where every cell stands, in order. The document here may be ahead of the server: a finding is shown only
 * while the source, and all it reads, still asks what the finding answers.
 */
export function standingsOf(
  cells: readonly CellSource[],
  resolved: readonly ResolvedCell[],
  status: StudyStatus | undefined,
): Standing[] {
  const statuses = new Map(status?.cells.map((one) => [one.cellId, one]));
  const byName = new Map<string, ResolvedCell>();
  for (const one of resolved) if (!byName.has(one.name)) byName.set(one.name, one);
  const ahead = aheadOf(resolved, statuses, byName);
  return cells.flatMap((cell) => {
    const own = resolved.find(({ id }) => id === cell.id);
    if (!own) return [];
    const readBy = resolved.filter(({ reads }) => reads.includes(cell.name)).map(({ name }) => name);
    const common = { cell, kind: own.kind, reads: own.reads, readBy };
    return [{ ...common, ...stands(own, statuses.get(cell.id), ahead.get(cell.id)) }];
  });
}

function stands(own: ResolvedCell, status: CellStatus | undefined, ahead: string | undefined) {
  const kept = { ...(status?.last && { last: status.last }), ...(status && { status }) };
  if (own.problems.length > 0) {
    const told = status?.state === "failed" ? status.because : undefined;
    return { state: "failed" as const, because: told ?? "before estimation", problems: own.problems, ...kept };
  }
  if (!status) return { state: "draft" as const, problems: [], ...kept };
  if (ahead !== undefined) return { state: "out of date" as const, because: ahead, problems: [], ...kept };
  const { state, because, problems, aboutMs, progress, fingerprint } = status;
  return {
    state,
    problems,
    ...kept,
    ...(because !== undefined && { because }),
    ...(aboutMs !== undefined && { aboutMs }),
    ...(progress && { progress }),
    ...(state === "current" && fingerprint && { fingerprint }),
  };
}

/** Cells the server calls current whose question has changed here since, and why; those that read them with them. */
function aheadOf(
  resolved: readonly ResolvedCell[],
  statuses: ReadonlyMap<string, CellStatus>,
  byName: ReadonlyMap<string, ResolvedCell>,
): Map<string, string> {
  const ahead = new Map<string, string>();
  const seen = new Set<string>();
  const look = (cell: ResolvedCell): string | undefined => {
    if (seen.has(cell.id)) return ahead.get(cell.id);
    seen.add(cell.id);
    const status = statuses.get(cell.id);
    if (status?.state !== "current") return undefined;
    const changed =
      (status.last && describeChanges(status.last.source, cell.source)) ??
      cell.reads
        .filter((name) => {
          const read = byName.get(name);
          return !read || read.problems.length > 0 || look(read) !== undefined;
        })
        .map((name) => `${name} changed`)[0];
    if (changed !== undefined) ahead.set(cell.id, changed);
    return changed;
  };
  for (const cell of resolved) look(cell);
  return ahead;
}

/** Those that wait to be asked for: how many, and about how long together. */
export function waitingToBeAsked(standings: readonly Standing[]): { count: number; aboutMs: number } {
  const waiting = standings.filter(
    ({ state, aboutMs }) => aboutMs !== undefined && (state === "draft" || state === "out of date"),
  );
  return { count: waiting.length, aboutMs: waiting.reduce((sum, { aboutMs }) => sum + (aboutMs ?? 0), 0) };
}
