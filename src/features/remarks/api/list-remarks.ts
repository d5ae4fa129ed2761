import { queryOptions, useQuery } from "@tanstack/react-query";
import { useCallback } from "react";
import { type Remark, remark } from "../../../../shared/schemas/remarks.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const answer = remark.array();

export const remarksOptions = (studyId: string) =>
  queryOptions({
    queryKey: ["remarks", studyId],
    queryFn: ({ signal }) => ask({ path: api.remarks(studyId), answer, signal }),
    // Whoever has the study open is told when they change.
    staleTime: 300_000,
  });

/** Every remark of a study, the oldest first. */
export const useRemarks = (studyId: string) => useQuery(remarksOptions(studyId));

const NONE: readonly Remark[] = [];

/** Those on one cell; the same objects until something in them changes. */
export function useCellRemarks(studyId: string, cellId: string): readonly Remark[] {
  const select = useCallback((all: Remark[]) => all.filter((one) => one.cellId === cellId), [cellId]);
  return useQuery({ ...remarksOptions(studyId), select }).data ?? NONE;
}
