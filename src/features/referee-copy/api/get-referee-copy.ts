import { queryOptions, useQuery } from "@tanstack/react-query";
import { type RefereeCopy, refereeCopy } from "../../../../shared/schemas/referee-copy.ts";
import { ask } from "../../../lib/api.ts";

const getRefereeCopy = (token: string, signal?: AbortSignal): Promise<RefereeCopy> =>
  ask({ path: `/api/referee/${encodeURIComponent(token)}`, answer: refereeCopy, signal });

/** A copy never changes; it is asked for once. */
const refereeCopyOptions = (token: string) =>
  queryOptions({
    queryKey: ["referee copy", token],
    queryFn: ({ signal }) => getRefereeCopy(token, signal),
    staleTime: Number.POSITIVE_INFINITY,
  });

export const useRefereeCopy = (token: string) => useQuery(refereeCopyOptions(token));
