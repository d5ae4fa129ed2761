import { useMutation, useQueryClient } from "@tanstack/react-query";
import { checkpointSummary, returning } from "../../../../shared/schemas/history.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";
import { checkpointsKey } from "./get-checkpoints.ts";

interface About {
  readonly name: string;
  readonly note: string;
}

export function useMakeCheckpoint(studyId: string) {
  const listed = useListed(studyId);
  return useMutation({
    mutationFn: (body: About) =>
      ask({ method: "POST", path: api.checkpoints(studyId), body, answer: checkpointSummary }),
    onSuccess: listed,
  });
}

export function useChangeCheckpoint(studyId: string, checkpointId: string) {
  const listed = useListed(studyId);
  return useMutation({
    mutationFn: (body: About) =>
      ask({ method: "PATCH", path: api.checkpoint(studyId, checkpointId), body, answer: checkpointSummary }),
    onSuccess: listed,
  });
}

export function useRemoveCheckpoint(studyId: string, checkpointId: string) {
  const listed = useListed(studyId);
  return useMutation({
    mutationFn: () => ask({ method: "DELETE", path: api.checkpoint(studyId, checkpointId) }),
    onSuccess: listed,
  });
}

/** Has the present state kept, and answers what to return to. */
export function useBeginReturn(studyId: string, checkpointId: string) {
  const listed = useListed(studyId);
  return useMutation({
    mutationFn: () => ask({ method: "POST", path: api.checkpointReturn(studyId, checkpointId), answer: returning }),
    onSuccess: listed,
  });
}

function useListed(studyId: string) {
  const client = useQueryClient();
  return () => client.invalidateQueries({ queryKey: checkpointsKey(studyId) });
}
