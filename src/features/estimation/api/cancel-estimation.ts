import { useMutation } from "@tanstack/react-query";
import { studyStatus } from "../../../../shared/schemas/status.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export function useCancelEstimation(studyId: string) {
  return useMutation({
    mutationFn: (cellId: string) =>
      ask({ method: "DELETE", path: api.estimation(studyId, cellId), answer: studyStatus }),
  });
}
