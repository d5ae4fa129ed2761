import { useState } from "react";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import type { StudyConnection } from "../../sync/index.ts";

interface Removal {
  readonly cell: CellSource;
  /** The cell it stood after; null when it was the first. */
  readonly after: string | null;
  /** How many changes could be undone once it was gone: while that is so, the removal is the last of them. */
  readonly depth: number;
}

/** The cell just removed, for as long as its removal is what undoing would undo. */
export function useRemoval(connection: StudyConnection) {
  const [removal, setRemoval] = useState<Removal>();
  const isLast = removal !== undefined && connection.undo.undoStack.length === removal.depth;
  return {
    removal: isLast ? removal : undefined,
    note: (cell: CellSource, after: string | null) =>
      setRemoval({ cell, after, depth: connection.undo.undoStack.length }),
    undo: () => {
      connection.undoStep();
      setRemoval(undefined);
    },
    dismiss: () => setRemoval(undefined),
  };
}
