import { queryOptions, useQuery } from "@tanstack/react-query";
import { z } from "zod";
import { studySummary } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const answer = z.array(studySummary);

export const studiesOptions = queryOptions({
  queryKey: ["studies"],
  queryFn: ({ signal }) => ask({ path: api.studies, answer, signal }),
  refetchInterval: 30_000,
});

export const useStudies = () => useQuery(studiesOptions);
