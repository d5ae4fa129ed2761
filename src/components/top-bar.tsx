import type { ReactNode } from "react";
import { Link } from "react-router-dom";
import { Mark } from "./mark.tsx";

export interface Crumb {
  readonly to: string;
  readonly words: string;
}

interface TopBarProps {
  readonly home: string;
  readonly crumbs?: readonly Crumb[];
  /** On a narrow page the name of what is open stands for the program's. */
  readonly narrowName?: string;
  readonly children?: ReactNode;
}

/** The program's name, where one is, and at the right who is here and what can be done. */
export function TopBar({ home, crumbs = [], narrowName, children }: TopBarProps) {
  return (
    <header className="top-bar">
      <nav aria-label="Where you are" className="flex min-w-0 items-center gap-3">
        <Link
          to={home}
          aria-label="Tangency, your studies"
          className="flex min-w-0 items-center gap-3 text-ink no-underline"
        >
          <Mark size={26} />
          <span className={`font-serif font-medium text-[1.1875rem]/[1.5rem] ${narrowName ? "wide-only" : ""}`}>
            Tangency
          </span>
        </Link>
        {narrowName && <span className="narrow-only truncate font-serif text-[1.0625rem]/[1.5rem]">{narrowName}</span>}
        {crumbs.map(({ to, words }) => (
          <span key={to} className={`flex min-w-0 items-center gap-3 ${narrowName ? "wide-only" : ""}`}>
            <span aria-hidden="true" className="text-ink3">
              /
            </span>
            <Link to={to} className="truncate text-ink2 no-underline hover:text-accent hover:underline">
              {words}
            </Link>
          </span>
        ))}
      </nav>
      <div className="top-bar-right">{children}</div>
    </header>
  );
}
