import type { CheckpointSummary } from "../../../shared/schemas/history.ts";
import { stateDifferences } from "../../../shared/study/cell-differences.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { counted, listWords } from "../../../shared/study/words.ts";
import { Button, Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useBeginReturn } from "./api/change-checkpoints.ts";
import { useCheckpoint } from "./api/get-checkpoints.ts";

interface ReturnToCheckpointProps {
  readonly studyId: string;
  readonly checkpoint: CheckpointSummary;
  readonly cells: readonly CellSource[];
  readonly hindrance?: string;
  readonly onReturn: (cells: readonly CellSource[], name: string) => void;
  readonly onClose: () => void;
}

/** Says what returning would do before it is done; what is left is kept as a checkpoint of its own. */
export function ReturnToCheckpoint({
  studyId,
  checkpoint,
  cells,
  hindrance,
  onReturn,
  onClose,
}: ReturnToCheckpointProps) {
  const { data, error } = useCheckpoint(studyId, checkpoint.id);
  const begin = useBeginReturn(studyId, checkpoint.id);
  const fault = hindrance ?? (begin.error ? sentenceOf(begin.error) : error ? sentenceOf(error) : undefined);
  const changes = data && whatReturns(data.content, cells);
  if (changes === "") return <p className="pt-2">The study stands as it did then: there is nothing to return to.</p>;
  return (
    <div className="pt-2">
      <p>
        {changes ?? "Comparing."} What stands now is kept as a checkpoint first, and undoing takes the return back.
        Findings of then are current again at once.
      </p>
      {fault && <Fault>{fault}</Fault>}
      <p className="flex flex-wrap items-center gap-x-5 gap-y-2 pt-2">
        <Button
          disabled={begin.isPending || hindrance !== undefined || !data}
          onClick={() =>
            begin.mutate(undefined, {
              onSuccess: ({ to }) => {
                onReturn(to.content, to.name);
                onClose();
              },
            })
          }
        >
          {begin.isPending ? "Returning" : "Return to it"}
        </Button>
        <Word quiet onClick={onClose}>
          Leave the study as it is
        </Word>
      </p>
    </div>
  );
}

/** "2 cells change, linear comes back and matrix goes."; empty when nothing does. */
function whatReturns(then: readonly CellSource[], now: readonly CellSource[]): string {
  const differences = stateDifferences(now, then);
  const named = (whole: "added" | "removed") =>
    differences.flatMap((one) => (one.difference.whole === whole ? ((one.after ?? one.before)?.name ?? []) : []));
  const changed = differences.filter(({ difference }) => difference.whole === undefined).length;
  const [back, gone] = [named("added"), named("removed")];
  const parts = [
    changed > 0 && `${counted(changed, "cell")} ${changed === 1 ? "changes" : "change"}`,
    back.length > 0 && `${listWords(back)} ${back.length === 1 ? "comes" : "come"} back`,
    gone.length > 0 && `${listWords(gone)} ${gone.length === 1 ? "goes" : "go"}`,
  ].filter((part) => part !== false);
  const sentence = parts.join("; ");
  return sentence && `${sentence.charAt(0).toUpperCase()}${sentence.slice(1)}.`;
}
