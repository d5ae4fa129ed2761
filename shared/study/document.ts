import {
  type Document,
  isMap,
  isScalar,
  isSeq,
  LineCounter,
  type Node,
  parseDocument,
  visit,
  type YAMLError,
} from "yaml";
import type { Problem } from "../schemas/problem.ts";
import type { KeyPath, Place, Places } from "./cell-source.ts";
import { NOWHERE } from "./cell-source.ts";
import { remembering } from "./remembering.ts";
import { groupThousands } from "./words.ts";

/** The longest source a cell, or a study file, may have, in characters. */
export const LONGEST_SOURCE = 32_768;
export const LONGEST_STUDY_FILE = 1_048_576;

/** Every source of a large study: while one cell is typed in, the others are not read again. */
const REMEMBERED = 512 * 1024;

/** A YAML text read: its value as plain objects, and where everything stands. Never changed. */
export interface SourceDocument {
  readonly value: unknown;
  readonly problems: readonly Problem[];
  readonly places: Places;
  /** The root node; absent when the text could not be read. */
  readonly root?: Node;
  readonly lines: LineCounter;
}

/**
 * Reads YAML 1.2 (core schema) as a source may use it: one document, no anchors, aliases or tags,
 * no key twice. Every refusal names its place.
 */
export function readDocument(text: string, longest = LONGEST_SOURCE): SourceDocument {
  return longest === LONGEST_SOURCE ? readSource(text) : read(text, longest);
}

const readSource = remembering((text) => read(text, LONGEST_SOURCE), REMEMBERED);

function read(text: string, longest: number): SourceDocument {
  const lines = new LineCounter();
  const refused = (sentence: string): SourceDocument => ({
    value: undefined,
    problems: [{ sentence, place: { line: 1, column: 1, from: 0, to: 0 } }],
    places: NOWHERE,
    lines,
  });
  if (text.length > longest) {
    return refused(
      `The text has ${groupThousands(text.length)} characters; at most ${groupThousands(longest)} are read.`,
    );
  }
  let document: Document;
  try {
    document = parseDocument(text, {
      version: "1.2",
      schema: "core",
      merge: false,
      // Looked for below, in a time that grows with the keys and not with their square.
      uniqueKeys: false,
      lineCounter: lines,
      prettyErrors: false,
      logLevel: "error",
    });
  } catch (error) {
    if (error instanceof RangeError) return refused("The text is nested too deeply to be read.");
    throw error;
  }
  const problems = [...document.errors, ...document.warnings].map((error) => syntaxProblem(error, text, lines));
  problems.push(...forbidden(document, text, lines));
  const root = document.contents ?? undefined;
  if (problems.length > 0) return { value: undefined, problems: firstByPlace(problems), places: NOWHERE, root, lines };
  return { value: document.toJS({ maxAliasCount: 0 }), problems, places: placesIn(root, lines), root, lines };
}

export function placeAt(lines: LineCounter, from: number, to: number): Place {
  const { line, col } = lines.linePos(from);
  return { line: Math.max(1, line), column: Math.max(1, col), from, to };
}

/** The places of everything below `root`. */
export function placesIn(root: Node | undefined, lines: LineCounter): Places {
  const placeOf = (node: unknown): Place | undefined => {
    const range = (node as Node | null)?.range;
    return range ? placeAt(lines, range[0], range[1]) : undefined;
  };
  const pairAt = (path: KeyPath) => {
    const parent = nodeAt(root, path.slice(0, -1));
    if (!isMap(parent)) return undefined;
    return parent.items.find((pair) => isScalar(pair.key) && String(pair.key.value) === String(path.at(-1)));
  };
  return {
    key: (path) => (path.length === 0 ? undefined : placeOf(pairAt(path)?.key)),
    value: (path) => placeOf(nodeAt(root, path)),
  };
}

/** The node under a path of keys and positions. */
export function nodeAt(root: unknown, path: KeyPath): Node | undefined {
  let node = root;
  for (const step of path) {
    if (isMap(node)) {
      node = node.items.find((pair) => isScalar(pair.key) && String(pair.key.value) === String(step))?.value;
    } else if (isSeq(node)) node = node.items[Number(step)];
    else return undefined;
  }
  return (node ?? undefined) as Node | undefined;
}

function forbidden(document: Document, text: string, lines: LineCounter): Problem[] {
  const problems: Problem[] = [];
  const refuse = (node: Node, sentence: string, mark?: string) => {
    const [start, end] = node.range ?? [0, 0];
    // Anchors and tags stand before the node they mark, outside its range.
    const from = mark === undefined ? start : Math.max(0, text.lastIndexOf(mark, start));
    const to = mark === undefined ? end : from + (text.slice(from).match(/^\S+/)?.[0].length ?? 1);
    problems.push({ sentence, place: placeAt(lines, from, to) });
  };
  visit(document, {
    Alias: (_, node) => refuse(node, `*${node.source} repeats an anchored value; write the value itself.`),
    Node: (_, node) => {
      if ("anchor" in node && node.anchor) {
        refuse(node, `Anchors (&${node.anchor}) are not used here; remove it.`, `&${node.anchor}`);
      }
      if (node.tag) refuse(node, "Tags (words after !) are not used here; remove it.", "!");
    },
    Map: (_, map) => {
      const seen = new Set<string>();
      for (const { key } of map.items) {
        if (!isScalar(key)) continue;
        const word = String(key.value);
        if (seen.has(word)) refuse(key, `${word.slice(0, 60)} is given twice; keep one.`);
        seen.add(word);
      }
    },
    Pair: (_, pair) => {
      const key = pair.key as Node | null;
      if (key && !isScalar(key)) refuse(key, "A key is one word or a few, never a list or a map.");
      // Records set it aside without a word, and what stands below it would be gone.
      else if (key?.value === "__proto__") refuse(key, "__proto__ names nothing here; take another name.");
    },
  });
  return problems;
}

const SYNTAX: Partial<Record<YAMLError["code"], string>> = {
  BAD_ALIAS: "Aliases are not used here; write the value itself.",
  BAD_DQ_ESCAPE: "This escape means nothing inside double quotes.",
  BAD_INDENT: "This line is indented differently from its neighbours.",
  BAD_SCALAR_START: "A value cannot begin with this character; put the value in quotes.",
  BLOCK_AS_IMPLICIT_KEY: "Two keys stand on one line; give each a line of its own.",
  BLOCK_IN_FLOW: "Inside braces or brackets keys are parted by commas, not by lines.",
  MISSING_CHAR: "Something is missing here: a colon, a comma, a quote or a closing bracket.",
  MULTILINE_IMPLICIT_KEY: "A key stands on one line, with a colon and a space after it.",
  MULTIPLE_DOCS: "One text holds one set of keys; remove the line ---.",
  TAB_AS_INDENT: "Lines are indented with spaces, never with tabs.",
  TAG_RESOLVE_FAILED: "Tags (words after !) are not used here; remove it.",
  UNEXPECTED_TOKEN: "This does not fit here: a key, a colon and a space, then its value.",
};

function syntaxProblem(error: YAMLError, text: string, lines: LineCounter): Problem {
  const from = Math.min(error.pos[0], text.length);
  const to = Math.min(Math.max(error.pos[1], from), text.length);
  const place = placeAt(lines, from, to);
  const unclosed = /must be sufficiently indented and end with a (.)/.exec(error.message);
  if (unclosed) return { sentence: `A closing ${unclosed[1]} is missing before this place.`, place };
  return { sentence: SYNTAX[error.code] ?? "This cannot be read as YAML here.", place };
}

/** One mistake often trips the reader several times: the first at each place is kept, in order of place. */
function firstByPlace(problems: Problem[]): Problem[] {
  const seen = new Set<number>();
  return problems
    .toSorted((a, b) => (a.place?.from ?? 0) - (b.place?.from ?? 0))
    .filter((problem) => {
      const line = problem.place?.line ?? 0;
      return seen.has(line) ? false : Boolean(seen.add(line));
    })
    .slice(0, 20);
}
