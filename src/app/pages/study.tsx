import { useQueryClient } from "@tanstack/react-query";
import { useEffect } from "react";
import { Outlet, useParams } from "react-router-dom";
import type { Account, StudySummary } from "../../../shared/schemas/resources.ts";
import { LinkWord } from "../../components/button.tsx";
import { useMe } from "../../features/accounts/api/get-me.ts";
import { useStudy } from "../../features/studies/api/get-study.ts";
import { sentenceOf } from "../../lib/api.ts";
import { pages } from "../../lib/paths.ts";
import type { StudyConnection } from "../../sync/index.ts";
import { useStudyConnection, useStudyPart } from "../../sync/index.ts";
import { PlainPage } from "../plain-page.tsx";
import { Waiting } from "../waiting.tsx";
import type { OpenStudy } from "../workspace/open-study.ts";

/** Opens a study for the pages within it: one connection, however often one goes from page to page. */
export default function StudyPage() {
  const { studyId = "" } = useParams();
  const { data: me } = useMe();
  const { data: study, error } = useStudy(studyId);
  if (error && !study) {
    return (
      <PlainPage title="This study cannot be opened">
        <p className="type-prose">
          {sentenceOf(error)} Yours are among the <LinkWord to={pages.studies}>studies</LinkWord>.
        </p>
      </PlainPage>
    );
  }
  return me && study ? <Connected key={studyId} study={study} me={me} /> : <Waiting />;
}

function Connected({ study, me }: { study: StudySummary; me: Account }) {
  const connection = useStudyConnection(study.id, me, study.role);
  return connection ? <Opened study={study} me={me} connection={connection} /> : <Waiting />;
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
  if (!isLoaded && state === "connecting") return <Waiting />;
  return <Outlet context={{ study, me, connection, readOnly: study.role === "reader" } satisfies OpenStudy} />;
}
