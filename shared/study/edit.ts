import {
  isCollection,
  isMap,
  isScalar,
  isSeq,
  type Node,
  type Pair,
  parseDocument,
  stringify,
  type YAMLMap,
} from "yaml";
import type { KeyPath } from "./cell-source.ts";
import { nodeAt } from "./document.ts";

/** One replacement in a text: what stands from `from` to `to` gives way to `insert`. */
export interface TextEdit {
  readonly from: number;
  readonly to: number;
  readonly insert: string;
}

/** What a key may be set to: plain values, lists and maps of them. */
export type Value = string | number | boolean | readonly Value[] | { readonly [key: string]: Value };

/** Sets a key, leaving every comment, every other key and their order as they are. */
export function setKey(source: string, path: KeyPath, value: Value): string {
  return applyEdit(source, keyEdit(source, path, value));
}

/** Removes a key, and the maps that hold nothing else. */
export function removeKey(source: string, path: KeyPath): string {
  return applyEdit(source, removalEdit(source, path));
}

export function applyEdit(source: string, edit: TextEdit | undefined): string {
  return edit ? source.slice(0, edit.from) + edit.insert + source.slice(edit.to) : source;
}

/**
 * The smallest replacement that sets a key: what two people edit at once stays apart in the shared
 * text. Throws when the text cannot be read: a form edits sound sources only.
 */
export function keyEdit(source: string, path: KeyPath, value: Value): TextEdit {
  const root = readableRoot(source);
  if (path.length === 0) throw new Error("a key is needed to set a value");
  const parentPath = path.slice(0, -1);
  const parent = nodeAt(root, parentPath);
  if (isSeq(parent)) {
    const member = parent.items[Number(path.at(-1))] as Node | undefined;
    if (!member?.range) throw new Error(`the list has no member ${Number(path.at(-1)) + 1}`);
    return { from: member.range[0], to: endOf(member), insert: flowText(value) };
  }
  if (isMap(parent)) {
    const pair = pairOf(parent, String(path.at(-1)));
    return pair ? replaced(source, parent, pair, value) : added(source, parent, String(path.at(-1)), value);
  }
  if (parentPath.length > 0) return keyEdit(source, parentPath, { [String(path.at(-1))]: value });
  const start = source.length === 0 || source.endsWith("\n") ? "" : "\n";
  return {
    from: source.length,
    to: source.length,
    insert: `${start}${keyText(String(path[0]))}:${valueText(value, 0)}\n`,
  };
}

/** The replacement that removes a key; none when it is not there. */
export function removalEdit(source: string, path: KeyPath): TextEdit | undefined {
  const root = readableRoot(source);
  const parent = nodeAt(root, path.slice(0, -1));
  if (!isMap(parent)) return undefined;
  const pair = pairOf(parent, String(path.at(-1)));
  if (!pair) return undefined;
  if (parent.items.length === 1 && path.length > 1) return removalEdit(source, path.slice(0, -1));
  const from = (pair.key as Node).range?.[0] ?? 0;
  const to = endOf(pair.value as Node | null) || ((pair.key as Node).range?.[1] ?? from);
  if (!parent.flow) {
    const lineEnd = source.indexOf("\n", to);
    return { from: source.lastIndexOf("\n", from - 1) + 1, to: lineEnd < 0 ? source.length : lineEnd + 1, insert: "" };
  }
  const before = /,\s*$/.exec(source.slice(0, from));
  if (before) return { from: from - before[0].length, to, insert: "" };
  return { from, to: to + (/^\s*,\s*/.exec(source.slice(to))?.[0].length ?? 0), insert: "" };
}

function readableRoot(source: string): Node | undefined {
  const document = parseDocument(source, { version: "1.2", schema: "core", merge: false, logLevel: "error" });
  if (document.errors.length > 0) throw new Error("the text must be mended before a form can change it");
  const root = document.contents ?? undefined;
  const isEmpty = root === undefined || (isScalar(root) && root.value === null);
  if (!isEmpty && !isMap(root)) throw new Error("the text is not a set of keys");
  return isEmpty ? undefined : root;
}

function pairOf(map: YAMLMap, key: string): Pair | undefined {
  return map.items.find((pair) => isScalar(pair.key) && String(pair.key.value) === key);
}

/** Where a value ends: a block's own range runs on over the comments and blank lines after it. */
function endOf(node: Node | null | undefined): number {
  if (!node?.range) return 0;
  if (!isCollection(node) || node.flow || node.items.length === 0) return node.range[1];
  const last = node.items.at(-1) as Pair | Node;
  const inner = "key" in last ? ((last.value ?? last.key) as Node) : last;
  return endOf(inner);
}

function isBlock(node: unknown): boolean {
  return isCollection(node) && !node.flow;
}

function replaced(source: string, parent: YAMLMap, pair: Pair, value: Value): TextEdit {
  const key = pair.key as Node;
  const colon = source.indexOf(":", key.range?.[1] ?? 0) + 1;
  const old = pair.value as Node | null;
  const inFlow = Boolean(parent.flow);
  const indent = columnOf(source, key.range?.[0] ?? 0);
  const insert = inFlow ? ` ${flowText(value)}` : valueText(value, indent);
  const isEmpty = !old?.range || (isScalar(old) && old.range[0] === old.range[1]);
  if (isEmpty) return { from: colon, to: colon, insert };
  const stays = isBlock(old) === insert.startsWith("\n");
  if (stays) return { from: old.range![0], to: endOf(old), insert: insert.trimStart() };
  return { from: colon, to: endOf(old), insert };
}

function added(source: string, parent: YAMLMap, key: string, value: Value): TextEdit {
  const last = parent.items.at(-1);
  if (parent.flow) {
    const at = last ? endOf((last.value ?? last.key) as Node) : (parent.range?.[0] ?? 0) + 1;
    return { from: at, to: at, insert: `${last ? ", " : ""}${keyText(key)}: ${flowText(value)}` };
  }
  const first = parent.items[0].key as Node;
  const indent = columnOf(source, first.range?.[0] ?? 0);
  const end = endOf((last?.value ?? last?.key) as Node);
  const lineEnd = source.indexOf("\n", end);
  const line = `${" ".repeat(indent)}${keyText(key)}:${valueText(value, indent)}`;
  if (lineEnd < 0) return { from: source.length, to: source.length, insert: `\n${line}\n` };
  return { from: lineEnd, to: lineEnd, insert: `\n${line}` };
}

function columnOf(source: string, offset: number): number {
  return offset - (source.lastIndexOf("\n", offset - 1) + 1);
}

/** After the colon: on the same line, or for a map of maps one line for each, as goods are written. */
function valueText(value: Value, indent: number): string {
  const isMapOfMaps = isPlainMap(value) && Object.values(value).length > 0 && Object.values(value).every(isPlainMap);
  if (!isMapOfMaps) return ` ${flowText(value)}`;
  const margin = " ".repeat(indent + 2);
  return Object.entries(value)
    .map(([key, inner]) => `\n${margin}${keyText(key)}: ${flowText(inner)}`)
    .join("");
}

function isPlainMap(value: Value): value is { readonly [key: string]: Value } {
  return typeof value === "object" && !Array.isArray(value);
}

/** A value on one line. Within brackets or braces a text is quoted when it holds one of their signs. */
function flowText(value: Value, within = false): string {
  if (Array.isArray(value)) return `[${value.map((member) => flowText(member, true)).join(", ")}]`;
  if (isPlainMap(value)) {
    const entries = Object.entries(value).map(([key, inner]) => `${keyText(key)}: ${flowText(inner, true)}`);
    return `{${entries.join(", ")}}`;
  }
  // Text of several lines, and what no eye can see, is written with escapes.
  if (typeof value === "string" && /\p{C}|[\u2028\u2029]/u.test(value)) return JSON.stringify(value);
  if (!within) return stringify(value, STYLE).trimEnd();
  return stringify([value], STYLE).trimEnd().slice(1, -1);
}

const STYLE = {
  version: "1.2",
  schema: "core",
  collectionStyle: "flow",
  flowCollectionPadding: false,
  lineWidth: 0,
  blockQuote: false,
} as const;

/** A key, written so that it may stand anywhere. */
function keyText(key: string): string {
  return flowText(key, true);
}
