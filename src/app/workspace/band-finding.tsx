import { lazy, type ReactNode, Suspense, useEffect, useState } from "react";
import type { LabelledTable } from "../../../shared/tables/table.ts";
import { LinkWord } from "../../components/button.tsx";
import { Unfetched } from "../../components/unfetched.tsx";
import { ProgressLine } from "../../features/estimation/progress-line.tsx";
import { useFinding } from "../../features/findings/api/get-finding.ts";
import { sentenceOf } from "../../lib/api.ts";
import { pages } from "../../lib/paths.ts";
import { CopyWord } from "./copy-word.tsx";
import { expectBand, FindingBand, OnItsWay, useTables } from "./finding-view.tsx";
import { afterFirstFinding, firstFindingShown, hasBeenSeen, nowSeen } from "./first-finding.ts";
import { ProblemList } from "./problem-list.tsx";
import type { Standing } from "./standing.ts";
import { StateLine } from "./state-line.tsx";

const Unanswered = lazy(() => import("./unanswered.tsx"));
const TextCell = lazy(() => afterFirstFinding(() => import("./text-cell.tsx")));

interface BandFindingProps {
  readonly studyId: string;
  readonly standing: Standing;
  readonly beside?: ReactNode;
  /** Absent for those who only read. */
  readonly onChange?: (nextSource: string) => void;
}

/** The right page of a band: the state line, then the finding, or what stands in its place. */
export function BandFinding(props: BandFindingProps) {
  const { standing, beside } = props;
  // Of a text nothing is stored: it is read anew wherever it is shown.
  if (standing.kind !== "text" || standing.isUnread) return <StoredFinding {...props} />;
  return (
    <Suspense fallback={<StateLine standing={standing} beside={beside} />}>
      <TextCell {...props} />
    </Suspense>
  );
}

function StoredFinding({ studyId, standing, beside, onChange }: BandFindingProps) {
  const { fingerprint, cell, status, kind } = standing;
  const { data, error, refetch } = useFinding(studyId, fingerprint);
  const arrives = useArrival(data && fingerprint);
  const table = useTables(data?.finding)?.[0];
  useEffect(() => {
    if (kind && fingerprint) expectBand(kind);
  }, [kind, fingerprint]);
  useEffect(() => {
    if (error) firstFindingShown();
  }, [error]);
  const actions = fingerprint && data && (
    <>
      <LinkWord to={pages.cell(studyId, cell.id)}>
        {kind === "data" ? "Row accounting" : "Open"} <span className="sr-only">of {cell.name}</span>
      </LinkWord>
      {kind !== "data" && table && <CopyWord what="table" name={cell.name} write={() => writeTable(table)} />}
    </>
  );
  return (
    <>
      <StateLine standing={standing} beside={beside} actions={actions} />
      {fingerprint ? (
        <div className={arrives ? "arrives" : ""} key={fingerprint}>
          {data && <FindingBand finding={data.finding} status={status} />}
          {error && <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />}
          {!data && !error && <OnItsWay />}
        </div>
      ) : (
        !standing.isUnread && (
          <Suspense>
            <Otherwise studyId={studyId} standing={standing} onChange={onChange} />
          </Suspense>
        )
      )}
    </>
  );
}

/** Whether a finding is new to the page and may fade in; what has been read already stays where it is. */
function useArrival(fingerprint: string | undefined): boolean {
  const [first, setFirst] = useState(fingerprint);
  const [isNew, setIsNew] = useState(fingerprint === undefined || !hasBeenSeen(fingerprint));
  if (fingerprint !== undefined && fingerprint !== first) {
    setFirst(fingerprint);
    setIsNew(!hasBeenSeen(fingerprint));
  }
  useEffect(() => {
    if (fingerprint) nowSeen(fingerprint);
  }, [fingerprint]);
  return isNew;
}

function Otherwise({ studyId, standing, onChange }: Omit<BandFindingProps, "beside">) {
  const { state, progress, cell } = standing;
  if (state === "failed") {
    return (
      <>
        <ProblemList standing={standing} onMend={onChange} />
        {standing.last && <Unanswered studyId={studyId} standing={standing} onChange={onChange} />}
      </>
    );
  }
  if (state === "estimating" && progress) {
    return (
      <ProgressLine studyId={studyId} cellId={cell.id} name={cell.name} progress={progress} readOnly={!onChange} />
    );
  }
  return <Unanswered studyId={studyId} standing={standing} onChange={onChange} />;
}

/** The code that makes a table for a spreadsheet is loaded when one is copied. */
async function writeTable(table: LabelledTable): Promise<void> {
  const { copyTable } = await import("../../cells/copy-table.tsx");
  await copyTable(table, "table");
}
