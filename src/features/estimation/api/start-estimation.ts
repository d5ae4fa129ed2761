import { useMutation } from "@tanstack/react-query";
import { studyStatus } from "../../../../shared/schemas/status.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** Asks for one cell to be estimated; how it goes on, the socket tells. */
export function useStartEstimation(studyId: string) {
  return useMutation({
    mutationFn: (cellId: string) =>
      ask({ method: "POST", path: api.estimation(studyId, cellId), body: {}, answer: studyStatus }),
  });
}
