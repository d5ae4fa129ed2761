import type {
  Checkpoint,
  CheckpointSummary,
  HistoryPage,
  LatestEdits,
  PastCell,
  Sitting,
} from "../../shared/schemas/history.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import type { CheckpointSummaryRow, CheckpointView } from "../services/checkpoints.ts";
import type { HistoryView, LatestEditView, SittingView } from "../services/history.ts";

export function presentHistory({ sittings, next, names }: HistoryView): HistoryPage {
  return {
    sittings: sittings.map((sitting) => presentSitting(sitting, names)),
    ...(next !== undefined && { next }),
  };
}

function presentSitting(sitting: SittingView, names: HistoryView["names"]): Sitting {
  const { id, cellId, people, startedAt, endedAt, before, after } = sitting;
  return {
    id,
    cellId,
    people: people.map((person) => presentWriter(person, names.get(person))),
    from: startedAt.toISOString(),
    to: endedAt.toISOString(),
    ...(before !== undefined && { before: presentPastCell(before) }),
    ...(after !== undefined && { after: presentPastCell(after) }),
  };
}

export function presentLatestEdit({ cell, by, byName, at }: LatestEditView): LatestEdits[number] {
  return {
    cellId: cell.id,
    cellName: cell.name,
    ...(by !== undefined && { by: presentWriter(by, byName) }),
    at: at.toISOString(),
  };
}

export function presentCheckpoint(row: CheckpointSummaryRow): CheckpointSummary {
  return {
    id: row.id,
    name: row.name,
    note: row.note,
    occasion: row.occasion,
    madeBy: presentWriter(row.madeBy, row.madeByName ?? undefined),
    madeAt: row.madeAt.toISOString(),
    cells: row.cellCount,
  };
}

export function presentWholeCheckpoint({ row, cells }: CheckpointView): Checkpoint {
  return { ...presentCheckpoint(row), content: cells.map((cell) => ({ id: cell.id, ...presentPastCell(cell) })) };
}

function presentPastCell({ name, kind, order, source }: CellSource): PastCell {
  return { name, kind, order, source };
}

function presentWriter(id: string, name: string | undefined) {
  return { id, ...(name !== undefined && { name }) };
}
