import { useQueryClient } from "@tanstack/react-query";
import { useNavigate } from "react-router-dom";
import { useSignOut } from "../features/accounts/api/sign-out.ts";
import { forgetDrafts } from "../features/remarks/drafts.ts";
import { pages } from "../lib/paths.ts";

/** Signs out: the session ends, and this browser forgets what it knew and the account's documents. */
export function useLeave(accountId: string | undefined) {
  const signOut = useSignOut();
  const navigate = useNavigate();
  const client = useQueryClient();
  return () =>
    signOut.mutate(undefined, {
      onSuccess: async () => {
        await navigate(pages.signIn);
        // Only at the door: a page that is still there would ask again for what it has just lost.
        client.clear();
        // Loaded when it is needed: the list of studies has no other use for it.
        const { forgetAccount } = await import("../sync/index.ts");
        if (accountId !== undefined) forgetDrafts(accountId);
        if (accountId !== undefined) await forgetAccount(accountId).catch(() => []);
      },
    });
}
