import { useState } from "react";
import type { Upload, UploadColumn } from "../../../shared/schemas/resources.ts";
import { Word } from "../../components/button.tsx";
import { usesOfColumns } from "./column-uses.ts";

/** So many columns are listed whole; of more, those that nothing uses are folded away. */
const LISTED = 24;

interface ColumnListProps {
  readonly upload: Upload;
  readonly source: string;
  /** Columns that systems on the cell take as demographics. */
  readonly demographics?: readonly string[];
  /** Shows the rows as they stand in the file. */
  readonly onLook?: () => void;
}

/** An upload's columns in the order of the file, each with its numbers in small and what it is used for. */
export function ColumnList({ upload, source, demographics, onLook }: ColumnListProps) {
  const [whole, setWhole] = useState(false);
  const uses = usesOfColumns(
    source,
    upload.columns.map(({ name }) => name),
    demographics,
  );
  const shown = upload.columns.filter(({ name }, place) => whole || place < LISTED || uses.has(name));
  const folded = upload.columns.length - shown.length;
  return (
    <section aria-labelledby="columns" className="mt-6">
      <div className="flex items-baseline justify-between gap-4 pb-1.5">
        <h3 id="columns" className="type-small text-ink2">
          Columns, in the order of the file
        </h3>
        <span className="type-small text-ink2">
          {uses.size} of {upload.columns.length} used
        </span>
      </div>
      {onLook && (
        <Word className="type-small mb-1.5 block" onClick={onLook}>
          Look at the rows <span className="sr-only">of {upload.name}</span>
        </Word>
      )}
      <ul className="border-rule border-b">
        {shown.map((column) => (
          <li
            key={column.name}
            className="grid grid-cols-[minmax(0,1fr)_3.25rem_minmax(0,1.1fr)] items-center gap-x-2.5 border-rule border-t py-0.5"
          >
            <span className={`type-source truncate ${uses.has(column.name) ? "" : "text-ink3"}`} title={column.name}>
              {column.name}
            </span>
            <Histogram column={column} />
            <span className={`type-small ${uses.has(column.name) ? "" : "text-ink3"}`}>
              {uses.get(column.name) ?? "not used"}
            </span>
          </li>
        ))}
      </ul>
      {folded > 0 && (
        <Word className="type-small mt-1.5" onClick={() => setWhole(true)}>
          {folded} more, not used
        </Word>
      )}
    </section>
  );
}

const HEIGHT = 13;

/** How a column's numbers lie, too small to be read off: its range and mean are beside it for those who hear it. */
function Histogram({ column: { histogram, minimum, maximum, mean } }: { column: UploadColumn }) {
  if (!histogram || histogram.length === 0) return <span />;
  const most = Math.max(...histogram, 1);
  const numbers = [minimum, maximum, mean].map((number) => Number(number?.toPrecision(4)));
  return (
    <svg
      role="img"
      aria-label={`from ${numbers[0]} to ${numbers[1]}, mean ${numbers[2]}`}
      viewBox={`0 0 ${histogram.length * 4} ${HEIGHT}`}
      width="46"
      height={HEIGHT}
      preserveAspectRatio="none"
    >
      {histogram.map((count, place) => {
        // A bin with few rows is still seen; an empty one is not.
        const height = count === 0 ? 0 : Math.max(1, (count / most) * HEIGHT);
        return (
          <rect key={place} x={place * 4 + 0.5} y={HEIGHT - height} width="3" height={height} fill="var(--ink2)" />
        );
      })}
    </svg>
  );
}
