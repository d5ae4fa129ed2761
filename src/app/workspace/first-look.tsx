import { useEffect, useId, useMemo } from "react";
import { useMatch, useParams } from "react-router-dom";
import type { StudySummary } from "../../../shared/schemas/resources.ts";
import type { StudyStatus } from "../../../shared/schemas/status.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { TopBar } from "../../components/top-bar.tsx";
import { useFinding } from "../../features/findings/api/get-finding.ts";
import { useStatus } from "../../features/findings/api/get-status.ts";
import { pages } from "../../lib/paths.ts";
import { bandId } from "./addresses.ts";
import { BandFinding } from "./band-finding.tsx";
import { CellName } from "./cell-name.tsx";
import { FindingOpen, OnItsWay } from "./finding-view.tsx";
import { firstFindingShown } from "./first-finding.ts";
import { HeadBand } from "./head-band.tsx";
import { ReadByThread } from "./read-by-thread.tsx";
import type { Standing } from "./standing.ts";
import { StateLine } from "./state-line.tsx";
import { standingsTold } from "./told.ts";

const NO_CELLS: readonly CellSource[] = [];
const nothing = () => {};

/**
 * A study, or a cell of it, as the server tells of it, to be read while the live document is still on its way: the
 * findings in the place where they will stay, under the very source that found them.
 */
export function FirstLook({ study }: { study: StudySummary }) {
  const { cellId: openedId, leftId } = useParams();
  // Of two systems set beside each other, and of the history, nothing is shown beforehand.
  const isHistory = useMatch("/studies/:studyId/history") !== null;
  const cellId = openedId ?? leftId ?? (isHistory ? "none" : undefined);
  const { data: status, failureCount } = useStatus(study.id);
  const cells = useMemo(() => cellsTold(status), [status]);
  const standings = useMemo(() => standingsTold(cells, status), [cells, status]);
  const opened = openedId ? standings.find(({ cell }) => cell.id === openedId) : undefined;
  const isNothingToRead =
    (failureCount > 0 && !status) ||
    (status !== undefined && (cellId ? !opened?.fingerprint : !standings.some((one) => one.fingerprint)));
  useEffect(() => {
    if (isNothingToRead) firstFindingShown();
  }, [isNothingToRead]);
  const crumbs = [
    { to: pages.studies, words: "Studies" },
    ...(cellId ? [{ to: pages.study(study.id), words: study.title }] : []),
  ];
  return (
    <>
      <TopBar home={pages.studies} crumbs={crumbs} narrowName={study.title}>
        <span role="status" className="text-ink2">
          Opening
        </span>
      </TopBar>
      <main aria-busy="true">
        <div className="desk">
          {opened ? (
            <OpenedLook studyId={study.id} standing={opened} cells={cells} />
          ) : (
            <div className="ledger">
              <div className="pages-end" aria-hidden="true">
                <div className="verso" />
                <div className="recto" />
              </div>
              <HeadBand study={study} standings={standings} readOnly />
              {!cellId &&
                standings.map((standing) => <BandLook key={standing.cell.id} studyId={study.id} standing={standing} />)}
            </div>
          )}
        </div>
      </main>
    </>
  );
}

interface LookProps {
  readonly studyId: string;
  readonly standing: Standing;
}

function BandLook({ studyId, standing }: LookProps) {
  const headingId = useId();
  return (
    <section id={bandId(standing.cell.id)} aria-labelledby={headingId} tabIndex={-1} className="band">
      <div className="verso">
        <SourceLook standing={standing} headingId={headingId} />
      </div>
      <div className="recto">
        <BandFinding studyId={studyId} standing={standing} />
      </div>
    </section>
  );
}

function OpenedLook({ studyId, standing, cells }: LookProps & { cells: readonly CellSource[] }) {
  const headingId = useId();
  const { data } = useFinding(studyId, standing.fingerprint);
  return (
    <div className={`ledger opened opened-${standing.kind ?? "none"}`}>
      <div className="band opened-band">
        <ReadByThread studyId={studyId} standing={standing} cells={cells} />
        <div className="verso">
          <SourceLook standing={standing} headingId={headingId} title />
        </div>
        <div className="recto">
          <h2 className="sr-only">Finding</h2>
          <StateLine standing={standing} />
          {data ? (
            <FindingOpen finding={data.finding} status={standing.status} />
          ) : (
            standing.fingerprint && <OnItsWay />
          )}
        </div>
      </div>
    </div>
  );
}

function SourceLook({ standing, headingId, title }: { standing: Standing; headingId: string; title?: boolean }) {
  const { cell, fingerprint } = standing;
  return (
    <>
      <div className="pb-3">
        <CellName
          cell={cell}
          cells={NO_CELLS}
          headingId={headingId}
          renaming={false}
          onRename={nothing}
          onDone={nothing}
          title={title}
        />
      </div>
      {/* Of a cell without a finding only the document knows what it asks now. */}
      <pre className="type-source wide-only whitespace-pre-wrap">{fingerprint ? cell.source : " "}</pre>
    </>
  );
}

/** The cells as the server has told of them, each with the source its finding was found under. */
function cellsTold(status: StudyStatus | undefined): readonly CellSource[] {
  return (
    status?.cells.map(({ cellId, name, kind, last }) => ({
      id: cellId,
      name,
      kind: kind ?? "",
      order: "",
      source: last?.source ?? "",
    })) ?? NO_CELLS
  );
}
