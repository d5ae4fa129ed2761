import { lazy, Suspense, useEffect, useId, useState } from "react";
import { useNavigate, useParams } from "react-router-dom";
import { LinkButton, LinkWord } from "../../components/button.tsx";
import { presentPeople, typists } from "../../features/presence/present.ts";
import { KeyMarks } from "../../features/remarks/key-marks.tsx";
import { RemarkNews } from "../../features/remarks/remark-news.tsx";
import { useRemarkSetting } from "../../features/remarks/remark-setting.ts";
import { Remarked } from "../../features/remarks/remarked.tsx";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { useStudyPart } from "../../sync/index.ts";
import { AllStandingsProvider } from "../workspace/all-standings.ts";
import { BandSource, type SourcePage } from "../workspace/band-source.tsx";
import { comparable } from "../workspace/comparable.ts";
import { afterFirstFinding } from "../workspace/first-finding.ts";
import { type OpenStudy, useOpenStudy } from "../workspace/open-study.ts";
import { FindingAside, FindingControls, OpenedFinding } from "../workspace/opened-finding.tsx";
import { ReadByThread } from "../workspace/read-by-thread.tsx";
import { StudyBar, type StudyDialog } from "../workspace/study-bar.tsx";
import { StudyDialogs } from "../workspace/study-dialogs.tsx";
import { TypingHere } from "../workspace/typing-here.tsx";
import { useEscape } from "../workspace/use-escape.ts";
import { firstPage, useOneColumn } from "../workspace/use-source-pages.ts";
import { useStandings } from "../workspace/use-standings.ts";
import { useStudyActions } from "../workspace/use-study-actions.ts";

const UploadColumns = lazy(() => afterFirstFinding(() => import("../workspace/upload-columns.tsx")));

/** One cell in full: its source on the left page, everything found on the right. */
export default function OpenedCellPage() {
  const { cellId = "" } = useParams();
  const open = useOpenStudy();
  const { study, connection, readOnly } = open;
  const { standings, cells, uploads } = useStandings(open);
  const standing = standings.find(({ cell }) => cell.id === cellId);
  const [dialog, setDialog] = useState<StudyDialog>();
  const [renaming, setRenaming] = useState(false);
  const oneColumn = useOneColumn();
  const [page, setPage] = useState<SourcePage>(oneColumn ? "closed" : firstPage(standing?.kind));
  const actions = useStudyActions(connection, uploads);
  const typing = useTypingIn(cellId, connection);
  const remarking = useRemarkSetting(study.id, open.me, connection);
  const headingId = useId();
  const navigate = useNavigate();
  usePageTitle(standing?.cell.name, study.title);
  useGoingTo(cellId, connection);
  useEscape(() => void navigate(pages.study(study.id)));
  const crumbs = [
    { to: pages.studies, words: "Studies" },
    { to: pages.study(study.id), words: study.title },
  ];
  return (
    <>
      <StudyBar {...open} crumbs={crumbs} onDialog={setDialog}>
        <LinkButton to={pages.study(study.id)}>Back to the study</LinkButton>
      </StudyBar>
      <main>
        {standing ? (
          <div className="desk">
            <RemarkNews studyId={study.id} me={open.me} connection={connection} />
            <div className={`ledger opened opened-${(standing.kind ?? "none").replace(" ", "-")}`}>
              <div className="band opened-band">
                <ReadByThread studyId={study.id} standing={standing} cells={cells} />
                <Remarked setting={remarking} cell={standing.cell} opened>
                  <div className="verso">
                    <BandSource
                      studyId={study.id}
                      connection={connection}
                      standing={standing}
                      cells={cells}
                      uploads={uploads}
                      readOnly={readOnly}
                      page={page}
                      onPage={(next) => setPage(oneColumn && next === page ? "closed" : next)}
                      headingId={headingId}
                      renaming={renaming}
                      onRename={(name) => void actions.rename(standing.cell, name)}
                      onRenamed={() => setRenaming(false)}
                      onLeave={() => document.getElementById(headingId)?.focus()}
                      actions={{
                        compareWith: comparable(study.id, standing, standings, (to) => void navigate(to)),
                        ...(!readOnly && {
                          changes: {
                            rename: () => setRenaming(true),
                            ...(standing.kind === "data" && { uploads: () => setDialog("uploads") }),
                            remove: () => {
                              actions.remove(cellId);
                              void navigate(pages.study(study.id));
                            },
                          },
                        }),
                      }}
                      typing={typing.length > 0 && <TypingHere people={typing} className="mt-4 block" />}
                      above={<FindingControls {...open} standing={standing} cells={cells} uploads={uploads} />}
                      title
                    />
                    <KeyMarks />
                    {standing.kind === "data" && (
                      <Suspense>
                        <UploadColumns studyId={study.id} cell={standing.cell} cells={cells} uploads={uploads} />
                      </Suspense>
                    )}
                    <FindingAside studyId={study.id} fingerprint={standing.fingerprint} />
                  </div>
                  <div className="recto">
                    <AllStandingsProvider value={standings}>
                      <OpenedFinding {...open} standing={standing} cells={cells} uploads={uploads} />
                    </AllStandingsProvider>
                  </div>
                </Remarked>
              </div>
            </div>
          </div>
        ) : (
          <p className="type-finding mx-auto max-w-2xl px-6 py-16">
            This cell is not in the study any more. Go <LinkWord to={pages.study(study.id)}>back to the study</LinkWord>
            .
          </p>
        )}
      </main>
      <StudyDialogs {...open} standings={standings} open={dialog} onClose={() => setDialog(undefined)} />
    </>
  );
}

/** Tells the others that this person has the cell open. */
function useGoingTo(cellId: string, connection: OpenStudy["connection"]): void {
  useEffect(() => {
    connection.goTo(cellId);
    return () => connection.goTo(null);
  }, [cellId, connection]);
}

function useTypingIn(cellId: string, connection: OpenStudy["connection"]) {
  const whereabouts = useStudyPart(connection, "whereabouts");
  const people = useStudyPart(connection, "people");
  const you = useStudyPart(connection, "you");
  const there = new Set(typists(cellId, whereabouts, you).map(({ id }) => id));
  return presentPeople(people, whereabouts, you).filter(({ person }) => there.has(person.id));
}
