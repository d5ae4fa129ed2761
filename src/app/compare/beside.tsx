import { type ReactNode, useId } from "react";
import { SideMark } from "./side-mark.tsx";

interface SectionProps {
  readonly title: string;
  readonly said?: ReactNode;
  /** Whether all of it stands across both pages. */
  readonly wide?: boolean;
  readonly children: ReactNode;
}

/** A section of the comparison: its heading on the left page, what is said of both on the right. */
export function BesideSection({ title, said, wide = false, children }: SectionProps) {
  const id = useId();
  return (
    <section aria-labelledby={id} className="beside-section">
      <div className={`beside-title ${wide ? "bg-recto" : ""}`}>
        <h2 id={id} className="type-section">
          {title}
        </h2>
        {said && <div className="type-small text-ink2">{said}</div>}
      </div>
      {children}
    </section>
  );
}

export interface BesideLine {
  readonly key: string;
  readonly head: ReactNode;
  readonly left: ReactNode;
  readonly right: ReactNode;
  /** Whether the two say the same; then neither is set forth. */
  readonly isSame?: boolean;
}

/** Lines of which each says something of the left system and of the right one. */
export function BesideLines({ lines, names }: { lines: readonly BesideLine[]; names: readonly [string, string] }) {
  return (
    <dl className="beside-lines">
      {lines.map(({ key, head, left, right, isSame }) => (
        <div key={key} className={`beside-line ${isSame ? "text-ink2" : ""}`}>
          <dt>{head}</dt>
          <dd className="beside-left">
            <Whose side="left" name={names[0]} />
            <div className="min-w-0">{left}</div>
          </dd>
          <dd className="beside-right">
            <Whose side="right" name={names[1]} />
            <div className="min-w-0">{right}</div>
          </dd>
        </div>
      ))}
    </dl>
  );
}

/** Whose value follows: on one column to be seen, on two pages to be heard. */
function Whose({ side, name }: { side: "left" | "right"; name: string }) {
  return (
    <span className="beside-whose type-small text-ink2">
      <SideMark side={side} />
      {name}
    </span>
  );
}

/** What stands across both pages. */
export function BesideWide({ children }: { children: ReactNode }) {
  return <div className="beside-wide">{children}</div>;
}
