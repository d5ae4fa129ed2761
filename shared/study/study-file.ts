import { isMap, isScalar, type LineCounter, type Node, type Pair, type YAMLMap } from "yaml";
import { CELL_KINDS } from "../schemas/cell.ts";
import { cellName } from "../schemas/primitives.ts";
import type { Problem } from "../schemas/problem.ts";
import { LONGEST_STUDY_FILE, nodeAt, placeAt, placesIn, readDocument } from "./document.ts";
import { removeKey, setKey, type Value } from "./edit.ts";
import { nearestWord } from "./nearest-word.ts";
import { spread } from "./order.ts";
import { type ParsedCell, parseValue, type StudyCell } from "./parse-cell.ts";
import { placesInBlock } from "./parse-text.ts";

/** A study as one file: `study`, its title, and `cells`, each with its kind among its keys. */
export interface StudyFile {
  readonly title: string;
  readonly lede: string;
  /** In the order of the file; places are those of the file. */
  readonly cells: StudyCell[];
  /** What is wrong with the file outside its cells. */
  readonly problems: Problem[];
}

const KEYS = ["study", "lede", "cells"];

/** Reads a study file; cells may be resolved with `resolveParsed(file.cells, uploads)`. */
export function parseStudyFile(text: string): StudyFile {
  const { value, problems: unreadable, root, lines } = readDocument(text, LONGEST_STUDY_FILE);
  const problems = [...unreadable];
  const empty: StudyFile = { title: "", lede: "", cells: [], problems };
  if (problems.length > 0) return empty;
  if (!isMap(root)) {
    return {
      ...empty,
      problems: [{ sentence: "A study file has the keys study and cells.", place: placeAt(lines, 0, 0) }],
    };
  }
  const places = placesIn(root, lines);
  const told = (key: string, sentence: string, nearest?: string) => {
    const place = (nearest ? places.key([key]) : (places.value([key]) ?? places.key([key]))) ?? placeAt(lines, 0, 0);
    problems.push({ sentence, key: [key], place, ...(nearest && { nearest }) });
  };
  const keys = value as Record<string, unknown>;
  for (const key of Object.keys(keys).filter((key) => !KEYS.includes(key))) {
    const nearest = nearestWord(
      key,
      KEYS.filter((known) => !Object.hasOwn(keys, known)),
    );
    told(
      key,
      `${key} is not a key of a study file${nearest ? `: the nearest is ${nearest}` : `, which takes ${KEYS.join(", ")}`}.`,
      nearest,
    );
  }
  const [title, lede] = [keys.study ?? "", keys.lede ?? ""];
  if (typeof title !== "string") told("study", "study needs a text, the study's title.");
  if (typeof lede !== "string") told("lede", "lede needs a text, what the study asks in a sentence.");
  const cells = nodeAt(root, ["cells"]);
  if (!isMap(cells) || cells.items.length === 0) {
    told("cells", "A study file needs cells: a name for each, and its keys below it.");
    return { ...empty, problems };
  }
  return { title: String(title), lede: String(lede), cells: cellsOf(text, cells, lines, problems), problems };
}

function cellsOf(text: string, cells: YAMLMap, lines: LineCounter, problems: Problem[]): StudyCell[] {
  const orders = spread(cells.items.length);
  return cells.items.map((pair, i) => {
    const key = pair.key as Node & { value: unknown };
    const name = String(key.value);
    const [from, to] = key.range ?? [0, 0];
    const named = cellName.safeParse(name);
    if (!named.success)
      problems.push({
        sentence: `${name}: ${named.error.issues[0].message}.`,
        key: ["cells", name],
        place: placeAt(lines, from, to),
      });
    const value = toPlain(pair.value);
    const kind = kindOf(value, name, problems, placeAt(lines, from, to));
    const places = placesIn((pair.value as Node | null) ?? undefined, lines);
    const parsed = parseValue(kind, value, places);
    const common = { id: name, name, kind, order: orders[i] };
    if (kind === "text") return { ...common, ...proseOf(text, pair.value, parsed, lines) };
    return { ...common, source: cellText(text, cells, i, value), parsed };
  });
}

/** Of a text cell the workspace holds the text alone. */
function proseOf(file: string, node: unknown, parsed: ParsedCell, lines: LineCounter) {
  const { text } = parsed.written;
  const placeInText = placesInBlock(file, nodeAt(node, ["text"]), lines);
  return { source: typeof text === "string" ? text : "", parsed: { ...parsed, placeInText } };
}

function toPlain(node: unknown): unknown {
  return isMap(node) || isScalar(node) ? node.toJSON() : null;
}

function kindOf(value: unknown, name: string, problems: Problem[], place: Problem["place"]): string {
  const kind = (value as { kind?: unknown } | null)?.kind;
  if (typeof kind === "string") return kind;
  problems.push({
    sentence: `${name} needs kind: one of ${CELL_KINDS.join(", ")}.`,
    key: ["cells", name, "kind"],
    place,
  });
  return CELL_KINDS[0];
}

/** A cell's part of the file as its source stands in the workspace: moved to the left, without its kind. */
function cellText(text: string, cells: YAMLMap, position: number, value: unknown): string {
  const pair = cells.items[position];
  const body = pair.value;
  if (!isMap(body) || body.flow || cells.flow) return rewritten(value);
  const start = text.indexOf("\n", (pair.key as Node).range?.[1] ?? 0) + 1;
  const next = cells.items[position + 1] as Pair | undefined;
  const end = next ? text.lastIndexOf("\n", (next.key as Node).range?.[0] ?? 0) + 1 : blockEnd(text, body);
  const first = (body.items[0].key as Node).range?.[0] ?? start;
  const margin = first - (text.lastIndexOf("\n", first - 1) + 1);
  const moved = text
    .slice(start, end)
    .split("\n")
    .map((line) => (line.slice(0, margin).trim() === "" ? line.slice(margin) : line.trimStart()))
    .join("\n");
  return `${removeKey(moved, ["kind"]).trimEnd()}\n`;
}

function blockEnd(text: string, node: Node): number {
  return node.range?.[2] ?? text.length;
}

function rewritten(value: unknown): string {
  const { kind: _, ...keys } = (value ?? {}) as Record<string, Value>;
  return Object.entries(keys).reduce((source, [key, inner]) => setKey(source, [key], inner), "");
}
