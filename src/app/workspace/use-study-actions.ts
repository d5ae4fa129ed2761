import { useMemo } from "react";
import type { CellKind } from "../../../shared/schemas/cell.ts";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import type { StudyConnection } from "../../sync/index.ts";
import { loadReading } from "./use-reading.ts";

/** What a person does to the cells of a study as a whole. Each acts on the cells as they are when it is done. */
export function useStudyActions(connection: StudyConnection, uploads: readonly Upload[]) {
  return useMemo(() => {
    const cells = () => connection.snapshot().cells;
    const placeOf = (cellId: string) => cells().findIndex(({ id }) => id === cellId);
    return {
      /** Returns the new cell's id. */
      add: async (kind: CellKind): Promise<string> => {
        const { freshName, freshSource } = await loadReading();
        return connection.addCell({
          name: freshName(kind, cells()),
          kind,
          source: freshSource(kind, cells(), uploads),
        });
      },

      /** Those that read the cell go on reading it, by its new name. */
      rename: async (cell: CellSource, name: string): Promise<void> => {
        const { sourcesAfterRenaming } = await loadReading();
        const sources = sourcesAfterRenaming(cell.name, name, cells());
        connection.atOnce("renaming", () => {
          connection.renameCell(cell.id, name);
          for (const [id, source] of sources) connection.replaceSource(id, source);
        });
      },

      move: (cellId: string, by: 1 | -1): void => {
        const place = placeOf(cellId);
        const after = by === 1 ? cells()[place + 1] : cells()[place - 2];
        if (by === 1 && !after) return;
        connection.moveCell(cellId, after?.id ?? null);
      },

      /** Puts a cell after another, or first; nothing where it stands there already. */
      moveAfter: (cellId: string, after: string | null): void => {
        const before = cells()[placeOf(cellId) - 1]?.id ?? null;
        if (after !== cellId && after !== before) connection.moveCell(cellId, after);
      },

      /** Adds a copy of a cell below it, under a name of its own; returns the copy's id. */
      duplicate: async (cell: CellSource): Promise<string> => {
        const { nameOfCopy } = await loadReading();
        const { kind, source } = cells().find(({ id }) => id === cell.id) ?? cell;
        return connection.addCell({ name: nameOfCopy(cell.name, cells()), kind, source }, cell.id);
      },

      remove: (cellId: string): void => connection.removeCell(cellId),
    };
  }, [connection, uploads]);
}
