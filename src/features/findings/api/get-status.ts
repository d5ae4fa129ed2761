import { queryOptions, useQuery } from "@tanstack/react-query";
import { studyStatus } from "../../../../shared/schemas/status.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** The states of a study's cells as they stand; from then on the socket tells them. */
export const statusOptions = (studyId: string) =>
  queryOptions({
    queryKey: ["status", studyId],
    queryFn: ({ signal }) => ask({ path: `${api.study(studyId)}/status`, answer: studyStatus, signal }),
  });

export const useStatus = (studyId: string) => useQuery(statusOptions(studyId));
