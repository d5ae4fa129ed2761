import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { z } from "zod";
import { deletedStudy } from "../../../../shared/schemas/accounts.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const answer = z.array(deletedStudy);

/** Studies that whoever is signed in owned, deleted, and can bring back. */
export const useDeletedStudies = () =>
  useQuery({
    queryKey: ["deleted studies"],
    queryFn: ({ signal }) => ask({ path: api.deletedStudies, answer, signal }),
  });

/** Brings a study back with everything in it, or lets it go for good. */
export function useSettleDeleted() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ studyId, bringBack }: { studyId: string; bringBack: boolean }) =>
      ask({ method: bringBack ? "POST" : "DELETE", path: api.deletedStudy(studyId), ...(bringBack && { body: {} }) }),
    onSettled: () =>
      Promise.all([
        client.invalidateQueries({ queryKey: ["deleted studies"] }),
        client.invalidateQueries({ queryKey: ["studies"], exact: true }),
      ]),
  });
}
