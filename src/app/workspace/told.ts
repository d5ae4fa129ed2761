import { CELL_KINDS, type CellKind } from "../../../shared/schemas/cell.ts";
import type { CellStatus, StudyStatus } from "../../../shared/schemas/status.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import type { Standing } from "./standing.ts";

/**
 * Where every cell stands by what the server has told, before any text is read here. A finding is shown only where the
 * cell's text, and that of every cell it rests on, is letter for letter the one the finding was found under: the same
 * texts have the same fingerprint. Of any other cell nothing is said until its text is read.
 */
export function standingsTold(cells: readonly CellSource[], status: StudyStatus | undefined): Standing[] {
  const told = new Map(status?.cells.map((one) => [one.cellId, one]));
  const isAsFound = sameAsFound(cells, told);
  const readBy = (name: string) =>
    cells.flatMap((cell) => (told.get(cell.id)?.reads.includes(name) ? [cell.name] : []));
  return cells.map((cell) => {
    const own = told.get(cell.id);
    const common = { cell, kind: kindOf(cell), reads: own?.reads ?? [], readBy: readBy(cell.name) };
    // A text is read where it is shown, number by number: nothing found is kept of it.
    if (own && common.kind === "text" && own.problems.length === 0) {
      const { state, because } = own;
      return { ...common, state, problems: [], status: own, ...(because !== undefined && { because }) };
    }
    if (!own || own.problems.length > 0 || (own.state === "current" && !isAsFound(cell))) {
      return { ...common, state: "draft", problems: [], isUnread: true, ...(own && { status: own }) };
    }
    const { state, because, aboutMs, progress, fingerprint, last } = own;
    return {
      ...common,
      state,
      problems: [],
      status: own,
      ...(because !== undefined && { because }),
      ...(aboutMs !== undefined && { aboutMs }),
      ...(progress && { progress }),
      ...(last && { last }),
      ...(state === "current" && fingerprint && { fingerprint }),
    };
  });
}

const kindOf = ({ kind }: CellSource): CellKind | null =>
  (CELL_KINDS as readonly string[]).includes(kind) ? (kind as CellKind) : null;

/** Whether a cell, and all it rests on, stands as it did when its finding was found. */
function sameAsFound(cells: readonly CellSource[], told: ReadonlyMap<string, CellStatus>) {
  const byName = new Map<string, CellSource>();
  for (const cell of cells) if (!byName.has(cell.name)) byName.set(cell.name, cell);
  const known = new Map<string, boolean>();
  const look = (cell: CellSource): boolean => {
    const before = known.get(cell.id);
    if (before !== undefined) return before;
    // Cells that read each other in a circle never have a finding.
    known.set(cell.id, false);
    const own = told.get(cell.id);
    const isSame =
      own?.state === "current" &&
      own.name === cell.name &&
      own.kind === cell.kind &&
      own.last?.fingerprint === own.fingerprint &&
      own.last?.source === cell.source &&
      own.reads.every((name) => {
        const above = byName.get(name);
        return above !== undefined && look(above);
      });
    known.set(cell.id, isSame);
    return isSame;
  };
  return look;
}
