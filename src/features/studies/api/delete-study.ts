import { useMutation, useQueryClient } from "@tanstack/react-query";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export function useDeleteStudy() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (studyId: string) => ask({ method: "DELETE", path: api.study(studyId) }),
    onSuccess: (_, studyId) => {
      client.removeQueries({ queryKey: ["studies", studyId] });
      return Promise.all([
        client.invalidateQueries({ queryKey: ["studies"], exact: true }),
        client.invalidateQueries({ queryKey: ["deleted studies"] }),
      ]);
    },
  });
}
