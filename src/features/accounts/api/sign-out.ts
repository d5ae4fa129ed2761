import { useMutation } from "@tanstack/react-query";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** The session ends on the server. */
export function useSignOut() {
  return useMutation({ mutationFn: () => ask({ method: "POST", path: api.signOut, body: {} }) });
}
