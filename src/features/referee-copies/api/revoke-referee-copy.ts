import { useMutation } from "@tanstack/react-query";
import { refereeCopySummary } from "../../../../shared/schemas/referee-copies.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";
import { useCopiesChanged } from "./copies-changed.ts";

export function useRevokeRefereeCopy(studyId: string) {
  return useMutation({
    mutationFn: (copyId: string) =>
      ask({ method: "DELETE", path: api.refereeCopy(studyId, copyId), answer: refereeCopySummary }),
    onSuccess: useCopiesChanged(studyId),
  });
}
