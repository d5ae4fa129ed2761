import type { ReactNode } from "react";
import { TableScroller } from "./table-scroller.tsx";

export interface TableHead {
  readonly key: string;
  readonly content: ReactNode;
  readonly align?: "left" | "right";
  /** Read aloud in place of the content, when that is a drawing. */
  readonly label?: string;
}

export interface TableLine {
  readonly key: string;
  readonly head: ReactNode;
  readonly cells: readonly ReactNode[];
}

interface TableProps {
  /** What the table is; read aloud, and shown by the heading above it. */
  readonly caption: string;
  /** The first head stands over the row heads. */
  readonly heads: readonly TableHead[];
  readonly lines: readonly TableLine[];
  readonly className?: string;
}

const side = (align: TableHead["align"]) => (align === "left" ? "text-left" : "text-right");

function Line({ line, heads }: { line: TableLine; heads: readonly TableHead[] }) {
  return (
    <tr>
      <th scope="row" className="sticky left-0 bg-recto py-0.5 pr-4 text-left font-normal">
        {line.head}
      </th>
      {line.cells.map((cell, index) => (
        <td
          key={heads[index + 1].key}
          className={`py-0.5 pr-[0.33em] pl-4 ${heads[index + 1].align === "left" ? "min-w-36 text-left" : "whitespace-nowrap text-right"}`}
        >
          {cell}
        </td>
      ))}
    </tr>
  );
}

/** A table with rules under its heads and at its foot, nothing vertical; wide ones scroll with their first column held. */
export function Table({ caption, heads, lines, className = "" }: TableProps) {
  return (
    <TableScroller label={caption} className={className}>
      <table className="w-full border-line border-b text-[0.875rem]/[1.25rem] tabular-nums">
        <thead>
          <tr className="border-line border-b">
            {heads.map((head, index) => (
              <th
                key={head.key}
                scope="col"
                aria-label={head.label}
                className={`pb-1.5 align-bottom type-small font-normal text-ink2 ${
                  index === 0 ? "sticky left-0 bg-recto pr-4 text-left" : `pr-[0.33em] pl-4 ${side(head.align)}`
                }`}
              >
                {head.content}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {lines.map((line) => (
            <Line key={line.key} line={line} heads={heads} />
          ))}
        </tbody>
      </table>
    </TableScroller>
  );
}
