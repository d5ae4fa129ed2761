import { lazy, Suspense, useEffect, useState } from "react";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import type { LookedAt } from "../../cells/types.ts";
import { Unfetched } from "../../components/unfetched.tsx";
import { ProgressLine } from "../../features/estimation/progress-line.tsx";
import { useFinding } from "../../features/findings/api/get-finding.ts";
import { sentenceOf } from "../../lib/api.ts";
import { AsideOf, ControlsOf, FindingOpen } from "./finding-view.tsx";
import { firstFindingShown } from "./first-finding.ts";
import { keepOnly } from "./keep-only.ts";
import type { OpenStudy } from "./open-study.ts";
import { ProblemList } from "./problem-list.tsx";
import { renameGoodEverywhere } from "./rename-good-everywhere.ts";
import type { Standing } from "./standing.ts";
import { StateLine } from "./state-line.tsx";

const RowsDialog = lazy(() => import("../../features/uploads/rows-dialog.tsx"));
const Unanswered = lazy(() => import("./unanswered.tsx"));
const TextCell = lazy(() => import("./text-cell.tsx"));

interface OpenedFindingProps extends OpenStudy {
  readonly standing: Standing;
  readonly cells: readonly CellSource[];
  readonly uploads: readonly Upload[];
}

/** The right page of an opened cell: the finding in full, or what stands in its place. */
export function OpenedFinding(props: OpenedFindingProps) {
  const { study, connection, readOnly, standing } = props;
  if (standing.kind !== "text" || standing.isUnread) return <StoredFinding {...props} />;
  const onChange = readOnly ? undefined : (next: string) => connection.replaceSource(standing.cell.id, next);
  return (
    <>
      <h2 className="sr-only">Finding</h2>
      <Suspense fallback={<StateLine standing={standing} />}>
        <TextCell studyId={study.id} standing={standing} onChange={onChange} opened />
      </Suspense>
    </>
  );
}

function StoredFinding({ study, connection, readOnly, standing, cells, uploads }: OpenedFindingProps) {
  const { cell, fingerprint, status, state, progress } = standing;
  const { data, error, refetch } = useFinding(study.id, fingerprint);
  useEffect(() => {
    if (error || (!fingerprint && !standing.isUnread)) firstFindingShown();
  }, [error, fingerprint, standing.isUnread]);
  const onChange = readOnly ? undefined : (next: string) => connection.replaceSource(cell.id, next);
  const [looked, setLooked] = useState<LookedAt>();
  const form = {
    source: cell.source,
    onChange: onChange ?? (() => {}),
    onRenameGood: (good: string, name: string) => void renameGoodEverywhere(connection, cell.id, good, name),
    readOnly,
    context: { cells, uploads },
    ...(standing.kind === "data" && { onLook: setLooked }),
  };
  return (
    <>
      <h2 className="sr-only">Finding</h2>
      <StateLine standing={standing} />
      {fingerprint && data && <FindingOpen finding={data.finding} status={status} form={form} />}
      <Suspense>
        {looked && fingerprint && (
          <RowsDialog
            studyId={study.id}
            of={{ cellId: cell.id, about: looked.about, fingerprint }}
            title={looked.title}
            {...(onChange && { onKeep: (expression) => onChange(keepOnly(cell.source, expression)) })}
            onClose={() => setLooked(undefined)}
          />
        )}
      </Suspense>
      {fingerprint && error && <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />}
      {state === "failed" && <ProblemList standing={standing} onMend={onChange} />}
      {state === "estimating" && progress && (
        <ProgressLine studyId={study.id} cellId={cell.id} name={cell.name} progress={progress} readOnly={readOnly} />
      )}
      {!standing.isUnread && (state === "draft" || state === "out of date") && (
        <Suspense>
          <Unanswered studyId={study.id} standing={standing} onChange={onChange} />
        </Suspense>
      )}
    </>
  );
}

/** What moves the finding from the source page: rulers of prices. */
export function FindingControls({ study, connection, readOnly, standing, cells, uploads }: OpenedFindingProps) {
  const { cell, fingerprint } = standing;
  const { data } = useFinding(study.id, fingerprint);
  if (!data) return null;
  const onChange = (next: string) => connection.replaceSource(cell.id, next);
  const form = { source: cell.source, onChange, readOnly, context: { cells, uploads } };
  return <ControlsOf finding={data.finding} form={form} />;
}

/** What a kind says of its finding on the source page: how each check is made. */
export function FindingAside({ studyId, fingerprint }: { studyId: string; fingerprint: string | undefined }) {
  const { data } = useFinding(studyId, fingerprint);
  return data ? <AsideOf finding={data.finding} /> : null;
}
