import { keepPreviousData, queryOptions, useQuery } from "@tanstack/react-query";
import { latestEdits } from "../../../../shared/schemas/history.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** Who edited each cell last; asked anew when what there is to explain is another. */
export const useLatestEdits = (studyId: string, toExplain: string) =>
  useQuery(
    queryOptions({
      queryKey: ["latest edits", studyId, toExplain],
      queryFn: ({ signal }) => ask({ path: api.latestEdits(studyId), answer: latestEdits, signal }),
      placeholderData: keepPreviousData,
    }),
  );
