import { useMutation, useQueryClient } from "@tanstack/react-query";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** The session ends on the server; what this page knew is forgotten with it. */
export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => ask({ method: "POST", path: api.signOut, body: {} }),
    onSuccess: () => client.clear(),
  });
}
