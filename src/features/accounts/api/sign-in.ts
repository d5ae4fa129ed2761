import { useMutation, useQueryClient } from "@tanstack/react-query";
import { z } from "zod";
import { ApiRefusal, ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export const signInForm = z.object({
  email: z.email("An e-mail address looks like name@place.example."),
  password: z.string().min(1, "The passphrase is missing."),
});
export type SignInForm = z.infer<typeof signInForm>;

/** Wrong address and wrong passphrase are not told apart. */
async function signIn(form: SignInForm): Promise<void> {
  try {
    await ask({ method: "POST", path: api.signIn, body: form });
  } catch (error) {
    if (!(error instanceof ApiRefusal) || error.status !== 401) throw error;
    throw new ApiRefusal(401, error.code, "No account has this address and this passphrase.");
  }
}

export function useSignIn() {
  const client = useQueryClient();
  return useMutation({ mutationFn: signIn, onSuccess: () => client.clear() });
}
