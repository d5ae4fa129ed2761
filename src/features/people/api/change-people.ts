import { type QueryClient, useMutation, useQueryClient } from "@tanstack/react-query";
import { z } from "zod";
import { person, type Role } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** Who is in a study is told in its list, on its head and among the studies. */
const told = (client: QueryClient, studyId: string) =>
  Promise.all([
    client.invalidateQueries({ queryKey: ["people", studyId] }),
    client.invalidateQueries({ queryKey: ["studies"] }),
  ]);

export function useChangeRole(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ userId, role }: { userId: string; role: Role }) =>
      ask({ method: "PATCH", path: api.person(studyId, userId), body: { role }, answer: person }),
    onSuccess: () => told(client, studyId),
  });
}

export function useRemovePerson(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (userId: string) => ask({ method: "DELETE", path: api.person(studyId, userId) }),
    onSuccess: () => told(client, studyId),
  });
}

const people = z.array(person);

/** The coauthor owns the study from then on. */
export function useHandOver(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (userId: string) => ask({ method: "POST", path: api.owner(studyId), body: { userId }, answer: people }),
    onSuccess: () => told(client, studyId),
  });
}
