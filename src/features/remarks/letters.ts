import type { Remark } from "../../../shared/schemas/remarks.ts";

/** a to z, then aa, ab, … */
export function letterAt(place: number): string {
  const last = String.fromCharCode(97 + (place % 26));
  return place < 26 ? last : letterAt(Math.floor(place / 26) - 1) + last;
}

/** Letters of a cell's open remarks by their ids: those anchored to a place first, then the others, the oldest first. */
export function lettersOf(open: readonly Remark[]): ReadonlyMap<string, string> {
  const anchored = open.filter(({ anchor }) => anchor !== undefined);
  const others = open.filter(({ anchor }) => anchor === undefined);
  return new Map([...anchored, ...others].map(({ id }, place) => [id, letterAt(place)]));
}

/** What an anchor names, as a sentence has it: "Symmetry", "the row Log size", "the key estimator". */
export function anchorInWords(anchor: string): string {
  const [, kind, name] = /^(\w+) (.+)$/u.exec(anchor) ?? [];
  return kind === "row" || kind === "key" ? `the ${kind} ${name}` : (name ?? anchor);
}
