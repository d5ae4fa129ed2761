import { useQueryClient } from "@tanstack/react-query";
import { useEffect } from "react";
import { type StudyConnection, useStudyPart } from "../../sync/index.ts";
import { historyKey } from "./api/get-history.ts";

/** How long edits must rest before the history is asked for again. */
const REST_MS = 1_500;

/** Keeps the history up to what is done while it is open. */
export function useNewestHistory(studyId: string, connection: StudyConnection): void {
  const client = useQueryClient();
  const cells = useStudyPart(connection, "cells");
  const { unstored } = useStudyPart(connection, "stored");
  useEffect(() => {
    // Named here, so that the rest begins anew whenever one of them changes.
    void cells;
    if (unstored > 0) return;
    const rest = setTimeout(() => void client.invalidateQueries({ queryKey: historyKey(studyId) }), REST_MS);
    return () => clearTimeout(rest);
  }, [client, studyId, cells, unstored]);
}
