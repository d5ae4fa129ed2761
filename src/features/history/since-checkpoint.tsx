import { useState } from "react";
import { type StateDifference, stateDifferences } from "../../../shared/study/cell-differences.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { Word } from "../../components/button.tsx";
import { Unfetched } from "../../components/unfetched.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useCheckpoint } from "./api/get-checkpoints.ts";
import { DifferingSource } from "./differing-source.tsx";
import { differenceInWords } from "./words.ts";

interface SinceCheckpointProps {
  readonly studyId: string;
  readonly checkpointId: string;
  readonly cells: readonly CellSource[];
}

/** What differs between a checkpoint and the study as it stands, cell by cell. */
export function SinceCheckpoint({ studyId, checkpointId, cells }: SinceCheckpointProps) {
  const { data, error, refetch } = useCheckpoint(studyId, checkpointId);
  if (error && !data) {
    return <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />;
  }
  if (!data) {
    return (
      <p role="status" className="pt-2 text-ink2">
        Comparing
      </p>
    );
  }
  const differences = stateDifferences(data.content, cells);
  if (differences.length === 0) return <p className="pt-2">Nothing: the study stands as it did then.</p>;
  return (
    <ul className="grid gap-1 pt-2">
      {differences.map((one) => (
        <Since key={one.cellId} difference={one} />
      ))}
    </ul>
  );
}

function Since({ difference: { before, after, difference } }: { difference: StateDifference }) {
  const [open, setOpen] = useState(false);
  const name = (after ?? before)?.name;
  const told = differenceInWords(difference);
  const isOpenable = before?.source !== after?.source;
  return (
    <li>
      <p className="flex flex-wrap items-baseline gap-x-4">
        <span className="min-w-0 wrap-anywhere">
          {told.before} <b className="past-cell">{name}</b>
          {told.after}
        </span>
        {isOpenable && (
          <Word quiet className="type-small" aria-expanded={open} onClick={() => setOpen(!open)}>
            {open ? "Put away" : "Look"} <span className="sr-only">at what changed in {name}</span>
          </Word>
        )}
      </p>
      {open && (
        <DifferingSource
          label={`${name}: from then to now`}
          before={before?.source ?? ""}
          after={after?.source ?? ""}
        />
      )}
    </li>
  );
}
