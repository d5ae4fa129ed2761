import { queryOptions, useQuery } from "@tanstack/react-query";
import { account } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { orKept } from "../../../lib/kept-answers.ts";
import { api } from "../../../lib/paths.ts";

export const meOptions = queryOptions({
  queryKey: ["me"],
  queryFn: ({ signal }) => orKept("me", account, ask({ path: api.me, answer: account, signal })),
  staleTime: 5 * 60_000,
});

/** Who is signed in; pages that need someone are only reached with someone. */
export const useMe = () => useQuery(meOptions);
