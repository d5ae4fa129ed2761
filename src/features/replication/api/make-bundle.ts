import { useMutation } from "@tanstack/react-query";
import type { NewReplicationBundle } from "../../../../shared/schemas/replication-bundle.ts";
import { askForFile } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";
import { saveFile } from "../../../lib/save-file.ts";

interface Wanted extends NewReplicationBundle {
  readonly signal: AbortSignal;
}

/** Has a bundle made and hands it to the browser; returns its name and size. */
export function useMakeBundle(studyId: string) {
  return useMutation({
    mutationFn: async ({ data, signal }: Wanted) => {
      const file = await askForFile({ method: "POST", path: api.replicationBundles(studyId), body: { data }, signal });
      saveFile(file.name, file.content);
      return { name: file.name, bytes: file.content.size };
    },
  });
}
