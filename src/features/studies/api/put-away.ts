import { useMutation, useQueryClient } from "@tanstack/react-query";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export function usePutAway() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ studyId, away }: { studyId: string; away: boolean }) =>
      ask({ method: away ? "POST" : "DELETE", path: api.putAway(studyId), ...(away && { body: {} }) }),
    onSettled: () => client.invalidateQueries({ queryKey: ["studies"] }),
  });
}
