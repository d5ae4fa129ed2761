/** A stretch of a text. */
export interface Span {
  readonly from: number;
  readonly to: number;
}

/** Stretches of Markdown in which braces are not quotations. */
export interface ProseSpans {
  /** Code, between backticks or fences. */
  readonly code: readonly Span[];
  /** Mathematics, between dollar signs. */
  readonly mathematics: readonly Span[];
}

const FENCE = /^ {0,3}(`{3,}|~{3,}|\${2,})/;

/**
 * Code and mathematics of a Markdown text, found line by line and run by run as CommonMark 0.31 (4.5, 6.1) and its
 * extension for mathematics close them. Enough to know where a quotation may stand; what is drawn is read in full.
 */
export function proseSpans(text: string): ProseSpans {
  const code: Span[] = [];
  const mathematics: Span[] = [];
  let fence: { readonly mark: string; readonly from: number } | undefined;
  let paragraph = 0;
  const close = (to: number) => {
    inline(text, paragraph, to, code, mathematics);
    paragraph = to;
  };
  for (let from = 0; from < text.length; ) {
    const end = text.indexOf("\n", from);
    const to = end < 0 ? text.length : end + 1;
    const line = text.slice(from, to);
    const mark = FENCE.exec(line)?.[1];
    if (fence) {
      const closes = mark?.[0] === fence.mark[0] && mark.length >= fence.mark.length && line.trim() === mark;
      if (closes) {
        (mark[0] === "$" ? mathematics : code).push({ from: fence.from, to });
        fence = undefined;
      }
      paragraph = to;
    } else if (mark && opens(line, mark)) {
      close(from);
      fence = { mark, from };
      paragraph = to;
    } else if (line.trim() === "") close(to);
    from = to;
  }
  if (fence) (fence.mark[0] === "$" ? mathematics : code).push({ from: fence.from, to: text.length });
  else close(text.length);
  return { code, mathematics };
}

/** A run of backticks or dollars that comes again on its line is inline; a fence stands before at most a word. */
function opens(line: string, mark: string): boolean {
  return mark[0] === "~" || !line.trim().slice(mark.length).includes(mark[0]);
}

/**
 * Runs of backticks and of dollars within one paragraph, each closed by the next run of its length. A backslash takes
 * from a run that would open its first sign; within code and mathematics it is a sign like any other.
 */
function inline(text: string, from: number, to: number, code: Span[], mathematics: Span[]): void {
  const runs = [...text.slice(from, to).matchAll(/`+|\$+/g)].map(({ 0: run, index }) => ({ run, at: from + index }));
  const places = new Map<string, number[]>();
  for (const [place, { run }] of runs.entries()) {
    const known = places.get(run);
    if (known) known.push(place);
    else places.set(run, [place]);
  }
  // How far each list of places has been read, so that a text of runs takes a time in proportion to its length.
  const read = new Map<string, number>();
  for (let place = 0; place < runs.length; place++) {
    const skipped = isEscaped(text, runs[place].at, from) ? 1 : 0;
    const run = runs[place].run.slice(skipped);
    const list = places.get(run) ?? [];
    let next = read.get(run) ?? 0;
    while (next < list.length && list[next] <= place) next++;
    read.set(run, next);
    if (run === "" || next >= list.length) continue;
    const { at } = runs[list[next]];
    (run[0] === "$" ? mathematics : code).push({ from: runs[place].at + skipped, to: at + run.length });
    place = list[next];
  }
}

/** Whether an odd number of backslashes stands before a place. */
function isEscaped(text: string, at: number, from: number): boolean {
  let before = at;
  while (before > from && text[before - 1] === "\\") before--;
  return (at - before) % 2 === 1;
}
