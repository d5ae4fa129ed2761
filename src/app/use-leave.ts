import { useQueryClient } from "@tanstack/react-query";
import { useNavigate } from "react-router-dom";
import { useSignOut } from "../features/accounts/api/sign-out.ts";
import { forgetKeptAnswers } from "../lib/kept-answers.ts";
import { pages } from "../lib/paths.ts";

/**
 * Signs out: the session ends, and this browser forgets what it knew and the account's documents. Then to the door, or
 * to another page; with null one stays where one is.
 */
export function useLeave(accountId: string | undefined, to: string | null = pages.signIn) {
  const signOut = useSignOut();
  const forget = useForget(accountId, to);
  return () => signOut.mutate(undefined, { onSuccess: forget });
}

/** What this browser knew of an account whose session has ended is forgotten. */
export function useForget(accountId: string | undefined, to: string | null = pages.signIn) {
  const navigate = useNavigate();
  const client = useQueryClient();
  return async () => {
    if (to === null) {
      client.removeQueries({ queryKey: ["studies"] });
      await client.resetQueries({ queryKey: ["me"] }).catch(() => undefined);
    } else {
      await navigate(to);
      // Only at the door: a page that is still there would ask again for what it has just lost.
      client.clear();
    }
    forgetKeptAnswers();
    // Loaded when it is needed: the list of studies has no other use for it.
    const { forgetAccount } = await import("../sync/index.ts");
    if (accountId !== undefined) await forgetAccount(accountId).catch(() => []);
  };
}
