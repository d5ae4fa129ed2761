import { useInfiniteQuery } from "@tanstack/react-query";
import { journalPage } from "../../../../shared/schemas/journal.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** Newest first, a page at a time; of a study, or without one of the installation. */
export function useJournal(studyId?: string) {
  return useInfiniteQuery({
    queryKey: ["journal", studyId ?? "installation"],
    queryFn: ({ pageParam, signal }) => {
      const path = studyId === undefined ? api.installationJournal(pageParam) : api.journal(studyId, pageParam);
      return ask({ path, answer: journalPage, signal });
    },
    initialPageParam: undefined as number | undefined,
    getNextPageParam: ({ next }) => next,
  });
}
