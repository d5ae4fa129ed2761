import type { StudyCell } from "./parse-cell.ts";
import { LIKE } from "./vocabulary.ts";

/**
 * A system cell's keys together with those it takes over from the cell it is `like`, which may be like
 * another in turn. What is written here wins, key by key; `index` goes with `form`, so a cell that
 * gives its own form takes over no index with it.
 */
export function takeOver(
  cell: StudyCell,
  byName: ReadonlyMap<string, StudyCell>,
): { written: Readonly<Record<string, unknown>>; from: string[] } {
  const from: string[] = [];
  const seen = new Set<string>([cell.id]);
  let written = { ...cell.parsed.written };
  for (let like = written[LIKE]; typeof like === "string"; ) {
    const base = byName.get(like);
    if (!base || seen.has(base.id) || base.kind !== "system") break;
    seen.add(base.id);
    from.push(base.name);
    const { [LIKE]: further, index, ...keys } = base.parsed.written;
    const givesForm = written.form !== undefined;
    written = { ...keys, ...(index !== undefined && !givesForm && { index }), ...written };
    like = further;
  }
  const { [LIKE]: _, ...own } = written;
  return { written: cell.parsed.kind === "system" ? own : cell.parsed.written, from };
}
