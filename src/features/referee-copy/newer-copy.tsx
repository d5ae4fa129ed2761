import type { RefereeCopy } from "../../../shared/schemas/referee-copy.ts";
import { Button } from "../../components/button.tsx";
import { fullMoment } from "../../lib/dates.ts";

interface NewerCopyProps {
  readonly newer: NonNullable<RefereeCopy["newer"]>;
  readonly onOpen: () => void;
}

/** That the authors have sealed another copy in this one's place. This one stays as it was. */
export function NewerCopy({ newer, onOpen }: NewerCopyProps) {
  return (
    <aside aria-label="A newer copy" className="flex flex-wrap items-center gap-x-6 gap-y-2 border-stale border-y py-3">
      <p className="flex-1 basis-72">
        The authors have sealed a newer copy in this one’s place, on {fullMoment(newer.sealedAt)}. This one stays as it
        was sealed.
      </p>
      <Button className="print:hidden" onClick={onOpen}>
        Read the newer copy
      </Button>
    </aside>
  );
}
