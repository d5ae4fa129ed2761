import type { Progress } from "../../../shared/schemas/status.ts";
import { Button } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useCancelEstimation } from "./api/cancel-estimation.ts";
import { CANCEL_AFTER_MS, progressInWords } from "./progress-words.ts";
import { useRunning } from "./use-elapsed.ts";

interface ProgressLineProps {
  readonly studyId: string;
  readonly cellId: string;
  readonly name: string;
  readonly progress: Progress;
  readonly readOnly: boolean;
}

/** How far it is, in words, and *Cancel* from two seconds on. */
export function ProgressLine({ studyId, cellId, name, progress, readOnly }: ProgressLineProps) {
  const running = useRunning(progress);
  const cancel = useCancelEstimation(studyId);
  const mayCancel = !readOnly && running.elapsedMs >= CANCEL_AFTER_MS;
  return (
    <div className="pt-2">
      <p className="type-small text-ink2 tabular-nums">{progressInWords(running)}</p>
      {progress.fraction !== undefined && (
        <progress
          aria-label={`Estimating ${name}`}
          className="progress mt-2"
          max={1}
          value={Math.min(1, progress.fraction)}
        />
      )}
      {mayCancel && (
        <Button className="mt-3" disabled={cancel.isPending} onClick={() => cancel.mutate(cellId)}>
          {cancel.isPending ? "Cancelling" : "Cancel"}
        </Button>
      )}
      {cancel.isError && <Fault>{sentenceOf(cancel.error)}</Fault>}
    </div>
  );
}
