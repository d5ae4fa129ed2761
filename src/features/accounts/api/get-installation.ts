import { queryOptions, useQuery } from "@tanstack/react-query";
import { installation } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

export const installationOptions = queryOptions({
  queryKey: ["installation"],
  queryFn: ({ signal }) => ask({ path: api.installation, answer: installation, signal }),
  staleTime: Number.POSITIVE_INFINITY,
});

export const useInstallation = () => useQuery(installationOptions);
