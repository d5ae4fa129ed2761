import { isMap, isScalar, type Node, type Pair, parseDocument, type YAMLMap } from "yaml";
import type { KeyPath } from "./cell-source.ts";
import { nodeAt } from "./document.ts";
import { setKey } from "./edit.ts";

const STYLE = { version: "1.2", schema: "core", merge: false, logLevel: "error", keepSourceTokens: true } as const;

function mapAt(source: string, path: KeyPath): YAMLMap | undefined {
  const document = parseDocument(source, STYLE);
  if (document.errors.length > 0) throw new Error("the text must be mended before a form can change it");
  const map = nodeAt(document.contents ?? undefined, path);
  return isMap(map) ? map : undefined;
}

const keyOf = (pair: Pair): string => (isScalar(pair.key) ? String(pair.key.value) : "");

/** Gives a key of a map another name; its value, its place and every comment stay. */
export function renameKey(source: string, path: KeyPath, name: string): string {
  const pair = mapAt(source, path.slice(0, -1))?.items.find((one) => keyOf(one) === String(path.at(-1)));
  const range = (pair?.key as Node | undefined)?.range;
  if (!range) return source;
  // Written as the first key of a map of its own, a name stands as it must be quoted.
  const written = setKey("", [name], 1).split(/:\s1\n$/)[0];
  return source.slice(0, range[0]) + written + source.slice(range[1]);
}

/**
 * Moves a key of a map to another place among its neighbours. In a map of a line for each key the lines move, with the
 * comments above them; within braces what stands between the commas does.
 */
export function moveKey(source: string, path: KeyPath, to: number): string {
  const map = mapAt(source, path.slice(0, -1));
  const from = map?.items.findIndex((pair) => keyOf(pair) === String(path.at(-1))) ?? -1;
  if (!map || from < 0 || to < 0 || to >= map.items.length || from === to) return source;
  const parts = map.flow ? partsInBraces(source, map) : partsByLine(source, map);
  const texts = parts.map(([start, end]) => source.slice(start, end));
  const [moved] = texts.splice(from, 1);
  texts.splice(to, 0, moved);
  // What stands between the parts, line ends and commas, stays where it is.
  let written = source.slice(0, parts[0][0]);
  texts.forEach((text, at) => {
    const next = parts[at + 1];
    written += text + (next ? source.slice(parts[at][1], next[0]) : "");
  });
  return written + source.slice(parts[parts.length - 1][1]);
}

type Part = readonly [start: number, end: number];

function partsInBraces(source: string, map: YAMLMap): Part[] {
  return map.items.map((pair) => {
    const start = (pair.key as Node).range?.[0] ?? 0;
    const end = (pair.value as Node | null)?.range?.[1] ?? (pair.key as Node).range?.[1] ?? start;
    return [start, start + source.slice(start, end).trimEnd().length] as const;
  });
}

/** From the comments above a key to the end of the last line of its value. */
function partsByLine(source: string, map: YAMLMap): Part[] {
  const lineStart = (offset: number) => source.lastIndexOf("\n", offset - 1) + 1;
  const starts = map.items.map((pair) => {
    let start = lineStart((pair.key as Node).range?.[0] ?? 0);
    while (start > 0) {
      const above = lineStart(start - 1);
      if (!/^\s*#/.test(source.slice(above, start - 1))) break;
      start = above;
    }
    return start;
  });
  return starts.map((start, at) => {
    const pair = map.items[at];
    const value = (pair.value as Node | null)?.range?.[1] ?? (pair.key as Node).range?.[1] ?? start;
    const trimmed = start + source.slice(start, value).trimEnd().length;
    const line = source.indexOf("\n", trimmed);
    const end = line < 0 ? source.length : line;
    const next = starts[at + 1];
    return [start, next === undefined ? end : Math.min(end, next - 1)] as const;
  });
}
