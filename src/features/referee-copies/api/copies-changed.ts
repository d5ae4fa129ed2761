import { useQueryClient } from "@tanstack/react-query";

/** Reads a study's copies again, and what the list of studies says of them. */
export function useCopiesChanged(studyId: string) {
  const client = useQueryClient();
  return () =>
    Promise.all([
      client.invalidateQueries({ queryKey: ["referee copies", studyId] }),
      client.invalidateQueries({ queryKey: ["studies"] }),
    ]);
}
