import { useDeferredValue, useEffect, useState } from "react";
import { Link } from "react-router-dom";
import type { LatestEdits } from "../../../shared/schemas/history.ts";
import { clockTime, momentInWords } from "../../lib/dates.ts";
import { pages } from "../../lib/paths.ts";
import { useLatestEdits } from "./api/get-latest-edits.ts";

interface WhoAndWhenProps {
  readonly studyId: string;
  readonly you: string | undefined;
  /** The cells that may have been changed, the likeliest first; of those after it the latest is told. */
  readonly cellId: string;
  readonly isOwnChange: boolean;
  readonly reads: readonly string[];
  /** When the finding that is out of date was found. */
  readonly foundAt: string;
  /** What was changed, in words: when these are others, there has been another edit. */
  readonly what: string;
}

/** Who made a finding out of date, and when: the last who edited what changed, with the way to its history. */
export function WhoAndWhen({ studyId, you, what, ...asked }: WhoAndWhenProps) {
  const { data } = useLatestEdits(studyId, useRested(useDeferredValue(what)));
  const edit = data && editOf(data, asked);
  if (edit === undefined) return null;
  const name =
    edit.by === undefined ? "the program" : edit.by.id === you ? "you" : (edit.by.name ?? "someone no longer here");
  const moment = momentInWords(edit.at);
  const when = moment === clockTime(edit.at) ? `at ${moment}` : `on ${moment}`;
  return (
    <Link className="reference" to={`${pages.history(studyId)}?cell=${encodeURIComponent(edit.cellId)}`}>
      by {name} {when}
    </Link>
  );
}

function editOf(
  edits: LatestEdits,
  { cellId, isOwnChange, reads, foundAt }: Pick<WhoAndWhenProps, "cellId" | "isOwnChange" | "reads" | "foundAt">,
): LatestEdits[number] | undefined {
  if (isOwnChange) return edits.find((edit) => edit.cellId === cellId);
  return edits
    .filter(({ cellName, at }) => reads.includes(cellName) && at > foundAt)
    .toSorted((a, b) => (a.at < b.at ? 1 : -1))[0];
}

const REST_MS = 600;

/** A value once it has rested, so that typing asks once and not with every letter. */
function useRested(value: string): string {
  const [rested, setRested] = useState(value);
  useEffect(() => {
    const rest = setTimeout(setRested, REST_MS, value);
    return () => clearTimeout(rest);
  }, [value]);
  return rested;
}
