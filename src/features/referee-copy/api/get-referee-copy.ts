import { queryOptions, useQuery } from "@tanstack/react-query";
import { refereeCopy } from "../../../../shared/schemas/referee-copy.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** The copy behind the link, or the one that has replaced it. A copy never changes; it is asked for once. */
const refereeCopyOptions = (token: string, newest: boolean) =>
  queryOptions({
    queryKey: ["referee copy", token, newest],
    queryFn: ({ signal }) =>
      ask({ path: newest ? api.newestCopy(token) : api.sealedCopy(token), answer: refereeCopy, signal }),
    staleTime: Number.POSITIVE_INFINITY,
  });

export const useRefereeCopy = (token: string, newest: boolean) => useQuery(refereeCopyOptions(token, newest));
