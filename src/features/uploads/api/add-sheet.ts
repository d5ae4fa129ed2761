import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type Upload, upload } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** Reads another sheet of a workbook that is here, as an upload of its own. */
export function useAddSheet(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ uploadId, sheet }: { uploadId: string; sheet: string }) =>
      ask({ method: "POST", path: `${api.upload(studyId, uploadId)}/sheets`, body: { sheet }, answer: upload }),
    onSuccess: (added) => {
      client.setQueryData<Upload[]>(["uploads", studyId], (uploads = []) => [...uploads, added]);
    },
  });
}
