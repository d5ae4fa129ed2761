import { CELL_KINDS, type CellKind } from "../../../shared/schemas/cell.ts";
import { cellName } from "../../../shared/schemas/primitives.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { setKey } from "../../../shared/study/edit.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { LIKE, REFERENCES } from "../../../shared/study/vocabulary.ts";

/** Why a cell cannot be called so; undefined when it can. */
export function nameFault(name: string, cell: CellSource, cells: readonly CellSource[]): string | undefined {
  const read = cellName.safeParse(name);
  if (!read.success) {
    return name === ""
      ? "A cell needs a name, so that others can read it."
      : `${capital(read.error.issues[0].message)}.`;
  }
  const other = cells.find((one) => one.name === name && one.id !== cell.id);
  return other && `Another cell is called ${name} already.`;
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** The sources of the cells that name a cell, with its new name in the place of the old: what reads it goes on reading it. */
export function sourcesAfterRenaming(from: string, to: string, cells: readonly CellSource[]): Map<string, string> {
  const changed = new Map<string, string>();
  for (const cell of cells) {
    if (!(CELL_KINDS as readonly string[]).includes(cell.kind)) continue;
    const kind = cell.kind as CellKind;
    const { written } = parseCell(kind, cell.source);
    const keys = [...Object.keys(REFERENCES[kind]), ...(kind === "system" ? [LIKE] : [])];
    const source = keys
      .filter((key) => written[key] === from)
      .reduce((text, key) => setKey(text, [key], to), cell.source);
    if (source !== cell.source) changed.set(cell.id, source);
  }
  return changed;
}
