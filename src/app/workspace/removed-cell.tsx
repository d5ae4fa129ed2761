import type { CellSource } from "../../../shared/study/cell-source.ts";
import { Word } from "../../components/button.tsx";

interface RemovedCellProps {
  readonly cell: CellSource;
  readonly onUndo: () => void;
  readonly onDismiss: () => void;
}

/** In the place of a cell just removed: that it was, and the way back. */
export function RemovedCell({ cell, onUndo, onDismiss }: RemovedCellProps) {
  return (
    <div className="band removed-cell" role="status">
      <div className="verso flex flex-wrap items-baseline gap-x-5 py-3!">
        <span>
          <b>{cell.name}</b> was removed.
        </span>
      </div>
      <div className="recto flex flex-wrap items-baseline gap-x-5 py-3!">
        <Word onClick={onUndo}>
          Undo <span className="sr-only">the removal of {cell.name}</span>
        </Word>
        <Word quiet onClick={onDismiss}>
          Leave it so
        </Word>
      </div>
    </div>
  );
}
