import { generateKeyBetween } from "fractional-indexing";
import * as Y from "yjs";
import type { CellSource } from "../../shared/study/cell-source.ts";

/** The document's only root. */
export const CELLS = "cells";

/** The cells in the order they stand in; an entry that is no cell is left out. */
export function readCells(doc: Y.Doc): CellSource[] {
  const ids = [...doc.getMap(CELLS).keys()];
  return ids.flatMap((id) => readCell(doc, id) ?? []).sort(inOrder);
}

export function readCell(doc: Y.Doc, id: string): CellSource | undefined {
  const cell = doc.getMap(CELLS).get(id);
  if (!(cell instanceof Y.Map)) return undefined;
  const source = cell.get("source");
  return {
    id,
    name: word(cell, "name"),
    kind: word(cell, "kind"),
    order: word(cell, "order"),
    source: source instanceof Y.Text ? source.toString() : "",
  };
}

function word(cell: Y.Map<unknown>, key: string): string {
  const value = cell.get(key);
  return typeof value === "string" ? value : "";
}

function inOrder(a: CellSource, b: CellSource): number {
  if (a.order !== b.order) return a.order < b.order ? -1 : 1;
  return a.id < b.id ? -1 : 1;
}

/** Adds a cell after the last one; the id is the caller's, so that a program may make the same study twice. */
export function addCell(doc: Y.Doc, cell: Pick<CellSource, "id" | "name" | "kind" | "source">): void {
  const last = readCells(doc).at(-1);
  const entry = new Y.Map<unknown>();
  entry.set("name", cell.name);
  entry.set("kind", cell.kind);
  entry.set("order", generateKeyBetween(last?.order || null, null));
  entry.set("source", new Y.Text(cell.source));
  doc.getMap(CELLS).set(cell.id, entry);
}
