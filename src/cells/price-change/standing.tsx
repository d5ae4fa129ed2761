import { capital } from "../../../shared/study/words.ts";
import { Fault } from "../../components/field.tsx";
import { StateShape } from "../../components/state-shape.tsx";
import type { TrialState } from "./trial.ts";

/** Which of the two is shown: what is stored, or what is tried; or why there is no answer to it. */
export function TrialStanding({ isTried, refusal, shown, question, tookMs }: TrialState) {
  const answered = shown.question === question;
  return (
    <div className="type-small">
      <p role="status" className={isTried ? "flex flex-wrap items-baseline gap-x-2.5" : "sr-only"}>
        {isTried ? (
          <>
            <StateShape state="draft" />
            <strong className="font-semibold">Trying out, not stored</strong>
          </>
        ) : (
          "What is shown is the stored finding."
        )}
      </p>
      {isTried && (
        <p className="text-ink2 tabular-nums">
          {answered && tookMs !== undefined
            ? `Answered in this browser from the stored coefficients, ${Math.max(1, Math.round(tookMs))} ms.`
            : refusal === undefined
              ? "Working it out in this browser; what stands below answers the rulers before."
              : "There is no answer to these prices; what stands below answers the last that has one."}
        </p>
      )}
      {refusal !== undefined && <Fault>{`${capital(refusal)}.`}</Fault>}
    </div>
  );
}
