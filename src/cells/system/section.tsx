import { type ReactNode, useState } from "react";
import type { Written } from "../form/written.ts";

/** What every part of the system's form is given. */
export interface PartProps {
  readonly written: Written;
  readonly readOnly: boolean;
}

interface SectionProps extends PartProps {
  readonly title: string;
  /** The keys it writes: it opens when one of them comes to be written. */
  readonly keys: readonly string[];
  readonly children: ReactNode;
}

/** Part of a form that few cells need: folded away until it is asked for, or says something. */
export function Section({ title, keys, written, readOnly, children }: SectionProps) {
  const said = keys.filter((key) => written.value(key) !== undefined);
  const says = said.length > 0;
  const [open, setOpen] = useState(says);
  const [before, setBefore] = useState(says);
  // Emptying its last field leaves it open: nobody wants it to shut on what they are filling in.
  if (says !== before) {
    setBefore(says);
    if (says) setOpen(true);
  }
  if (readOnly && !says) return null;
  return (
    <details
      open={open}
      onToggle={(event) => setOpen(event.currentTarget.open)}
      className="mt-1 border-rule border-t pt-1"
    >
      <summary className="min-h-6 cursor-pointer py-1 text-[0.875rem]/[1.25rem] text-ink2 hover:text-ink max-[599px]:min-h-11 max-[599px]:py-3">
        {title}
        {says && !open && <span className="text-ink">: {said.join(", ")}</span>}
      </summary>
      <div className="pb-2">{children}</div>
    </details>
  );
}
