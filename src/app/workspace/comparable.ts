import { pages } from "../../lib/paths.ts";
import type { CellActions } from "./cell-menu.tsx";
import type { Standing } from "./standing.ts";

/** The other systems a system can be set beside, the nearest above it first; nothing for other kinds. */
export function comparable(
  studyId: string,
  { cell, kind }: Standing,
  standings: readonly Standing[],
  go: (to: string) => void,
): CellActions["compareWith"] {
  if (kind !== "system") return undefined;
  const systems = standings.filter((one) => one.kind === "system");
  const own = systems.findIndex((one) => one.cell.id === cell.id);
  const others = [...systems.slice(0, own).toReversed(), ...systems.slice(own + 1)];
  return others.map(({ cell: other }) => ({
    name: other.name,
    go: () => go(pages.compare(studyId, cell.id, other.id)),
  }));
}
