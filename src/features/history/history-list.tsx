import type { CheckpointSummary, Sitting } from "../../../shared/schemas/history.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { Unfetched } from "../../components/unfetched.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { clockTime } from "../../lib/dates.ts";
import { useCheckpoints } from "./api/get-checkpoints.ts";
import { type HistoryFilter, useHistory } from "./api/get-history.ts";
import { SittingEntry } from "./sitting-entry.tsx";
import { TogetherEntry, together } from "./together-entry.tsx";
import { byDay, writersInWords } from "./words.ts";

interface HistoryListProps {
  readonly studyId: string;
  readonly filter: HistoryFilter;
  readonly cells: readonly CellSource[];
  readonly you: string;
  readonly onBringBack?: (cell: CellSource) => void;
}

type Entry =
  | { readonly at: string; readonly sitting: Sitting }
  | { readonly at: string; readonly together: readonly Sitting[] }
  | { readonly at: string; readonly checkpoint: CheckpointSummary };

/** Who changed what and when, by day, with the checkpoints among it. */
export function HistoryList({ studyId, filter, cells, you, onBringBack }: HistoryListProps) {
  const history = useHistory(studyId, filter);
  const { data: checkpoints = [] } = useCheckpoints(studyId);
  const sittings = history.data?.pages.flatMap((page) => page.sittings) ?? [];
  if (history.isPending) {
    return (
      <p role="status" className="pt-4 text-ink2">
        Looking up who changed what
      </p>
    );
  }
  if (history.isError && sittings.length === 0) {
    return <Unfetched sentence={sentenceOf(history.error)} onAgain={() => void history.refetch()} />;
  }
  const shown =
    filter.cell === "" ? checkpoints.filter((one) => belongs(one, filter, sittings, history.hasNextPage)) : [];
  const entries = merged(sittings, shown);
  if (entries.length === 0) return <p className="type-finding pt-4 max-w-[40rem]">{nothing(filter)}</p>;
  return (
    <>
      {byDay(entries).map(({ day, entries }) => (
        <section key={day} aria-label={day} className="pt-5">
          <h3 className="type-section pb-1">{day}</h3>
          <ol>
            {entries.map((entry) =>
              "together" in entry ? (
                <TogetherEntry key={entry.together[0].id} sittings={entry.together} you={you} />
              ) : "sitting" in entry ? (
                <SittingEntry
                  key={entry.sitting.id}
                  sitting={entry.sitting}
                  now={cells.find(({ id }) => id === entry.sitting.cellId)}
                  you={you}
                  onBringBack={onBringBack}
                />
              ) : (
                <CheckpointLine key={entry.checkpoint.id} checkpoint={entry.checkpoint} you={you} />
              ),
            )}
          </ol>
        </section>
      ))}
      {history.isFetchNextPageError && <Fault>{sentenceOf(history.error)}</Fault>}
      {history.hasNextPage && (
        <Word className="mt-5" disabled={history.isFetchingNextPage} onClick={() => void history.fetchNextPage()}>
          {history.isFetchingNextPage ? "Looking further back" : "Further back"}
        </Word>
      )}
    </>
  );
}

function CheckpointLine({ checkpoint, you }: { checkpoint: CheckpointSummary; you: string }) {
  return (
    <li className="past-entry">
      <span className="type-small text-ink3 tabular-nums">{clockTime(checkpoint.madeAt)}</span>
      <p className="border-line border-y py-1">
        <b>{writersInWords([checkpoint.madeBy], you)}</b> kept a checkpoint, <i>{checkpoint.name}</i>
      </p>
    </li>
  );
}

/** A checkpoint older than the last sitting shown comes with the page it belongs to. */
function belongs(
  { madeAt, madeBy }: CheckpointSummary,
  { person }: HistoryFilter,
  sittings: readonly Sitting[],
  isMore: boolean,
): boolean {
  if (person !== "" && madeBy.id !== person) return false;
  const oldest = sittings.at(-1);
  return !isMore || oldest === undefined || madeAt >= oldest.from;
}

function merged(sittings: readonly Sitting[], checkpoints: readonly CheckpointSummary[]): Entry[] {
  const entries: Entry[] = [
    ...checkpoints.map((checkpoint) => ({ at: checkpoint.madeAt, checkpoint })),
    ...together(sittings).map((group) =>
      group.length === 1 ? { at: group[0].from, sitting: group[0] } : { at: group[0].from, together: group },
    ),
  ];
  return entries.toSorted((a, b) => (a.at < b.at ? 1 : a.at > b.at ? -1 : 0));
}

function nothing({ cell, person }: HistoryFilter): string {
  if (cell === "" && person === "") {
    return "Nothing has been changed yet. From the first edit on, this page tells who changed what and when.";
  }
  return "Nothing was changed that answers to this. Ask for every cell, or everyone.";
}
