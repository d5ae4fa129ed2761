import { useNavigate } from "react-router-dom";
import { useSignOut } from "../features/accounts/api/sign-out.ts";
import { pages } from "../lib/paths.ts";
import { forgetAccount } from "../sync/index.ts";

/** Signs out: the session ends, and this browser forgets the account's documents. */
export function useLeave(accountId: string | undefined) {
  const signOut = useSignOut();
  const navigate = useNavigate();
  return () =>
    signOut.mutate(undefined, {
      onSuccess: async () => {
        await navigate(pages.signIn);
        if (accountId !== undefined) await forgetAccount(accountId).catch(() => []);
      },
    });
}
