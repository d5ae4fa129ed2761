import { useState } from "react";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { Button } from "../../components/button.tsx";
import { Unfetched } from "../../components/unfetched.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useMakeCheckpoint } from "./api/change-checkpoints.ts";
import { useCheckpoints } from "./api/get-checkpoints.ts";
import { CheckpointEntry, type CheckpointRights } from "./checkpoint-entry.tsx";
import { CheckpointForm } from "./checkpoint-form.tsx";

interface CheckpointListProps {
  readonly studyId: string;
  readonly cells: readonly CellSource[];
  readonly you: string;
  readonly may: CheckpointRights;
  /** Why the study cannot be kept or changed just now, in a sentence. */
  readonly hindrance?: string;
  readonly onReturn: (cells: readonly CellSource[], name: string) => void;
}

/** The states of the study that were given a name, and the way to keep the present one. */
export function CheckpointList({ studyId, cells, you, may, hindrance, onReturn }: CheckpointListProps) {
  const { data: checkpoints, error, refetch } = useCheckpoints(studyId);
  return (
    <section aria-labelledby="checkpoints-kept">
      <h2 id="checkpoints-kept" className="type-section pt-6">
        Checkpoints
      </h2>
      {may.make && <KeepThisState studyId={studyId} hindrance={hindrance} />}
      {error && !checkpoints && <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />}
      {!checkpoints && !error && (
        <p role="status" className="pt-3 text-ink2">
          Looking up the checkpoints
        </p>
      )}
      {checkpoints?.length === 0 && (
        <p className="type-small pt-3 text-ink2">
          None yet. {may.make ? "Keep one before a large change, or when something is sent off." : ""}
        </p>
      )}
      <ul className="pt-4">
        {checkpoints?.map((checkpoint) => (
          <CheckpointEntry
            key={checkpoint.id}
            studyId={studyId}
            checkpoint={checkpoint}
            cells={cells}
            you={you}
            may={may}
            hindrance={hindrance}
            onReturn={onReturn}
          />
        ))}
      </ul>
    </section>
  );
}

function KeepThisState({ studyId, hindrance }: { studyId: string; hindrance?: string }) {
  const [open, setOpen] = useState(false);
  const make = useMakeCheckpoint(studyId);
  if (!open) {
    return (
      <p className="pt-3">
        <Button onClick={() => setOpen(true)}>Keep the study as it stands</Button>
      </p>
    );
  }
  return (
    <CheckpointForm
      action={make.isPending ? "Keeping" : "Keep it"}
      pending={make.isPending || hindrance !== undefined}
      fault={hindrance ?? (make.error ? sentenceOf(make.error) : undefined)}
      onSubmit={(words) => make.mutate(words, { onSuccess: () => setOpen(false) })}
      onLeave={() => setOpen(false)}
    />
  );
}
