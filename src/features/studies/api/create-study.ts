import { useMutation, useQueryClient } from "@tanstack/react-query";
import { z } from "zod";
import { studySummary } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export const newStudyForm = z.object({
  title: z.string().trim().min(1, "A study needs a title.").max(200, "A title has at most 200 characters."),
  lede: z.string().trim().max(600, "The question has at most 600 characters."),
});
export type NewStudyForm = z.infer<typeof newStudyForm>;

const createStudy = (form: NewStudyForm) =>
  ask({ method: "POST", path: api.studies, body: form, answer: studySummary });

export function useCreateStudy() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: createStudy,
    onSuccess: (study) => {
      client.setQueryData(["studies", study.id], study);
      return client.invalidateQueries({ queryKey: ["studies"], exact: true });
    },
  });
}
