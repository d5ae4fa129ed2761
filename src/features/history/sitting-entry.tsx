import { useId, useState } from "react";
import type { PastCell, Sitting } from "../../../shared/schemas/history.ts";
import { cellDifference } from "../../../shared/study/cell-differences.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { Word } from "../../components/button.tsx";
import { DifferingSource } from "./differing-source.tsx";
import { differenceInWords, hoursInWords, writersInWords } from "./words.ts";

interface SittingEntryProps {
  readonly sitting: Sitting;
  /** The cell as it stands; absent where it is gone. */
  readonly now: CellSource | undefined;
  readonly you: string;
  /** Absent for those who only read. */
  readonly onBringBack?: (cell: CellSource) => void;
}

/** One sitting: when, who, what; opened, the source with what was struck and what is new. */
export function SittingEntry({ sitting, now, you, onBringBack }: SittingEntryProps) {
  const [open, setOpen] = useState(false);
  const id = useId();
  const { before, after, people, from, to, cellId } = sitting;
  const name = (after ?? before)?.name ?? "a cell";
  const told = differenceInWords(cellDifference(before, after));
  const isOpenable = before?.source !== after?.source;
  return (
    <li className="past-entry">
      <span className="type-small text-ink3 tabular-nums">{hoursInWords(from, to)}</span>
      <div className="min-w-0">
        <p>
          <b>{writersInWords(people, you)}</b> {told.before} <b className="past-cell">{name}</b>
          {told.after.startsWith(":") || told.after.startsWith(",") || told.after === "" ? "" : " "}
          {told.after}
        </p>
        {open && (
          <div id={id}>
            <DifferingSource
              label={`${name}, ${hoursInWords(from, to)}: what changed`}
              before={before?.source ?? ""}
              after={after?.source ?? ""}
            />
            {onBringBack && (
              <BringBack cellId={cellId} before={before} after={after} now={now} onBringBack={onBringBack} />
            )}
          </div>
        )}
      </div>
      {isOpenable && (
        <Word quiet className="type-small" aria-expanded={open} aria-controls={id} onClick={() => setOpen(!open)}>
          {open ? "Put away" : "Look"} <span className="sr-only">at what changed in {name}</span>
        </Word>
      )}
    </li>
  );
}

interface BringBackProps extends Pick<Sitting, "cellId" | "before" | "after"> {
  readonly now: CellSource | undefined;
  readonly onBringBack: (cell: CellSource) => void;
}

/** The ways back to either side of a change, where the cell stands otherwise now. */
function BringBack({ cellId, before, after, now, onBringBack }: BringBackProps) {
  const isOther = (past: PastCell | undefined): past is PastCell => past !== undefined && past.source !== now?.source;
  const back = (past: PastCell) => onBringBack({ id: cellId, ...past });
  if (!isOther(before) && !isOther(after)) return <p className="type-small pt-1 text-ink3">It stands so now.</p>;
  return (
    <p className="flex flex-wrap gap-x-6 gap-y-1 pt-2">
      {isOther(before) && <Word onClick={() => back(before)}>Bring back what was before</Word>}
      {isOther(after) && <Word onClick={() => back(after)}>Bring back what it became</Word>}
    </p>
  );
}
