import { useNavigate } from "react-router-dom";
import { useSignOut } from "../features/accounts/api/sign-out.ts";
import { pages } from "../lib/paths.ts";

/** Signs out: the session ends, and this browser forgets the account's documents. */
export function useLeave(accountId: string | undefined) {
  const signOut = useSignOut();
  const navigate = useNavigate();
  return () =>
    signOut.mutate(undefined, {
      onSuccess: async () => {
        await navigate(pages.signIn);
        // Loaded when it is needed: the list of studies has no other use for it.
        const { forgetAccount } = await import("../sync/index.ts");
        if (accountId !== undefined) await forgetAccount(accountId).catch(() => []);
      },
    });
}
