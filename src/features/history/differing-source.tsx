import { Fragment, useState } from "react";
import { type DifferingLine, sourceDifferences } from "../../../shared/study/source-differences.ts";
import { counted } from "../../../shared/study/words.ts";
import { Word } from "../../components/button.tsx";

/** Lines that stayed are shown this far around what changed. */
const AROUND = 2;

interface DifferingSourceProps {
  readonly label: string;
  readonly before: string;
  readonly after: string;
}

/** A source as it became: the old struck out, the new beside it. */
export function DifferingSource({ label, before, after }: DifferingSourceProps) {
  const [whole, setWhole] = useState(false);
  const lines = sourceDifferences(before, after);
  const shown = whole ? lines.map((line) => ({ line })) : folded(lines);
  return (
    <figure className="m-0 pt-2" aria-label={label}>
      <pre className="past-source type-source">
        {shown.map((part, place) => (
          // Lines are told apart by nothing but their place.
          <Fragment key={place}>
            {"line" in part ? <Line line={part.line} /> : <em>{`… ${counted(part.folded, "line")} as before\n`}</em>}
          </Fragment>
        ))}
        {lines.length === 0 && <em>empty</em>}
      </pre>
      {(whole || shown.length < lines.length) && (
        <Word quiet className="type-small mt-1" onClick={() => setWhole(!whole)}>
          {whole ? "What changed only" : "The whole source"}
        </Word>
      )}
    </figure>
  );
}

function Line({ line }: { line: DifferingLine }) {
  return (
    <>
      {line.map(({ kind, text }, place) =>
        kind === "same" ? text : kind === "struck" ? <del key={place}>{text}</del> : <ins key={place}>{text}</ins>,
      )}
      {"\n"}
    </>
  );
}

type Part = { readonly line: DifferingLine } | { readonly folded: number };

/** Long runs of lines that stayed become a count. */
function folded(lines: readonly DifferingLine[]): Part[] {
  const isChanged = (line: DifferingLine | undefined) => line?.some(({ kind }) => kind !== "same") === true;
  const near = (place: number) => lines.slice(Math.max(0, place - AROUND), place + AROUND + 1).some(isChanged);
  const parts: Part[] = [];
  lines.forEach((line, place) => {
    const last = parts.at(-1);
    if (near(place)) parts.push({ line });
    else if (last && "folded" in last) parts[parts.length - 1] = { folded: last.folded + 1 };
    else parts.push({ folded: 1 });
  });
  return parts.flatMap((part, place) =>
    "folded" in part && part.folded === 1 ? [{ line: lines[lineAt(parts, place)] }] : [part],
  );
}

function lineAt(parts: readonly Part[], place: number): number {
  return parts.slice(0, place).reduce((sum, part) => sum + ("folded" in part ? part.folded : 1), 0);
}
