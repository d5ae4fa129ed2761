import { queryOptions, useQuery } from "@tanstack/react-query";
import { z } from "zod";
import { refereeCopySummary } from "../../../../shared/schemas/referee-copies.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const answer = z.array(refereeCopySummary);

export const refereeCopiesOptions = (studyId: string) =>
  queryOptions({
    queryKey: ["referee copies", studyId],
    queryFn: ({ signal }) => ask({ path: api.refereeCopies(studyId), answer, signal }),
  });

export const useRefereeCopies = (studyId: string) => useQuery(refereeCopiesOptions(studyId));
