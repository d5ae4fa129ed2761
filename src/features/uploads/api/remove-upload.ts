import { useMutation, useQueryClient } from "@tanstack/react-query";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export function useRemoveUpload(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (uploadId: string) => ask({ method: "DELETE", path: api.upload(studyId, uploadId) }),
    onSuccess: () => client.invalidateQueries({ queryKey: ["uploads", studyId] }),
  });
}
