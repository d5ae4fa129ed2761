import type { CellKind } from "../../../shared/schemas/cell.ts";
import type { Problem } from "../../../shared/schemas/problem.ts";
import type { CellStatus, Progress, StudyStatus } from "../../../shared/schemas/status.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { describeChanges } from "../../../shared/study/changes.ts";
import type { ResolvedCell } from "../../../shared/study/resolve.ts";
import { lacksUpload } from "./cell-words.ts";

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
  return cells.flatMap((cell) => {
    const own = resolved.find(({ id }) => id === cell.id);
    if (!own) return [];
    const readBy = resolved.filter(({ reads }) => reads.includes(cell.name)).map(({ name }) => name);
    const common = { cell, kind: own.kind, reads: own.reads, readBy };
    return [{ ...common, ...stands(own, cell, statuses.get(cell.id), ahead) }];
  });
}

function stands(own: ResolvedCell, cell: CellSource, status: CellStatus | undefined, ahead: ReadonlySet<string>) {
  const kept = { ...(status?.last && { last: status.last }), ...(status && { status }), problems: [] };
  if (lacksUpload(cell)) return { ...kept, state: "draft" as const, because: "waits for a file" };
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

/** Whether two standings of a cell say the same. Cell and status are the same objects while nothing in them changes. */
export function isSameStanding(a: Standing, b: Standing): boolean {
  if (a.cell !== b.cell || a.status !== b.status) return false;
  const { cell: _, status: __, ...left } = a;
  const { cell: ___, status: ____, ...right } = b;
  return JSON.stringify(left) === JSON.stringify(right);
}

/** Those that wait to be asked for: how many, and about how long together. */
export function waitingToBeAsked(standings: readonly Standing[]): { count: number; aboutMs: number } {
  const waiting = standings.filter(
    ({ state, aboutMs }) => aboutMs !== undefined && (state === "draft" || state === "out of date"),
  );
  return { count: waiting.length, aboutMs: waiting.reduce((sum, { aboutMs }) => sum + (aboutMs ?? 0), 0) };
}
