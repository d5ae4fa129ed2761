import { QueryClient } from "@tanstack/react-query";
import { ApiRefusal } from "./api.ts";

/** A refusal is an answer and is not asked again; silence is, twice. */
export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: 15_000,
        retry: (failures, error) => error instanceof ApiRefusal && error.status === 0 && failures < 2,
      },
      mutations: { retry: false },
    },
  });
}
