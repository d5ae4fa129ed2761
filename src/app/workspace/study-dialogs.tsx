import { useNavigate } from "react-router-dom";
import { Button } from "../../components/button.tsx";
import { Dialog } from "../../components/dialog.tsx";
import { Fault } from "../../components/field.tsx";
import { PeopleDialog } from "../../features/people/people-dialog.tsx";
import { RefereeCopiesDialog } from "../../features/referee-copies/referee-copies-dialog.tsx";
import { useDeleteStudy } from "../../features/studies/api/delete-study.ts";
import { UploadsDialog } from "../../features/uploads/uploads-dialog.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { pages } from "../../lib/paths.ts";
import { SettingsDialog } from "../settings-dialog.tsx";
import type { OpenStudy } from "./open-study.ts";
import type { Standing } from "./standing.ts";
import type { StudyDialog } from "./study-bar.tsx";

interface StudyDialogsProps extends OpenStudy {
  readonly standings: readonly Standing[];
  readonly open: StudyDialog | undefined;
  readonly onClose: () => void;
}

/** What is laid over the study's page. */
export function StudyDialogs({ study, me, readOnly, standings, open, onClose }: StudyDialogsProps) {
  const navigate = useNavigate();
  const matrices = standings
    .filter(({ kind, fingerprint }) => kind === "slutsky" && fingerprint !== undefined)
    .map(({ cell }) => ({ cellId: cell.id, name: cell.name }));
  return (
    <>
      <PeopleDialog
        studyId={study.id}
        you={me.id}
        isOwner={study.role === "owner"}
        open={open === "people"}
        onClose={onClose}
        onLeft={() => void navigate(pages.studies)}
      />
      <UploadsDialog studyId={study.id} open={open === "uploads"} onClose={onClose} readOnly={readOnly} />
      <RefereeCopiesDialog studyId={study.id} matrices={matrices} open={open === "referee copies"} onClose={onClose} />
      <SettingsDialog open={open === "settings"} onClose={onClose} />
      <DeleteStudyDialog study={study} open={open === "delete"} onClose={onClose} />
    </>
  );
}

function DeleteStudyDialog({ study, open, onClose }: Pick<StudyDialogsProps, "study" | "onClose"> & { open: boolean }) {
  const navigate = useNavigate();
  const remove = useDeleteStudy();
  const gone = () => remove.mutate(study.id, { onSuccess: () => void navigate(pages.studies) });
  return (
    <Dialog
      open={open}
      onClose={onClose}
      title="Delete the study"
      lede={`${study.title} goes with its cells, uploads, findings and referee copies, for everyone in it. There is no way back.`}
    >
      {remove.isError && <Fault>{sentenceOf(remove.error)}</Fault>}
      <div className="flex gap-4">
        <Button filled onClick={onClose}>
          Keep it
        </Button>
        <Button disabled={remove.isPending} onClick={gone}>
          Delete {study.title}
        </Button>
      </div>
    </Dialog>
  );
}
