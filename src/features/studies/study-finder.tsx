import { useId } from "react";
import type { StudySummary } from "../../../shared/schemas/resources.ts";
import { STUDY_FILTERS, type StudyFilter, shownStudies } from "./study-filters.ts";

interface StudyFinderProps {
  readonly studies: readonly StudySummary[];
  /** How many deleted studies can be brought back; the filter is there when there are any. */
  readonly deleted: number;
  readonly filter: StudyFilter;
  readonly find: string;
  readonly onFilter: (filter: StudyFilter) => void;
  readonly onFind: (find: string) => void;
}

/** Which studies are listed: filters with their counts, and words to find. */
export function StudyFinder({ studies, deleted, filter, find, onFilter, onFind }: StudyFinderProps) {
  const id = useId();
  const entries: { key: StudyFilter; words: string; count: number }[] = STUDY_FILTERS.map(({ key, words }) => ({
    key,
    words,
    count: shownStudies(studies, key, "").length,
  }));
  if (deleted > 0 || filter === "deleted") entries.push({ key: "deleted", words: "Deleted", count: deleted });
  return (
    <search>
      <ul className="finder-filters border-rule2 border-b">
        {entries.map(({ key, words, count }) => (
          <li key={key} className="border-rule2 border-t">
            <button
              type="button"
              aria-pressed={filter === key}
              onClick={() => onFilter(key)}
              className={`flex min-h-8.5 w-full items-center justify-between gap-2 hover:text-accent ${filter === key ? "font-semibold" : ""}`}
            >
              <span>{words}</span> <span className="tabular-nums">{count}</span>
            </button>
          </li>
        ))}
      </ul>
      <label htmlFor={id} className="type-small block pt-6 text-ink2 lg:pt-8">
        Find
      </label>
      <input
        id={id}
        type="search"
        className="field-line"
        placeholder="a study, a cell or an author"
        value={find}
        onChange={(event) => onFind(event.target.value)}
      />
    </search>
  );
}
