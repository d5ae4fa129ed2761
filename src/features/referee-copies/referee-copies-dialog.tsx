import { useState } from "react";
import { Dialog } from "../../components/dialog.tsx";
import { CopyList } from "./copy-list.tsx";
import { SealForm } from "./seal-form.tsx";
import type { Sealable } from "./sealable.ts";
import { SealedLink, type Told } from "./sealed-link.tsx";

interface RefereeCopiesDialogProps {
  readonly studyId: string;
  readonly cells: readonly Sealable[];
  readonly onClose: () => void;
}

/** Seals a copy for a referee, tells its link once, and says what has become of the others. */
export default function RefereeCopiesDialog({ onClose, ...contents }: RefereeCopiesDialogProps) {
  return (
    <Dialog
      onClose={onClose}
      title="Referee copies"
      lede="A sealed copy holds the matrix, its checks, the specification, the coefficients and the row accounting, and what you seal with it. It holds no rows."
    >
      <Contents {...contents} />
    </Dialog>
  );
}

function Contents({ studyId, cells }: Pick<RefereeCopiesDialogProps, "studyId" | "cells">) {
  const [told, setTold] = useState<Told>();
  return (
    <>
      {told ? (
        <SealedLink key={told.token} {...told} onAnother={() => setTold(undefined)} />
      ) : (
        <SealForm studyId={studyId} cells={cells} onSealed={setTold} />
      )}
      <CopyList studyId={studyId} onTold={setTold} />
    </>
  );
}
