import {
  type Completion,
  type CompletionContext,
  type CompletionResult,
  startCompletion,
} from "@codemirror/autocomplete";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { readDocument } from "../../../shared/study/document.ts";
import { keyEdit } from "../../../shared/study/edit.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { latestUploads, uploadRead } from "../../../shared/study/uploads.ts";
import { type KeyWord, VOCABULARY } from "../../../shared/study/vocabulary.ts";
import { type EditorSubject, editorSubject } from "./editor-subject.ts";
import { type WhereInYaml, whereInYaml } from "./where-in-yaml.ts";

/** Offers keys of the kind, the words a key may have, names of cells and uploads, columns and goods. */
export function completeSource(context: CompletionContext): CompletionResult | null {
  const subject = context.state.facet(editorSubject);
  if (!subject.kind) return null;
  const text = context.state.doc.toString();
  const where = whereInYaml(text, context.pos);
  if (where.from === context.pos && !context.explicit && where.key === undefined) return null;
  const options = where.key === undefined ? keys(subject, where) : values(subject, where, readable(text, context.pos));
  return options.length === 0 ? null : { from: where.from, options, validFor: /^[^,:[\]{}#\n]*$/ };
}

/** The text as far as it can be read: a line still being written is left out where it spoils the rest. */
function readable(text: string, caret: number): string {
  if (readDocument(text).problems.length === 0) return text;
  const start = text.lastIndexOf("\n", caret - 1) + 1;
  const end = text.indexOf("\n", caret);
  return text.slice(0, start) + (end < 0 ? "" : text.slice(end + 1));
}

/** The key words that may stand where the caret is. */
function wordsAt({ kind }: EditorSubject, path: readonly string[]): readonly KeyWord[] {
  if (!kind) return [];
  if (path.length === 0) return VOCABULARY[kind];
  const outer = VOCABULARY[kind].find(({ key }) => key === path[0]);
  if (!outer) return [];
  // Under a name of one's own (a good) stand the keys it takes; directly under `goods` stand such names.
  const depth = outer.named ? 2 : 1;
  return path.length === depth ? outer.keys : [];
}

function keys(subject: EditorSubject, where: WhereInYaml): Completion[] {
  return wordsAt(subject, where.path)
    .filter(({ key }) => !where.given.includes(key))
    .map(({ key, says, needed }) => ({
      label: key,
      apply: `${key}: `,
      detail: says,
      type: "key",
      boost: needed ? 2 : 0,
    }));
}

function values(subject: EditorSubject, where: WhereInYaml, text: string): Completion[] {
  const word = wordsAt(subject, where.path).find(({ key }) => key === where.key);
  if (!word) return [];
  const plain = word.values.map((value) => ({ label: value, type: "word" }));
  const maps = word.named || word.list ? [] : word.keys.filter(({ needed }) => needed).map(openedMap);
  return [...plain, ...maps, ...named(subject, word, text)];
}

/** A value that is a map, begun at a key it needs: "{cluster: }" with the caret before the brace. */
function openedMap({ key, says }: KeyWord): Completion {
  return {
    label: `{${key}: }`,
    detail: says,
    type: "key",
    apply: (view, _completion, from, to) => {
      const insert = `{${key}: }`;
      const caret = { anchor: from + insert.length - 1 };
      view.dispatch({ changes: { from, to, insert }, selection: caret, userEvent: "input.complete" });
      startCompletion(view);
    },
  };
}

function named({ cellsNow, uploads, name, kind }: EditorSubject, word: KeyWord, text: string): Completion[] {
  const cells = cellsNow();
  switch (word.names) {
    case undefined:
      return [];
    case "upload":
      return latestUploads(uploads).map((upload) => ({ label: upload.name, detail: `${upload.rows} rows` }));
    case "column":
    case "numeric column":
      return columnsOf({ cells, uploads, kind }, text)
        .filter(({ type }) => word.names === "column" || type === "number")
        .map(({ name: label, type }) => ({ label, apply: written(label), detail: type }));
    case "good":
      return goodsOf({ cells, kind, isOfBroader: word.key === "as" }, text).map((good) => ({
        label: good,
        apply: written(good),
      }));
    default:
      return cells
        .filter((cell) => cell.kind === word.names && cell.name !== name)
        .map((cell) => ({ label: cell.name, detail: `${cell.kind} cell`, type: "cell" }));
  }
}

/** A name as YAML writes it: in quotes where it must be. */
const written = (name: string) => keyEdit("", ["k"], [name]).insert.trim().slice("k: [".length, -1);

interface Rest extends Pick<EditorSubject, "uploads" | "kind"> {
  readonly cells: readonly CellSource[];
  /** The data asked for are those beneath the broader system that the cell names. */
  readonly isOfBroader?: boolean;
}

/** The keys of the data cell the text is, or reads. */
function dataOf(
  { cells, kind, isOfBroader }: Pick<Rest, "cells" | "kind" | "isOfBroader">,
  text: string,
): Readonly<Record<string, unknown>> {
  if (kind === "data") return parseCell("data", text).written;
  const { system, data, within } = parseCell(kind ?? "", text).written;
  const reads = kind === "system" ? data : isOfBroader ? within : (system ?? data);
  const read = cells.find(({ name }) => name === reads);
  if (!read) return {};
  return read.kind === "data" ? parseCell("data", read.source).written : dataOf({ cells, kind: "system" }, read.source);
}

function columnsOf({ cells, uploads, kind }: Rest, text: string): { name: string; type: string }[] {
  const data = dataOf({ cells, kind }, text);
  const upload = uploadRead(uploads, data);
  const derived = Object.keys((data.derive as object | null | undefined) ?? {});
  return [...derived.map((name) => ({ name, type: "number" })), ...(upload?.columns ?? [])];
}

function goodsOf(rest: Pick<Rest, "cells" | "kind" | "isOfBroader">, text: string): string[] {
  return Object.keys((dataOf(rest, text).goods as object | null | undefined) ?? {});
}
