import { useMutation } from "@tanstack/react-query";
import { z } from "zod";
import { MOST_ALSO, sealedRefereeCopy } from "../../../../shared/schemas/referee-copies.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";
import { endOf } from "../link-end.ts";
import { useCopiesChanged } from "./copies-changed.ts";

/** Empty, or an address. */
export const maybeAddress = z
  .string()
  .trim()
  .pipe(z.literal("").or(z.email("Write an e-mail address, or nothing.")));

export const sealForm = z.object({
  cellId: z.string().min(1, "Choose the matrix to seal."),
  also: z.array(z.string()).max(MOST_ALSO, `At most ${MOST_ALSO} findings go with a matrix.`),
  methods: z.boolean(),
  note: z.string().trim().max(300, "The note has at most 300 characters."),
  withholdAuthors: z.boolean(),
  /** Days, or nothing. */
  opensFor: z.string(),
  replaces: z.string(),
  email: maybeAddress,
});
export type SealForm = z.infer<typeof sealForm>;

/** The answer holds the link's token, told this once. */
export function useSealRefereeCopy(studyId: string) {
  return useMutation({
    mutationFn: ({ opensFor, replaces, email, also, cellId, ...rest }: SealForm) =>
      ask({
        method: "POST",
        path: api.refereeCopies(studyId),
        body: {
          ...rest,
          cellId,
          also: also.filter((id) => id !== cellId),
          expiresAt: endOf(opensFor),
          replaces: replaces || undefined,
          email: email || undefined,
        },
        answer: sealedRefereeCopy,
      }),
    onSuccess: useCopiesChanged(studyId),
  });
}
