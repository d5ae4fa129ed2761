import type { RefereeCopy } from "../../../shared/schemas/referee-copy.ts";
import { Button } from "../../components/button.tsx";

/** The moment of a seal: "9 March 2032 at 16:20". */
export function sealedInWords(instant: string): string {
  const date = new Date(instant);
  const day = date.toLocaleDateString("en-GB", { day: "numeric", month: "long", year: "numeric" });
  return `${day} at ${date.toLocaleTimeString("en-GB", { hour: "2-digit", minute: "2-digit" })}`;
}

interface NewerCopyProps {
  readonly newer: NonNullable<RefereeCopy["newer"]>;
  readonly onOpen: () => void;
}

/** That the authors have sealed another copy in this one's place. This one stays as it was. */
export function NewerCopy({ newer, onOpen }: NewerCopyProps) {
  return (
    <aside aria-label="A newer copy" className="flex flex-wrap items-center gap-x-6 gap-y-2 border-stale border-y py-3">
      <p className="flex-1 basis-72">
        The authors have sealed a newer copy in this one’s place, on {sealedInWords(newer.sealedAt)}. This one stays as
        it was sealed.
      </p>
      <Button className="print:hidden" onClick={onOpen}>
        Read the newer copy
      </Button>
    </aside>
  );
}
