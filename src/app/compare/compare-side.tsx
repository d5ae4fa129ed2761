import { lazy, Suspense, useId } from "react";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { systemSentence } from "../../../shared/tables/sentence.ts";
import { asChoices, ChoiceControl } from "../../cells/form/fields.tsx";
import { Headline } from "../../cells/headline.tsx";
import { LinkWord } from "../../components/button.tsx";
import { ProgressLine } from "../../features/estimation/progress-line.tsx";
import { pages } from "../../lib/paths.ts";
import { ProblemList } from "../workspace/problem-list.tsx";
import type { Standing } from "../workspace/standing.ts";
import { StateLine } from "../workspace/state-line.tsx";
import { SideMark } from "./side-mark.tsx";

const Unanswered = lazy(() => import("../workspace/unanswered.tsx"));

interface SideProps {
  readonly side: "left" | "right";
  readonly studyId: string;
  readonly standing: Standing;
  /** Names of the systems it can be exchanged for. */
  readonly others: readonly string[];
  readonly onChoose: (name: string) => void;
  readonly finding: SystemFinding | undefined;
  readonly onChange?: (nextSource: string) => void;
}

/** One of the two systems: which it is, how it stands, and what it finds in a sentence. */
export function CompareSide(props: SideProps) {
  const { side, studyId, standing, others, onChoose, finding } = props;
  const { cell } = standing;
  const id = useId();
  return (
    <div className={`beside-head beside-${side}`}>
      <h2 className="type-cell-name flex items-baseline">
        <SideMark side={side} />
        {cell.name} <span className="type-kind ml-1.5 font-normal tracking-normal">{cell.kind}</span>
      </h2>
      <div className="type-small flex max-w-72 items-baseline gap-3 pt-1 pb-3 text-ink2">
        <label htmlFor={id} className="shrink-0">
          {side === "left" ? "On the left" : "On the right"}
        </label>
        <ChoiceControl id={id} value={cell.name} choices={asChoices(others)} onChange={onChoose} readOnly={false} />
      </div>
      <StateLine
        standing={standing}
        actions={
          <LinkWord to={pages.cell(studyId, cell.id)}>
            Open <span className="sr-only">{cell.name}</span>
          </LinkWord>
        }
      />
      {finding ? <Headline sentence={systemSentence(finding)} /> : <InItsPlace {...props} />}
    </div>
  );
}

/** What stands where the finding would: its numbers are not compared, and this says why. */
function InItsPlace({ studyId, standing, onChange }: SideProps) {
  const { state, progress, cell } = standing;
  if (standing.fingerprint) return <p className="type-small text-ink3">Fetching the finding</p>;
  if (state === "failed") return <ProblemList standing={standing} onMend={onChange} />;
  if (state === "estimating" && progress) {
    return (
      <ProgressLine studyId={studyId} cellId={cell.id} name={cell.name} progress={progress} readOnly={!onChange} />
    );
  }
  return (
    <Suspense>
      <Unanswered studyId={studyId} standing={standing} onChange={onChange} />
    </Suspense>
  );
}
