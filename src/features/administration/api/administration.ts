import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { z } from "zod";
import { accountSummary, mailSummary, postBox } from "../../../../shared/schemas/accounts.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** Messages of the installation, newest first. */
export const usePostBox = () =>
  useQuery({
    queryKey: ["administration", "mails"],
    queryFn: ({ signal }) => ask({ path: api.mails, answer: postBox, signal }),
    refetchInterval: 10_000,
  });

export function useTryAgain() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (mailId: string) => ask({ method: "POST", path: api.mail(mailId), body: {}, answer: mailSummary }),
    onSettled: () => client.invalidateQueries({ queryKey: ["administration", "mails"] }),
  });
}

const accounts = z.array(accountSummary);

export const useAccounts = () =>
  useQuery({
    queryKey: ["administration", "accounts"],
    queryFn: ({ signal }) => ask({ path: api.accounts, answer: accounts, signal }),
  });
