import { queryOptions, useQuery } from "@tanstack/react-query";
import { studySummary } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { orKept } from "../../../lib/kept-answers.ts";
import { api } from "../../../lib/paths.ts";

export const studyOptions = (studyId: string) =>
  queryOptions({
    queryKey: ["studies", studyId],
    queryFn: ({ signal }) =>
      orKept(`study ${studyId}`, studySummary, ask({ path: api.study(studyId), answer: studySummary, signal })),
  });

export const useStudy = (studyId: string) => useQuery(studyOptions(studyId));
