import type { StudySummary } from "../../../shared/schemas/resources.ts";
import { Button } from "../../components/button.tsx";
import { Dialog } from "../../components/dialog.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useDeleteStudy } from "./api/delete-study.ts";

interface DeleteStudyDialogProps {
  readonly study: Pick<StudySummary, "id" | "title">;
  readonly onClose: () => void;
  readonly onDeleted: () => void;
}

export default function DeleteStudyDialog({ study, onClose, onDeleted }: DeleteStudyDialogProps) {
  const remove = useDeleteStudy();
  return (
    <Dialog
      onClose={onClose}
      title="Delete the study"
      lede={`${study.title} goes at once for everyone in it, and links to its referee copies open nothing. For 30 days its owners find it under Deleted, among the studies, and can bring all of it back; then it is gone for good.`}
    >
      {remove.isError && <Fault>{sentenceOf(remove.error)}</Fault>}
      <div className="flex flex-wrap gap-4">
        <Button filled onClick={onClose}>
          Keep it
        </Button>
        <Button disabled={remove.isPending} onClick={() => remove.mutate(study.id, { onSuccess: onDeleted })}>
          Delete {study.title}
        </Button>
      </div>
    </Dialog>
  );
}
