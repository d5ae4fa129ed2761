import type { PlacedStop } from "../../components/thread.tsx";
import type { Standing } from "./standing.ts";

/** The cells as stops of the thread, where their names stand on the page. */
export function stopsOf(standings: readonly Standing[], y: ReadonlyMap<string, number>): PlacedStop[] {
  const idOf = new Map<string, string>();
  for (const { cell } of standings) if (!idOf.has(cell.name)) idOf.set(cell.name, cell.id);
  return standings.flatMap(({ cell, state, reads }) => {
    const place = y.get(cell.id);
    if (place === undefined) return [];
    return [{ id: cell.id, name: cell.name, state, reads: reads.flatMap((name) => idOf.get(name) ?? []), y: place }];
  });
}
