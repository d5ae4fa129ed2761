import { lazy } from "react";
import { useNavigate } from "react-router-dom";
import { isSealable, type Sealable } from "../../features/referee-copies/sealable.ts";
import { pages } from "../../lib/paths.ts";
import { LaidOver } from "../laid-over.tsx";
import type { OpenStudy } from "./open-study.ts";
import type { Standing } from "./standing.ts";
import type { StudyDialog } from "./study-bar.tsx";

const PeopleDialog = lazy(() => import("../../features/people/people-dialog.tsx"));
const UploadsDialog = lazy(() => import("../../features/uploads/uploads-dialog.tsx"));
const StudyRemarks = lazy(() => import("./study-remarks.tsx"));
const RefereeCopiesDialog = lazy(() => import("../../features/referee-copies/referee-copies-dialog.tsx"));
const ReplicationDialog = lazy(() => import("../../features/replication/replication-dialog.tsx"));
const JournalDialog = lazy(() => import("../../features/journal/journal-dialog.tsx"));
const DeleteStudyDialog = lazy(() => import("../../features/studies/delete-study-dialog.tsx"));
const KeysDialog = lazy(() => import("../keys-dialog.tsx"));
const SettingsDialog = lazy(() => import("../settings-dialog.tsx"));

interface StudyDialogsProps extends OpenStudy {
  readonly standings: readonly Standing[];
  readonly open: StudyDialog | undefined;
  readonly onClose: () => void;
}

/** What is laid over the study's page; each is loaded when it is first asked for. */
export function StudyDialogs(props: StudyDialogsProps) {
  const { open, onClose } = props;
  if (open === undefined) return null;
  return (
    <LaidOver key={open} onClose={onClose}>
      <Opened {...props} open={open} />
    </LaidOver>
  );
}

function Opened({
  study,
  me,
  connection,
  readOnly,
  standings,
  open,
  onClose,
}: StudyDialogsProps & { open: StudyDialog }) {
  const navigate = useNavigate();
  const toStudies = () => void navigate(pages.studies);
  switch (open) {
    case "people":
      return (
        <PeopleDialog
          studyId={study.id}
          you={me.id}
          isOwner={study.role === "owner"}
          onClose={onClose}
          onLeft={toStudies}
        />
      );
    case "uploads":
      return <UploadsDialog studyId={study.id} onClose={onClose} readOnly={readOnly} />;
    case "remarks":
      return <StudyRemarks study={study} me={me} connection={connection} onClose={onClose} />;
    case "referee copies":
      return <RefereeCopiesDialog studyId={study.id} cells={sealable(standings)} onClose={onClose} />;
    case "replication bundle":
      return <ReplicationDialog studyId={study.id} cells={standings.map(asBundled)} onClose={onClose} />;
    case "journal":
      return <JournalDialog studyId={study.id} onClose={onClose} />;
    case "settings":
      return <SettingsDialog onClose={onClose} />;
    case "keys":
      return <KeysDialog readOnly={readOnly} onClose={onClose} />;
    case "delete":
      return <DeleteStudyDialog study={study} onClose={onClose} onDeleted={toStudies} />;
  }
}

/** Cells that are current, of the kinds that are sealed; of a text no finding is stored. */
function sealable(standings: readonly Standing[]): Sealable[] {
  return standings.flatMap(({ cell, kind, state, fingerprint }) =>
    (fingerprint !== undefined || (kind === "text" && state === "current")) && isSealable(kind)
      ? [{ cellId: cell.id, name: cell.name, kind }]
      : [],
  );
}

const asBundled = ({ cell, state }: Standing) => ({ name: cell.name, isCurrent: state === "current" });
