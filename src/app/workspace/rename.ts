import { CELL_KINDS, type CellKind } from "../../../shared/schemas/cell.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { setKey } from "../../../shared/study/edit.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { renameQuoted } from "../../../shared/study/quotations.ts";
import { LIKE, REFERENCES } from "../../../shared/study/vocabulary.ts";

/** The sources of the cells that name a cell, with its new name in the place of the old: what reads it goes on reading it. */
export function sourcesAfterRenaming(from: string, to: string, cells: readonly CellSource[]): Map<string, string> {
  const changed = new Map<string, string>();
  for (const cell of cells) {
    if (!(CELL_KINDS as readonly string[]).includes(cell.kind)) continue;
    const kind = cell.kind as CellKind;
    const { written } = parseCell(kind, cell.source);
    const keys = [...Object.keys(REFERENCES[kind]), ...(kind === "system" ? [LIKE] : [])];
    const source =
      kind === "text"
        ? renameQuoted(cell.source, from, to)
        : keys.filter((key) => written[key] === from).reduce((text, key) => setKey(text, [key], to), cell.source);
    if (source !== cell.source) changed.set(cell.id, source);
  }
  return changed;
}
