import { infiniteQueryOptions, useInfiniteQuery } from "@tanstack/react-query";
import { historyPage } from "../../../../shared/schemas/history.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** Whose and which edits; empty words ask for all. */
export interface HistoryFilter {
  readonly cell: string;
  readonly person: string;
}

export const historyKey = (studyId: string) => ["history", studyId] as const;

const historyOptions = (studyId: string, { cell, person }: HistoryFilter) =>
  infiniteQueryOptions({
    queryKey: [...historyKey(studyId), cell, person],
    queryFn: ({ pageParam, signal }) => {
      const asked = { ...(cell && { cell }), ...(person && { person }), ...(pageParam && { before: `${pageParam}` }) };
      return ask({ path: `${api.history(studyId)}?${new URLSearchParams(asked)}`, answer: historyPage, signal });
    },
    initialPageParam: 0,
    getNextPageParam: (page) => page.next,
  });

/** Who edited which cell, the newest first, a page at a time. */
export const useHistory = (studyId: string, filter: HistoryFilter) => useInfiniteQuery(historyOptions(studyId, filter));
