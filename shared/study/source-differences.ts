/** A run of text that stayed, was struck, or is new. */
export interface TextPiece {
  readonly kind: "same" | "struck" | "new";
  readonly text: string;
}

/** A line of a source as it became: in pieces. */
export type DifferingLine = readonly TextPiece[];

/** Beyond this many pairs of lines the middle of the two texts is told as struck and new, whole. */
const MOST_PAIRS = 1_000_000;

/**
 * Two texts as one, line by line: what stayed, and beside it what was struck and what is new. A changed line keeps the words
 * it begins and ends with.
 */
export function sourceDifferences(before: string, after: string): DifferingLine[] {
  const [old, fresh] = [linesOf(before), linesOf(after)];
  let start = 0;
  while (start < Math.min(old.length, fresh.length) && old[start] === fresh[start]) start += 1;
  let end = 0;
  const most = Math.min(old.length, fresh.length) - start;
  while (end < most && old[old.length - 1 - end] === fresh[fresh.length - 1 - end]) end += 1;
  return [
    ...old.slice(0, start).map(stayed),
    ...between(old.slice(start, old.length - end), fresh.slice(start, fresh.length - end)),
    ...old.slice(old.length - end).map(stayed),
  ];
}

const linesOf = (text: string) => (text === "" ? [] : text.replace(/\n$/, "").split("\n"));
const stayed = (text: string): DifferingLine => [{ kind: "same", text }];

/** By the longest common run of lines. */
function between(old: readonly string[], fresh: readonly string[]): DifferingLine[] {
  if (old.length * fresh.length > MOST_PAIRS) return changed(old, fresh);
  const width = fresh.length + 1;
  const common = new Uint32Array((old.length + 1) * width);
  for (let i = old.length - 1; i >= 0; i--) {
    for (let j = fresh.length - 1; j >= 0; j--) {
      common[i * width + j] =
        old[i] === fresh[j]
          ? common[(i + 1) * width + j + 1] + 1
          : Math.max(common[(i + 1) * width + j], common[i * width + j + 1]);
    }
  }
  const lines: DifferingLine[] = [];
  let [i, j, fromI, fromJ] = [0, 0, 0, 0];
  const flush = () => lines.push(...changed(old.slice(fromI, i), fresh.slice(fromJ, j)));
  while (i < old.length && j < fresh.length) {
    if (old[i] === fresh[j]) {
      flush();
      lines.push(stayed(old[i]));
      [i, j] = [i + 1, j + 1];
      [fromI, fromJ] = [i, j];
    } else if (common[(i + 1) * width + j] >= common[i * width + j + 1]) i += 1;
    else j += 1;
  }
  [i, j] = [old.length, fresh.length];
  flush();
  return lines;
}

/** Struck lines beside new ones, pair by pair. */
function changed(old: readonly string[], fresh: readonly string[]): DifferingLine[] {
  return Array.from({ length: Math.max(old.length, fresh.length) }, (_, i) => changedLine(old[i], fresh[i]));
}

function changedLine(old: string | undefined, fresh: string | undefined): DifferingLine {
  if (old === undefined) return [{ kind: "new", text: fresh ?? "" }];
  if (fresh === undefined) return [{ kind: "struck", text: old }];
  const [a, b] = [wordsOf(old), wordsOf(fresh)];
  let start = 0;
  while (start < Math.min(a.length, b.length) && a[start] === b[start]) start += 1;
  let end = 0;
  const most = Math.min(a.length, b.length) - start;
  while (end < most && a[a.length - 1 - end] === b[b.length - 1 - end]) end += 1;
  const pieces: TextPiece[] = [
    { kind: "same", text: a.slice(0, start).join("") },
    { kind: "struck", text: a.slice(start, a.length - end).join("") },
    { kind: "new", text: b.slice(start, b.length - end).join("") },
    { kind: "same", text: a.slice(a.length - end).join("") },
  ];
  return pieces.filter(({ text }) => text !== "");
}

/** Words, and what stands between them. A word may hold - and _ and ., as columns and forms do. */
const wordsOf = (line: string) => line.match(/[\p{L}\p{N}_.-]+|\s+|[^\p{L}\p{N}_.\-\s]/gu) ?? [];
