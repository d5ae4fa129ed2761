import { useState } from "react";
import { Dialog } from "../../components/dialog.tsx";
import { CopyList } from "./copy-list.tsx";
import { type Sealable, SealForm } from "./seal-form.tsx";
import { SealedLink } from "./sealed-link.tsx";

interface RefereeCopiesDialogProps {
  readonly studyId: string;
  readonly matrices: readonly Sealable[];
  readonly onClose: () => void;
}

/** Seals a copy for a referee, tells its link once, and revokes. */
export default function RefereeCopiesDialog({ onClose, ...contents }: RefereeCopiesDialogProps) {
  return (
    <Dialog
      onClose={onClose}
      title="Referee copies"
      lede="A sealed copy holds the matrix, its checks, the specification, the coefficients and the row accounting. It holds no rows."
    >
      <Contents {...contents} />
    </Dialog>
  );
}

function Contents({ studyId, matrices }: Pick<RefereeCopiesDialogProps, "studyId" | "matrices">) {
  const [sealed, setSealed] = useState<{ token: string; cellName: string }>();
  return (
    <>
      {sealed ? (
        <SealedLink {...sealed} onAnother={() => setSealed(undefined)} />
      ) : (
        <SealForm
          studyId={studyId}
          matrices={matrices}
          onSealed={(token, cellName) => setSealed({ token, cellName })}
        />
      )}
      <CopyList studyId={studyId} />
    </>
  );
}
