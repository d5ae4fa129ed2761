import { QueryCache, QueryClient } from "@tanstack/react-query";
import { ApiRefusal } from "./api.ts";

/**
 * A refusal is an answer and is not asked again; silence is, twice. A page that learns that its session has ended says so
 * once; asking who is signed in is how one learns it on the way in, and is left to whoever asks.
 */
export function createQueryClient(onSignedOut: () => void): QueryClient {
  return new QueryClient({
    queryCache: new QueryCache({
      onError: (error, { queryKey }) => {
        if (error instanceof ApiRefusal && error.status === 401 && queryKey[0] !== "me") onSignedOut();
      },
    }),
    defaultOptions: {
      queries: {
        staleTime: 15_000,
        networkMode: "always",
        retry: (failures, error) => error instanceof ApiRefusal && error.status === 0 && failures < 2,
      },
      // Without a network a request is made all the same: it fails at once, and whoever waits is told.
      mutations: { retry: false, networkMode: "always" },
    },
  });
}
