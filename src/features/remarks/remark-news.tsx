import { useQueryClient } from "@tanstack/react-query";
import { useEffect, useRef, useState } from "react";
import type { Remark } from "../../../shared/schemas/remarks.ts";
import { type StudyConnection, useStudyPart } from "../../sync/index.ts";
import { remarksOptions, useRemarks } from "./api/list-remarks.ts";
import { newsIn } from "./news.ts";

interface RemarkNewsProps {
  readonly studyId: string;
  readonly me: { readonly id: string };
  readonly connection: StudyConnection;
}

/**
 * Keeps the remarks of an open study as they are on the server: asked for anew when the server says that they have
 * changed, and when the connection comes back. What others wrote meanwhile is said to those who listen to the page.
 */
export function RemarkNews({ studyId, me, connection }: RemarkNewsProps) {
  useLiveRemarks(studyId, connection);
  const { data } = useRemarks(studyId);
  const before = useRef<readonly Remark[]>(undefined);
  const [news, setNews] = useState("");
  useEffect(() => {
    if (data === undefined) return;
    const said = before.current && newsIn(before.current, data, me.id);
    if (said) setNews(said);
    before.current = data;
  }, [data, me.id]);
  return (
    <p role="status" className="sr-only">
      {news}
    </p>
  );
}

function useLiveRemarks(studyId: string, connection: StudyConnection): void {
  const client = useQueryClient();
  const told = useStudyPart(connection, "remarksTold");
  const isConnected = useStudyPart(connection, "connection").state === "connected";
  useEffect(() => {
    const { queryKey } = remarksOptions(studyId);
    // The first answer is on its way already when the page opens.
    const isKnown = (client.getQueryState(queryKey)?.dataUpdatedAt ?? 0) > 0;
    if (isConnected && (told > 0 || isKnown)) void client.invalidateQueries({ queryKey });
  }, [client, studyId, told, isConnected]);
}
