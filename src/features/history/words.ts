import type { CellDifference } from "../../../shared/study/cell-differences.ts";
import { clockTime, dayInWords } from "../../lib/dates.ts";

interface Writer {
  readonly id: string;
  readonly name?: string;
}

/** "You", "Tomas Adeyemi", "You and Tomas Adeyemi"; the program where nobody wrote. */
export function writersInWords(people: readonly Writer[], you: string): string {
  if (people.length === 0) return "The program";
  const names = people.map(({ id, name }) => (id === you ? "you" : (name ?? "someone no longer here")));
  const words = names.length < 2 ? names[0] : `${names.slice(0, -1).join(", ")} and ${names.at(-1)}`;
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** What was done, in parts that follow one another; a cell's name stands between `before` and `after`. */
export interface Told {
  readonly before: string;
  readonly after: string;
}

/** "added **linear**", "renamed **base** from first", "in **linear**: form changed from la-aids to aids". */
export function differenceInWords(difference: CellDifference | undefined): Told {
  if (difference === undefined) return { before: "tried something in", after: "and left it as it was" };
  const { whole, renamedFrom, moved, source } = difference;
  if (whole) return { before: whole, after: "" };
  const how = [renamedFrom && `renamed from ${renamedFrom}`, moved && "moved", source].filter(Boolean);
  if (how.length === 1 && moved) return { before: "moved", after: "" };
  if (how.length === 1 && renamedFrom) return { before: "renamed", after: `, which was ${renamedFrom}` };
  return { before: "in", after: `: ${how.join("; ")}` };
}

/** "16:40", or "16:40 to 16:52". */
export function hoursInWords(from: string, to: string): string {
  const [start, end] = [clockTime(from), clockTime(to)];
  return start === end ? start : `${start} to ${end}`;
}

/** Neighbours of one day together. */
export function byDay<T extends { readonly at: string }>(entries: readonly T[]): { day: string; entries: T[] }[] {
  const days: { day: string; entries: T[] }[] = [];
  for (const entry of entries) {
    const day = dayInWords(entry.at);
    if (days.at(-1)?.day === day) days.at(-1)?.entries.push(entry);
    else days.push({ day, entries: [entry] });
  }
  return days;
}
