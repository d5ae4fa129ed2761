import type { ReactNode } from "react";
import type { Written } from "../form/written.ts";

/** What every part of the system's form is given. */
export interface PartProps {
  readonly written: Written;
  readonly readOnly: boolean;
}

interface SectionProps extends PartProps {
  readonly title: string;
  /** The keys it writes: with one of them written it stands open. */
  readonly keys: readonly string[];
  readonly children: ReactNode;
}

/** Part of a form that few cells need: folded away until it is asked for, or says something. */
export function Section({ title, keys, written, readOnly, children }: SectionProps) {
  const says = keys.some((key) => written.value(key) !== undefined);
  if (readOnly && !says) return null;
  return (
    <details open={says} className="border-line border-t py-1">
      <summary className="min-h-6 cursor-pointer py-1 text-[0.875rem]/[1.25rem] text-ink2 hover:text-ink max-[599px]:min-h-11">
        {title}
      </summary>
      {children}
    </details>
  );
}
