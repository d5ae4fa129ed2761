import { CELL_KINDS, type CellKind } from "../../../shared/schemas/cell.ts";
import type { CellSource, KeyPath } from "../../../shared/study/cell-source.ts";
import { setKey } from "../../../shared/study/edit.ts";
import { renameKey } from "../../../shared/study/edit-keys.ts";
import { takeOver } from "../../../shared/study/like.ts";
import { parseCell, type StudyCell } from "../../../shared/study/parse-cell.ts";
import { renameQuotedGood } from "../../../shared/study/quoted-goods.ts";

/** Maps whose keys are goods, by the kind of cell they stand in. */
const BY_GOOD: { readonly [K in CellKind]?: readonly KeyPath[] } = {
  elasticities: [["at", "prices"]],
  slutsky: [["at", "prices"]],
  "price change": [["prices"], ["at", "prices"]],
  figure: [["at", "prices"]],
};

/**
 * The sources of the cells that name a good of a data cell, the data cell's own among them, with the good's new name in
 * the place of the old. Only what rests on that data cell is looked at: goods of others may have the same names.
 */
export function sourcesAfterRenamingGood(
  data: CellSource,
  from: string,
  to: string,
  cells: readonly CellSource[],
): Map<string, string> {
  const read = cells.map((cell): StudyCell => ({ ...cell, parsed: parseCell(cell.kind, cell.source) }));
  const kinds = kindsOnData(data.name, read);
  const changed = new Map([[data.id, renameKey(data.source, ["goods", from], to)]]);
  for (const { id, name, kind, source, parsed } of read) {
    if (id === data.id) continue;
    const next =
      kind === "text"
        ? renameQuotedGood(source, (cell) => kinds.get(cell), from, to)
        : kinds.has(name)
          ? renamedInKeys(source, parsed.written, kind as CellKind, from, to)
          : source;
    const followed =
      kinds.get(String(parsed.written.within)) === "system" ? renamedGroup(next, parsed, from, to) : next;
    if (followed !== source) changed.set(id, followed);
  }
  return changed;
}

/** `as` of an elasticities cell is a good of the data beneath its broader system. */
function renamedGroup(source: string, { kind, written }: StudyCell["parsed"], from: string, to: string): string {
  return kind === "elasticities" && written.as === from ? setKey(source, ["as"], to) : source;
}

/** By name, the kinds of the data cell and of every cell that rests on it, directly or by a system. */
function kindsOnData(data: string, cells: readonly StudyCell[]): Map<string, CellKind> {
  const byName = new Map(cells.map((cell) => [cell.name, cell]));
  const kinds = new Map<string, CellKind>([[data, "data"]]);
  const isOn = (cell: StudyCell): boolean => {
    const { written } = takeOver(cell, byName);
    if (written.data === data) return true;
    const change = typeof written["price change"] === "string" ? byName.get(written["price change"]) : undefined;
    if (change?.kind === "price change") return isOn(change);
    const system = typeof written.system === "string" ? byName.get(written.system) : undefined;
    return system?.kind === "system" && takeOver(system, byName).written.data === data;
  };
  for (const cell of cells) {
    const kind = CELL_KINDS.find((one) => one === cell.kind);
    if (kind && kind !== "data" && kind !== "text" && isOn(cell)) kinds.set(cell.name, kind);
  }
  return kinds;
}

function renamedInKeys(
  source: string,
  written: Readonly<Record<string, unknown>>,
  kind: CellKind,
  from: string,
  to: string,
): string {
  if (kind === "system") return written.dropped === from ? setKey(source, ["dropped"], to) : source;
  const listed = kind === "figure" ? renamedInList(source, written.goods, from, to) : source;
  return (BY_GOOD[kind] ?? []).reduce((text, path) => {
    const byGood = at(written, path);
    // Where the new name stands already, two keys of one name would make the text unreadable.
    const isThere = byGood !== undefined && Object.hasOwn(byGood, from) && !Object.hasOwn(byGood, to);
    return isThere ? renameKey(text, [...path, from], to) : text;
  }, listed);
}

/** A good in the list of those a figure shows. */
function renamedInList(source: string, goods: unknown, from: string, to: string): string {
  const place = Array.isArray(goods) ? goods.indexOf(from) : -1;
  return place < 0 || (goods as unknown[]).includes(to) ? source : setKey(source, ["goods", place], to);
}

function at(written: Readonly<Record<string, unknown>>, path: KeyPath): object | undefined {
  const found = path.reduce<unknown>(
    (value, key) => (typeof value === "object" && value !== null ? (value as Record<string, unknown>)[key] : undefined),
    written,
  );
  return typeof found === "object" && found !== null ? found : undefined;
}
