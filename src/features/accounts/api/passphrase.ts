import { useMutation, useQueryClient } from "@tanstack/react-query";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const askReset = (body: { email: string }) => ask({ method: "POST", path: api.askReset, body });

/** A link goes to the address if an account has it; the answer is the same. */
export const useAskReset = () => useMutation({ mutationFn: askReset });

const reset = (body: { token: string; newPassword: string }) => ask({ method: "POST", path: api.reset, body });

export const useResetPassphrase = () => useMutation({ mutationFn: reset });

/** Every other session ends. */
export function useChangePassphrase() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { currentPassword: string; newPassword: string }) =>
      ask({ method: "POST", path: api.changePassphrase, body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ["account"] }),
  });
}
