import { Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { momentInWords } from "../../lib/dates.ts";
import { useJournal } from "./api/list-journal.ts";
import { entryInWords } from "./journal-words.ts";

/** What was done by whom, newest first. */
export function JournalList({ studyId }: { studyId?: string }) {
  const { data, error, hasNextPage, isFetchingNextPage, fetchNextPage } = useJournal(studyId);
  if (error && !data) return <Fault>{sentenceOf(error)}</Fault>;
  if (!data) return <p role="status">Fetching the journal</p>;
  const entries = data.pages.flatMap((page) => page.entries);
  if (entries.length === 0) return <p className="type-finding">Nothing has been written down yet.</p>;
  return (
    <>
      <ol className="border-rule border-b">
        {entries.map((entry) => (
          <li key={entry.id} className="grid gap-x-6 border-rule border-t py-2 sm:grid-cols-[9rem_minmax(0,1fr)]">
            <time dateTime={entry.at} className="type-small tabular-nums text-ink2">
              {momentInWords(entry.at)}
            </time>
            <span className="min-w-0 break-words">{entryInWords(entry)}</span>
          </li>
        ))}
      </ol>
      {error && <Fault>{sentenceOf(error)}</Fault>}
      {hasNextPage && (
        <p className="pt-3">
          <Word disabled={isFetchingNextPage} onClick={() => void fetchNextPage()}>
            {isFetchingNextPage ? "Fetching" : "Earlier"}
          </Word>
        </p>
      )}
    </>
  );
}
