import { useState } from "react";
import { useSearchParams } from "react-router-dom";
import { LinkButton } from "../../components/button.tsx";
import { CheckpointList } from "../../features/history/checkpoint-list.tsx";
import { HistoryFilters } from "../../features/history/history-filters.tsx";
import { HistoryList } from "../../features/history/history-list.tsx";
import { useNewestHistory } from "../../features/history/use-newest-history.ts";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { type StudyConnection, useStudyPart } from "../../sync/index.ts";
import { useOpenStudy } from "../workspace/open-study.ts";
import { StudyBar, type StudyDialog } from "../workspace/study-bar.tsx";
import { StudyDialogs } from "../workspace/study-dialogs.tsx";

/** Who changed what in a study and when, and its checkpoints. */
export default function HistoryPage() {
  const open = useOpenStudy();
  const { study, me, connection, readOnly } = open;
  const cells = useStudyPart(connection, "cells");
  const hindrance = useHindrance(connection);
  const [search, setSearch] = useSearchParams();
  const [dialog, setDialog] = useState<StudyDialog>();
  const filter = { cell: search.get("cell") ?? "", person: search.get("person") ?? "" };
  usePageTitle("History", study.title);
  useNewestHistory(study.id, connection);
  const crumbs = [
    { to: pages.studies, words: "Studies" },
    { to: pages.study(study.id), words: study.title },
  ];
  return (
    <>
      <StudyBar {...open} crumbs={crumbs} onDialog={setDialog}>
        <LinkButton to={pages.study(study.id)}>Back to the study</LinkButton>
      </StudyBar>
      <main className="desk">
        <div className="ledger history">
          <div className="pages-end" aria-hidden="true">
            <div className="verso" />
            <div className="recto" />
          </div>
          <div className="band">
            <div className="verso">
              <h1 className="type-title">History</h1>
              <CheckpointList
                studyId={study.id}
                cells={cells}
                you={me.id}
                may={{ make: !readOnly, remove: study.role === "owner" }}
                hindrance={hindrance}
                onReturn={(then, name) => connection.returnTo(then, name)}
              />
            </div>
            <div className="recto">
              <div className="flex flex-wrap items-baseline justify-between gap-x-8 gap-y-2">
                <h2 className="type-section">Who changed what</h2>
                <HistoryFilters
                  filter={filter}
                  cells={cells}
                  people={study.people}
                  onFilter={({ cell, person }) =>
                    setSearch({ ...(cell && { cell }), ...(person && { person }) }, { replace: true })
                  }
                />
              </div>
              <HistoryList
                studyId={study.id}
                filter={filter}
                cells={cells}
                you={me.id}
                onBringBack={readOnly ? undefined : (cell) => connection.bringBack(cell)}
              />
            </div>
          </div>
        </div>
      </main>
      <StudyDialogs {...open} standings={[]} open={dialog} onClose={() => setDialog(undefined)} />
    </>
  );
}

/** Why the state of the study on this page is not yet that of the server. */
function useHindrance(connection: StudyConnection): string | undefined {
  const { state } = useStudyPart(connection, "connection");
  const stored = useStudyPart(connection, "stored");
  const readOnly = useStudyPart(connection, "readOnly");
  if (readOnly) return undefined;
  if (state !== "connected") return "This waits for the connection: a checkpoint is kept where everyone finds it.";
  return stored.unstored > 0 ? "This waits until your last edit is saved." : undefined;
}
