import { useState } from "react";
import { describeChanges } from "../../../shared/study/changes.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { Button, Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { useStartEstimation } from "../../features/estimation/api/start-estimation.ts";
import { sentenceOf } from "../../lib/api.ts";
import { aboutInWords, whenInWords } from "../../lib/dates.ts";
import { KeptFinding } from "./kept-finding.tsx";
import type { Standing } from "./standing.ts";

interface UnansweredProps {
  readonly studyId: string;
  readonly standing: Standing;
  /** Absent for those who only read. */
  readonly onChange?: (nextSource: string) => void;
}

function formOf({ kind }: Standing, source: string): string | undefined {
  const { form } = kind === "system" ? parseCell("system", source).written : {};
  return typeof form === "string" ? form : undefined;
}

/** How the last finding is called: by its form where that is what differs, else by its time. */
function calledLast(standing: Standing): string {
  const { last, cell } = standing;
  const form = last && formOf(standing, last.source);
  return form !== undefined && form !== formOf(standing, cell.source) ? form : "last";
}

/** In the finding's place while there is none: what would find one, and the last one, kept under its own source. */
export default function Unanswered({ studyId, standing, onChange }: UnansweredProps) {
  const [looking, setLooking] = useState(false);
  const { cell, last, aboutMs } = standing;
  const called = calledLast(standing);
  const own = last !== undefined && describeChanges(last.source, cell.source) === undefined;
  const failed = standing.state === "failed";
  return (
    <div>
      {last && !failed && (
        <p className="type-finding max-w-[40rem]">
          No finding stands under this specification yet. The last one{called === "last" ? "" : `, ${called}`}, of{" "}
          {whenInWords(last.at)}, is kept under its own.
        </p>
      )}
      {standing.waitsForFile && (
        <p className="type-finding max-w-[40rem]">
          A file comes first: a row for each household or period, with what was paid and bought of each good, any two of
          price, quantity and expenditure.
        </p>
      )}
      <div className="flex flex-wrap items-center gap-x-6 gap-y-2 pt-2">
        {onChange && aboutMs !== undefined && <EstimateButton studyId={studyId} standing={standing} />}
        {last && (
          <Word quiet aria-expanded={looking} onClick={() => setLooking(!looking)}>
            {looking ? "Put it away" : `Look at the ${called} finding`}
          </Word>
        )}
        {onChange && last && !own && (
          <Word quiet onClick={() => onChange(last.source)}>
            {called === "last" ? "Return to its specification" : `Return to ${called}`}
          </Word>
        )}
      </div>
      {looking && last && <KeptFinding studyId={studyId} last={last} />}
    </div>
  );
}

function EstimateButton({ studyId, standing }: Pick<UnansweredProps, "studyId" | "standing">) {
  const start = useStartEstimation(studyId);
  const { cell, aboutMs = 0 } = standing;
  const form = formOf(standing, cell.source);
  return (
    <>
      <Button disabled={start.isPending} onClick={() => start.mutate(cell.id)}>
        Estimate {form ?? cell.name}, {aboutInWords(aboutMs)}
      </Button>
      {start.isError && <Fault>{sentenceOf(start.error)}</Fault>}
    </>
  );
}
