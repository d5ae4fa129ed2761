import { useMutation, useQueryClient } from "@tanstack/react-query";
import { z } from "zod";
import { sealedRefereeCopy } from "../../../../shared/schemas/referee-copies.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export const sealForm = z.object({
  cellId: z.string().min(1, "Choose the matrix to seal."),
  note: z.string().trim().max(300, "The note has at most 300 characters."),
  withholdAuthors: z.boolean(),
});
export type SealForm = z.infer<typeof sealForm>;

/** The answer holds the link's token, told this once. */
export function useSealRefereeCopy(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: SealForm) =>
      ask({ method: "POST", path: api.refereeCopies(studyId), body, answer: sealedRefereeCopy }),
    onSuccess: () =>
      Promise.all([
        client.invalidateQueries({ queryKey: ["referee copies", studyId] }),
        client.invalidateQueries({ queryKey: ["studies"] }),
      ]),
  });
}
