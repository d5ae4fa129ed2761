/** Where in a source the caret stands, as far as completion needs to know. */
export interface WhereInYaml {
  /** The keys above the caret, outermost first: ["goods", "grains"]. */
  readonly path: readonly string[];
  /** The key whose value is being written; undefined while a key is. */
  readonly key: string | undefined;
  /** Where the word under the caret begins. */
  readonly from: number;
  /** Keys already given beside the caret. */
  readonly given: readonly string[];
}

const KEY = /^(\s*)("[^"]*"|'[^']*'|[^\s#:[\]{},][^:#[\]{},]*?)\s*:(?:\s|$)/;
const unquoted = (key: string) => key.replace(/^(["'])(.*)\1$/, "$2");
const indentOf = (line: string) => /^ */.exec(line)?.[0].length ?? 0;

/**
 * Reads the lines before the caret, and the open brackets of its own line: enough for sources, which are block maps
 * with short flow lists and maps.
 */
export function whereInYaml(text: string, caret: number): WhereInYaml {
  const start = text.lastIndexOf("\n", caret - 1) + 1;
  const line = text.slice(start, caret);
  const own = KEY.exec(line);
  const inFlow = openFlow(line);
  const from = start + wordStart(line, inFlow !== undefined);
  const above = keysAbove(text.slice(0, start), own ? own[1].length : indentOf(line));
  const all = text.split("\n").map((one) => KEY.exec(one));
  if (inFlow?.bracket === "{") {
    const outer = own ? [...above, unquoted(own[2])] : above;
    return { path: outer, key: inFlow.key, from, given: inFlow.given };
  }
  if (own) return { path: above, key: unquoted(own[2]), from, given: [] };
  const indent = indentOf(line);
  const given = all.flatMap((match) => (match && match[1].length === indent ? [unquoted(match[2])] : []));
  return { path: above, key: undefined, from, given };
}

function wordStart(line: string, inFlow: boolean): number {
  if (inFlow) return line.length - (/[^\s,:[\]{}][^,:[\]{}]*$/.exec(line)?.[0].length ?? 0);
  const value = /:\s+([^\s].*)?$/.exec(line);
  if (value) return line.length - (value[1]?.length ?? 0);
  return indentOf(line);
}

/** The innermost bracket still open on the line: its sign, the key being valued in it, the keys given in it. */
function openFlow(line: string): { bracket: string; key: string | undefined; given: string[] } | undefined {
  const open: number[] = [];
  for (let i = 0; i < line.length; i += 1) {
    if (line[i] === "[" || line[i] === "{") open.push(i);
    if (line[i] === "]" || line[i] === "}") open.pop();
  }
  const at = open.at(-1);
  if (at === undefined) return undefined;
  const members = line.slice(at + 1).split(",");
  const keyOf = (member: string) => /^\s*([^:]+?)\s*:\s/.exec(`${member} `)?.[1];
  return {
    bracket: line[at],
    key: keyOf(members.at(-1) ?? ""),
    given: members.slice(0, -1).flatMap((member) => keyOf(member) ?? []),
  };
}

/** The chain of keys of smaller and smaller indent that lead to a line. */
function keysAbove(before: string, indent: number): string[] {
  const path: string[] = [];
  let least = indent;
  for (const line of before.split("\n").toReversed()) {
    const match = KEY.exec(line);
    if (!match || match[1].length >= least) continue;
    least = match[1].length;
    path.unshift(unquoted(match[2]));
    if (least === 0) break;
  }
  return path;
}
