import { useMutation, useQueryClient } from "@tanstack/react-query";
import { refereeCopySummary } from "../../../../shared/schemas/referee-copies.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export function useRevokeRefereeCopy(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (copyId: string) =>
      ask({ method: "DELETE", path: api.refereeCopy(studyId, copyId), answer: refereeCopySummary }),
    onSuccess: () =>
      Promise.all([
        client.invalidateQueries({ queryKey: ["referee copies", studyId] }),
        client.invalidateQueries({ queryKey: ["studies"] }),
      ]),
  });
}
