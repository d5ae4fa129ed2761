import type { ReactNode } from "react";

interface TableScrollerProps {
  readonly label: string;
  readonly className?: string;
  readonly children: ReactNode;
}

/** What may be wider than its place scrolls within it, by keyboard too. A group and no landmark: a page has many. */
export function TableScroller({ label, className = "", children }: TableScrollerProps) {
  return (
    // biome-ignore lint/a11y/useSemanticElements: a fieldset groups controls, and this holds a table
    <div
      role="group"
      aria-label={label}
      // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls sideways must be reachable by keyboard
      tabIndex={0}
      className={`relative overflow-x-auto ${className}`}
    >
      {children}
    </div>
  );
}
