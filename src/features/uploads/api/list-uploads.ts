import { queryOptions, useQuery } from "@tanstack/react-query";
import { z } from "zod";
import { upload } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const answer = z.array(upload);

export const uploadsOptions = (studyId: string) =>
  queryOptions({
    queryKey: ["uploads", studyId],
    queryFn: ({ signal }) => ask({ path: api.uploads(studyId), answer, signal }),
  });

export const useUploads = (studyId: string) => useQuery(uploadsOptions(studyId));
