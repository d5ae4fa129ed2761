import { useEffect, useState } from "react";
import type { CellKind } from "../../../shared/schemas/cell.ts";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { AllStandingsProvider } from "../workspace/all-standings.ts";
import { BringUpToDate } from "../workspace/bring-up-to-date.tsx";
import { expectOpening } from "../workspace/finding-view.tsx";
import { Ledger } from "../workspace/ledger.tsx";
import { useOpenStudy } from "../workspace/open-study.ts";
import { StudyBar, type StudyDialog } from "../workspace/study-bar.tsx";
import { StudyDialogs } from "../workspace/study-dialogs.tsx";
import { useOneColumn } from "../workspace/use-source-pages.ts";
import { useStandings } from "../workspace/use-standings.ts";

const CRUMBS = [{ to: pages.studies, words: "Studies" }];

/** A study: every cell with its source and its finding. */
export default function WorkspacePage() {
  const open = useOpenStudy();
  const { standings, cells, uploads, error, isKnown } = useStandings(open);
  const [dialog, setDialog] = useState<StudyDialog>();
  const oneColumn = useOneColumn();
  const kinds = [...new Set(standings.flatMap(({ kind }) => kind ?? []))].join(" ");
  usePageTitle(open.study.title);
  useEffect(() => {
    expectOpening(kinds ? (kinds.split(" ") as CellKind[]) : []);
  }, [kinds]);
  const bring = open.readOnly ? undefined : <BringUpToDate studyId={open.study.id} standings={standings} />;
  return (
    <>
      <StudyBar {...open} crumbs={CRUMBS} onDialog={setDialog}>
        {!oneColumn && bring}
      </StudyBar>
      <main aria-busy={!isKnown}>
        {error && (
          <div className="px-6 pb-3">
            <Fault>{sentenceOf(error)}</Fault>
          </div>
        )}
        <AllStandingsProvider value={standings}>
          <Ledger
            {...open}
            standings={standings}
            cells={cells}
            uploads={uploads}
            headAction={oneColumn && bring}
            onUploads={() => setDialog("uploads")}
            onRemarks={() => setDialog("remarks")}
          />
        </AllStandingsProvider>
      </main>
      <StudyDialogs {...open} standings={standings} open={dialog} onClose={() => setDialog(undefined)} />
    </>
  );
}
