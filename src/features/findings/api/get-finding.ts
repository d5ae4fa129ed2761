import { queryOptions, useQuery } from "@tanstack/react-query";
import { z } from "zod";
import { finding } from "../../../../shared/schemas/cell.ts";
import { finite, instant } from "../../../../shared/schemas/primitives.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const storedFinding = z.strictObject({ finding, foundAt: instant, tookMs: finite });

/** What is stored under a fingerprint never changes, so it is asked for once. */
export const findingOptions = (studyId: string, fingerprint: string) =>
  queryOptions({
    queryKey: ["findings", studyId, fingerprint],
    queryFn: ({ signal }) => ask({ path: api.finding(studyId, fingerprint), answer: storedFinding, signal }),
    staleTime: Number.POSITIVE_INFINITY,
  });

/** The finding under a fingerprint; without one, nothing is asked. */
export const useFinding = (studyId: string, fingerprint: string | undefined) =>
  useQuery({ ...findingOptions(studyId, fingerprint ?? ""), enabled: fingerprint !== undefined });
