import { type QueryClient, queryOptions, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { linkedAddress } from "../../../../shared/schemas/accounts.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const accountLinkOptions = (token: string) =>
  queryOptions({
    queryKey: ["account link", token],
    queryFn: ({ signal }) => ask({ path: api.accountLink(token), answer: linkedAddress, signal }),
    staleTime: Number.POSITIVE_INFINITY,
  });

/** Whose account is to be made. */
export const useAccountLink = (token: string) => useQuery(accountLinkOptions(token));

/** Makes the account and signs in. */
export function useFinishAccount(token: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { name: string; password: string }) =>
      ask({ method: "POST", path: api.accountLink(token), body, answer: linkedAddress }),
    onSuccess: () => forgetAllButLinks(client),
  });
}

/** The account has the link's address from now on. */
export function useConfirmAddress(token: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => ask({ method: "POST", path: api.addressLink(token), body: {}, answer: linkedAddress }),
    onSuccess: () => forgetAllButLinks(client),
  });
}

/** Someone else is signed in from here on. The link is used up, and the page that still shows it must not ask again. */
function forgetAllButLinks(client: QueryClient): void {
  client.removeQueries({ predicate: ({ queryKey }) => !String(queryKey[0]).endsWith(" link") });
}
