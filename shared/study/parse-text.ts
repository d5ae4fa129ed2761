import { isScalar, type LineCounter } from "yaml";
import type { Problem } from "../schemas/problem.ts";
import type { TextSpecification } from "../schemas/text.ts";
import type { Place } from "./cell-source.ts";
import { NOWHERE } from "./cell-source.ts";
import { LONGEST_SOURCE, placeAt } from "./document.ts";
import { groupThousands } from "./words.ts";

/** Where a stretch of a cell's text stands in the source that holds it. */
export type PlaceInText = (from: number, to: number) => Place | undefined;

/** A text cell's source, which is the text itself: there is nothing in it that could not be read. */
export function parseText(source: string) {
  const common = {
    kind: "text" as const,
    places: NOWHERE,
    written: { text: source },
    placeInText: placesWithin(source),
  };
  if (source.length <= LONGEST_SOURCE) {
    const specification: TextSpecification = { kind: "text", text: source };
    return { ...common, specification, problems: [] as Problem[] };
  }
  const sentence = `The text has ${groupThousands(source.length)} characters; at most ${groupThousands(LONGEST_SOURCE)} are read.`;
  const problem: Problem = { sentence, place: { line: 1, column: 1, from: 0, to: 0 } };
  return { ...common, written: {}, problems: [problem] };
}

/** Lines are counted once somebody asks. */
function placesWithin(source: string): PlaceInText {
  let starts: number[] | undefined;
  return (from, to) => {
    starts ??= [0, ...[...source.matchAll(/\n/g)].map(({ index }) => index + 1)];
    let line = starts.length;
    while (line > 1 && starts[line - 1] > from) line--;
    return { line, column: from - starts[line - 1] + 1, from, to };
  };
}

/**
 * Places in the file of what stands in a text held by a key: line by line in a literal block, `text: |`; elsewhere,
 * where lines are folded or signs escaped, the whole value.
 */
export function placesInBlock(file: string, node: unknown, lines: LineCounter): PlaceInText {
  if (!isScalar(node) || !node.range) return () => undefined;
  const [start, end] = node.range;
  const whole = () => placeAt(lines, start, end);
  const header = /^\|[+-]?[ \t]*(?:#.*)?\n/.exec(file.slice(start));
  if (node.type !== "BLOCK_LITERAL" || typeof node.value !== "string" || !header) return whole;
  const first = start + header[0].length;
  const margin = /^(?:[ \t]*\n)*( *)/.exec(file.slice(first))?.[1].length ?? 0;
  const offsets = lineOffsets(node.value, file, first, margin);
  return (from, to) => {
    const [at, until] = [offsets(from), offsets(to)];
    return at === undefined || until === undefined ? whole() : placeAt(lines, at, until);
  };
}

/** From an offset in the text of a block to the offset in the file: each line stands `margin` further to the right. */
function lineOffsets(text: string, file: string, first: number, margin: number) {
  const starts = [first];
  for (const { index } of file.slice(first, first + text.length * (margin + 2) + margin).matchAll(/\n/g)) {
    starts.push(first + index + 1);
  }
  return (offset: number): number | undefined => {
    const before = text.slice(0, offset);
    const line = before.split("\n").length - 1;
    const start = starts[line];
    return start === undefined ? undefined : start + margin + (offset - (before.lastIndexOf("\n") + 1));
  };
}
