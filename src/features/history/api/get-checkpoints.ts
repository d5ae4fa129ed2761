import { queryOptions, useQuery } from "@tanstack/react-query";
import { z } from "zod";
import { checkpoint, checkpointSummary } from "../../../../shared/schemas/history.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const list = z.array(checkpointSummary);

export const checkpointsKey = (studyId: string) => ["checkpoints", studyId] as const;

export const useCheckpoints = (studyId: string) =>
  useQuery(
    queryOptions({
      queryKey: checkpointsKey(studyId),
      queryFn: ({ signal }) => ask({ path: api.checkpoints(studyId), answer: list, signal }),
    }),
  );

/** With its cells; they never change. */
export const useCheckpoint = (studyId: string, checkpointId: string) =>
  useQuery(
    queryOptions({
      queryKey: ["checkpoint", studyId, checkpointId],
      queryFn: ({ signal }) => ask({ path: api.checkpoint(studyId, checkpointId), answer: checkpoint, signal }),
      staleTime: Number.POSITIVE_INFINITY,
    }),
  );
