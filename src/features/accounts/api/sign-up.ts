import { useMutation, useQueryClient } from "@tanstack/react-query";
import { z } from "zod";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const SHORTEST = 10;
const LONGEST = 128;

export const signUpForm = z.object({
  name: z.string().trim().min(1, "The name is missing: coauthors see it beside what you write.").max(120),
  email: z.email("An e-mail address looks like name@place.example."),
  password: z
    .string()
    .refine((text) => text.length >= SHORTEST, {
      error: ({ input }) => `The passphrase has ${String(input).length} characters and needs at least ${SHORTEST}.`,
    })
    .max(LONGEST, `The passphrase may have at most ${LONGEST} characters.`),
});
export type SignUpForm = z.infer<typeof signUpForm>;

const signUp = (form: SignUpForm) => ask({ method: "POST", path: api.signUp, body: form });

export function useSignUp() {
  const client = useQueryClient();
  return useMutation({ mutationFn: signUp, onSuccess: () => client.clear() });
}
