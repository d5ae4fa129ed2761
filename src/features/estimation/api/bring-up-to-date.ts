import { useMutation } from "@tanstack/react-query";
import { studyStatus } from "../../../../shared/schemas/status.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** Estimates every cell that waits to be asked, in the order they read each other. */
export function useBringUpToDate(studyId: string) {
  return useMutation({
    mutationFn: () => ask({ method: "POST", path: api.estimations(studyId), body: {}, answer: studyStatus }),
  });
}
