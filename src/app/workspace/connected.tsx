import { useQueryClient } from "@tanstack/react-query";
import { lazy, Suspense, useEffect } from "react";
import { Outlet } from "react-router-dom";
import type { Account, StudySummary } from "../../../shared/schemas/resources.ts";
import type { StudyConnection } from "../../sync/index.ts";
import { useStudyConnection, useStudyPart } from "../../sync/index.ts";
import { FirstLook } from "./first-look.tsx";
import type { OpenStudy } from "./open-study.ts";

const KeptWords = lazy(() => import("../../features/presence/kept-words.tsx"));

/** The study's live document, for the pages within it: one connection, however often one goes from page to page. */
export default function Connected({ study, me }: { study: StudySummary; me: Account }) {
  const connection = useStudyConnection(study.id, me, study.role);
  return connection ? <Opened study={study} me={me} connection={connection} /> : <FirstLook study={study} />;
}

function Opened({ study, me, connection }: { study: StudySummary; me: Account; connection: StudyConnection }) {
  const you = useStudyPart(connection, "you");
  const isLoaded = useStudyPart(connection, "loaded");
  const state = useStudyPart(connection, "connection").state;
  const client = useQueryClient();
  // The server may have given another role since the page asked.
  const isStale = you !== undefined && you.role !== study.role;
  useEffect(() => {
    if (isStale) void client.invalidateQueries({ queryKey: ["studies", study.id] });
  }, [client, isStale, study.id]);
  if (!isLoaded && state === "connecting") return <FirstLook study={study} />;
  return (
    <Suspense fallback={<FirstLook study={study} />}>
      {study.role === "reader" && isLoaded && <NotTaken study={study} me={me} connection={connection} />}
      <Outlet context={{ study, me, connection, readOnly: study.role === "reader" } satisfies OpenStudy} />
    </Suspense>
  );
}

/** What someone wrote while they still could, and the server has not: it has met them as a reader since. */
function NotTaken({ study, me, connection }: { study: StudySummary; me: Account; connection: StudyConnection }) {
  const cells = useStudyPart(connection, "cells");
  return (
    <Suspense>
      <KeptWords
        accountId={me.id}
        studyId={study.id}
        cells={cells}
        because="You read this study now and no longer write in it, so the last you wrote could not be stored."
      />
    </Suspense>
  );
}
