import type { Problem } from "../../../shared/schemas/problem.ts";
import { Button } from "../../components/button.tsx";
import type { Standing } from "./standing.ts";

interface ProblemListProps {
  readonly standing: Standing;
  /** Absent for those who only read. */
  readonly onMend?: (nextSource: string) => void;
}

/** The source with the nearest valid word in the place of what is written there. */
export function mended(source: string, { place, nearest }: Problem): string | undefined {
  if (!place || nearest === undefined || place.to > source.length) return undefined;
  return source.slice(0, place.from) + nearest + source.slice(place.to);
}

const MOST = 6;

/** What is wrong, each in a sentence, with what would do as a button. */
export function ProblemList({ standing: { cell, problems, because }, onMend }: ProblemListProps) {
  if (problems.length === 0) return <p className="type-finding">{because}</p>;
  return (
    <ul className="grid gap-3">
      {problems.slice(0, MOST).map((problem, index) => {
        const next = mended(cell.source, problem);
        return (
          <li key={index}>
            <p className="type-finding max-w-[40rem]">{problem.sentence}</p>
            {onMend && next !== undefined && (
              <Button className="mt-2" onClick={() => onMend(next)}>
                Use {problem.nearest}
              </Button>
            )}
          </li>
        );
      })}
      {problems.length > MOST && <li className="text-ink2">and {problems.length - MOST} more</li>}
    </ul>
  );
}
