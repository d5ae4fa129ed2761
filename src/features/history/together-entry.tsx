import type { Sitting } from "../../../shared/schemas/history.ts";
import { listWords } from "../../../shared/study/words.ts";
import { hoursInWords, writersInWords } from "./words.ts";

/** Cells that were added, or removed, by the same people within this of one another are told together. */
const NEAR_MS = 60_000;

const wholeOf = ({ before, after }: Sitting) =>
  before === undefined && after !== undefined
    ? "added"
    : before !== undefined && after === undefined
      ? "removed"
      : undefined;

/** Neighbours that are told in one line, in groups; any other is a group of its own. */
export function together(sittings: readonly Sitting[]): Sitting[][] {
  const groups: Sitting[][] = [];
  for (const sitting of sittings) {
    const last = groups.at(-1);
    if (last && belongs(sitting, last[0])) last.push(sitting);
    else groups.push([sitting]);
  }
  return groups;
}

function belongs(sitting: Sitting, first: Sitting): boolean {
  const whole = wholeOf(sitting);
  return (
    whole !== undefined &&
    whole === wholeOf(first) &&
    JSON.stringify(sitting.people) === JSON.stringify(first.people) &&
    Math.abs(Date.parse(first.from) - Date.parse(sitting.from)) < NEAR_MS
  );
}

/** Several cells added or removed at once. */
export function TogetherEntry({ sittings, you }: { sittings: readonly Sitting[]; you: string }) {
  const [first] = sittings;
  const names = sittings.map(({ before, after }) => (after ?? before)?.name ?? "a cell").toReversed();
  return (
    <li className="past-entry">
      <span className="type-small text-ink3 tabular-nums">{hoursInWords(first.from, first.from)}</span>
      <p className="min-w-0">
        <b>{writersInWords(first.people, you)}</b> {wholeOf(first)} <b className="past-cell">{listWords(names)}</b>
      </p>
    </li>
  );
}
