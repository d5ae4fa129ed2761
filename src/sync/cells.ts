import { generateKeyBetween } from "fractional-indexing";
import { uuidv4 } from "lib0/random";
import * as Y from "yjs";
import type { CellSource } from "../../shared/study/cell-source.ts";

export const cellsOf = (doc: Y.Doc): Y.Map<unknown> => doc.getMap("cells");

/** The cells in their order. A cell that has not changed is the same object as before. */
export function listCells(doc: Y.Doc, before: readonly CellSource[] = []): CellSource[] {
  const known = new Map(before.map((cell) => [cell.id, cell]));
  const list: CellSource[] = [];
  cellsOf(doc).forEach((entry, id) => {
    if (!(entry instanceof Y.Map)) return;
    const cell = {
      id,
      name: word(entry, "name"),
      kind: word(entry, "kind"),
      order: word(entry, "order"),
      source: sourceIn(entry)?.toString() ?? "",
    };
    const old = known.get(id);
    list.push(old !== undefined && same(old, cell) ? old : cell);
  });
  return list.sort((a, b) => (a.order === b.order ? (a.id < b.id ? -1 : 1) : a.order < b.order ? -1 : 1));
}

export function sourceOf(doc: Y.Doc, cellId: string): Y.Text | undefined {
  const entry = cellsOf(doc).get(cellId);
  return entry instanceof Y.Map ? sourceIn(entry) : undefined;
}

/** Adds a cell after the one named, or first (null), or last (undefined); returns its id. */
export function addCell(
  doc: Y.Doc,
  cell: Pick<CellSource, "name" | "kind" | "source">,
  after: string | null | undefined,
): string {
  const id = uuidv4();
  const cells = listCells(doc);
  const entry = new Y.Map<unknown>();
  entry.set("name", cell.name);
  entry.set("kind", cell.kind);
  entry.set("order", keyAfter(cells, after === undefined ? (cells.at(-1)?.id ?? null) : after));
  entry.set("source", new Y.Text(cell.source));
  cellsOf(doc).set(id, entry);
  return id;
}

export function renameCell(doc: Y.Doc, cellId: string, name: string): void {
  entryOf(doc, cellId)?.set("name", name);
}

/** Puts a cell after another, or first. */
export function moveCell(doc: Y.Doc, cellId: string, after: string | null): void {
  const others = listCells(doc).filter(({ id }) => id !== cellId);
  entryOf(doc, cellId)?.set("order", keyAfter(others, after));
}

export function removeCell(doc: Y.Doc, cellId: string): void {
  cellsOf(doc).delete(cellId);
}

/**
 * Turns the study's cells into those given: what is there is changed and not replaced, what is not there any more comes back
 * under its id, what is not among them goes.
 */
export function returnToCells(doc: Y.Doc, wanted: readonly CellSource[]): void {
  const stay = new Set(wanted.map(({ id }) => id));
  for (const id of [...cellsOf(doc).keys()]) if (!stay.has(id)) removeCell(doc, id);
  for (const cell of wanted) restoreCell(doc, cell);
}

/** Makes a cell what it was, under its id. */
export function restoreCell(doc: Y.Doc, { id, name, kind, order, source }: CellSource): void {
  if (entryOf(doc, id) === undefined) {
    const entry = new Y.Map<unknown>();
    entry.set("source", new Y.Text(source));
    cellsOf(doc).set(id, entry);
  }
  const entry = entryOf(doc, id);
  for (const [key, value] of Object.entries({ name, kind, order })) {
    if (entry?.get(key) !== value) entry?.set(key, value);
  }
  replaceSource(doc, id, source);
}

/** Turns a text into another, touching only what differs, so that others' edits elsewhere in it stay. */
export function replaceSource(doc: Y.Doc, cellId: string, next: string): void {
  const source = sourceOf(doc, cellId);
  if (source === undefined) return;
  const now = source.toString();
  let start = 0;
  while (start < Math.min(now.length, next.length) && now[start] === next[start]) start += 1;
  let end = 0;
  const most = Math.min(now.length, next.length) - start;
  while (end < most && now[now.length - 1 - end] === next[next.length - 1 - end]) end += 1;
  if (now.length > start + end) source.delete(start, now.length - start - end);
  if (next.length > start + end) source.insert(start, next.slice(start, next.length - end));
}

/** Two people may have added a cell at the same place and given it the same key; the next greater one is the neighbour. */
function keyAfter(cells: readonly CellSource[], after: string | null): string {
  const place = after === null ? -1 : cells.findIndex(({ id }) => id === after);
  const before = cells[place]?.order;
  const next = cells.slice(place + 1).find(({ order }) => before === undefined || order > before);
  return generateKeyBetween(before ?? null, next?.order ?? null);
}

function entryOf(doc: Y.Doc, cellId: string): Y.Map<unknown> | undefined {
  const entry = cellsOf(doc).get(cellId);
  return entry instanceof Y.Map ? entry : undefined;
}

function sourceIn(entry: Y.Map<unknown>): Y.Text | undefined {
  const source = entry.get("source");
  return source instanceof Y.Text ? source : undefined;
}

function word(entry: Y.Map<unknown>, key: string): string {
  const value = entry.get(key);
  return typeof value === "string" ? value : "";
}

function same(a: CellSource, b: CellSource): boolean {
  return a.name === b.name && a.kind === b.kind && a.order === b.order && a.source === b.source;
}
