import { useMutation, useQueryClient } from "@tanstack/react-query";
import { studySummary } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export interface StudyChange {
  readonly title?: string;
  readonly lede?: string;
}

export function useChangeStudy(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (change: StudyChange) =>
      ask({ method: "PATCH", path: api.study(studyId), body: change, answer: studySummary }),
    onSuccess: (study) => client.setQueryData(["studies", studyId], study),
  });
}
