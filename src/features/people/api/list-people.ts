import { queryOptions, useQuery } from "@tanstack/react-query";
import { z } from "zod";
import { person } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const answer = z.array(person);

export const peopleOptions = (studyId: string) =>
  queryOptions({
    queryKey: ["people", studyId],
    queryFn: ({ signal }) => ask({ path: api.people(studyId), answer, signal }),
  });

export const usePeople = (studyId: string) => useQuery(peopleOptions(studyId));
