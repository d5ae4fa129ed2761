import { Link } from "react-router-dom";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { StateFigure } from "../../components/state-shape.tsx";
import { pages } from "../../lib/paths.ts";
import type { Standing } from "./standing.ts";

interface ReadByThreadProps {
  readonly studyId: string;
  readonly standing: Standing;
  readonly cells: readonly CellSource[];
}

/** The thread beside an opened cell: its own dot, and the names it leads to. */
export function ReadByThread({ studyId, standing, cells }: ReadByThreadProps) {
  const { readBy, reads, state } = standing;
  const link = (name: string) => {
    const cell = cells.find((one) => one.name === name);
    return (
      <li key={name}>
        {cell ? (
          <Link className="reference inline-flex min-h-6 items-center" to={pages.cell(studyId, cell.id)}>
            {name}
          </Link>
        ) : (
          name
        )}
      </li>
    );
  };
  return (
    <nav aria-label="What reads what" className="opened-thread type-small text-ink2">
      <svg
        aria-hidden="true"
        viewBox="-60 0 60 120"
        width="60"
        height="120"
        className="absolute top-0 left-[calc(var(--thread)-60px)]"
        fill="none"
      >
        <path d="M-18 36H0" stroke="var(--ink)" strokeWidth="1.15" />
        {reads.length > 0 && <path d="M-43 0V14C-43 30 -38 36 -18 36" stroke="var(--ink2)" strokeWidth="1.15" />}
        {readBy.length > 0 && <path d="M-18 36C-44 36 -56 38 -56 74V120" stroke="var(--ink2)" strokeWidth="1.15" />}
        <g transform="translate(-23.5 30.5)">
          <StateFigure state={state} />
        </g>
      </svg>
      {reads.length > 0 && (
        <>
          <p>reads</p>
          <ul>{reads.map(link)}</ul>
        </>
      )}
      {readBy.length > 0 && (
        <>
          <p className={`whitespace-nowrap ${reads.length > 0 ? "pt-3" : ""}`}>read by</p>
          <ul>{readBy.map(link)}</ul>
        </>
      )}
    </nav>
  );
}
