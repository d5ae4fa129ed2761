import type { CellKind } from "../../../shared/schemas/cell.ts";
import type { Problem } from "../../../shared/schemas/problem.ts";
import type { CellStatus, Progress } from "../../../shared/schemas/status.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";

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
  /** A data cell without an upload. */
  readonly waitsForFile?: boolean;
  /** Its text is not what the server has last told of, and has not been read here yet. */
  readonly isUnread?: boolean;
}

/** Whether two standings of a cell say the same. Cell and status are the same objects while nothing in them changes. */
export function isSameStanding(a: Standing, b: Standing): boolean {
  if (a.cell !== b.cell || a.status !== b.status) return false;
  const { cell: _, status: __, ...left } = a;
  const { cell: ___, status: ____, ...right } = b;
  return JSON.stringify(left) === JSON.stringify(right);
}

/** Those that wait to be asked for: which, how many, and about how long together. */
export function waitingToBeAsked(standings: readonly Standing[]) {
  const waiting = standings.flatMap(({ cell, state, aboutMs }) =>
    aboutMs !== undefined && (state === "draft" || state === "out of date") ? [{ cellId: cell.id, aboutMs }] : [],
  );
  return { waiting, count: waiting.length, aboutMs: waiting.reduce((sum, { aboutMs }) => sum + aboutMs, 0) };
}
