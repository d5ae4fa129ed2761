import { queryOptions, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { ownAccount } from "../../../../shared/schemas/accounts.ts";
import { ask, askForFile } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";
import { saveFile } from "../../../lib/save-file.ts";

const ownAccountOptions = queryOptions({
  queryKey: ["account"],
  queryFn: ({ signal }) => ask({ path: api.account, answer: ownAccount, signal }),
});

export const useOwnAccount = () => useQuery(ownAccountOptions);

export function useRename() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { name: string }) => ask({ method: "PATCH", path: api.account, body, answer: ownAccount }),
    onSuccess: (account) => {
      client.setQueryData(["account"], account);
      return client.invalidateQueries({ predicate: ({ queryKey }) => queryKey[0] !== "account" });
    },
  });
}

/** Asks for everything that is kept about oneself and hands it to the browser; gives the file's name. */
async function saveOwnData(): Promise<string> {
  const { name, content } = await askForFile({ path: api.accountData });
  saveFile(name, content);
  return name;
}

export const useSaveOwnData = () => useMutation({ mutationFn: saveOwnData });

const askToMove = (body: { email: string }) => ask({ method: "POST", path: api.accountAddress, body });

/** A link goes to the address; the account has it once the link is followed. */
export const useAskToMove = () => useMutation({ mutationFn: askToMove });

/** Ends one session, or every other one. */
export function useEndSession() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (sessionId: string | "all others") =>
      ask({ method: "DELETE", path: sessionId === "all others" ? api.sessions : api.session(sessionId) }),
    onSettled: () => client.invalidateQueries({ queryKey: ["account"] }),
  });
}

const removeAccount = (body: { password: string }) => ask({ method: "DELETE", path: api.account, body });

export const useRemoveAccount = () => useMutation({ mutationFn: removeAccount });
