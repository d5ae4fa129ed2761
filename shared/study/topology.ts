/** What a graph of names shows: an order in which each comes after all it reads, and the cycles that spoil it. */
export interface Topology {
  /** Every name that is in no cycle and depends on none, sources first; ties in the order given. */
  readonly order: string[];
  /** Each cycle as the names along it, beginning with the one given first. */
  readonly cycles: string[][];
  /** Names that are in a cycle or depend on one. */
  readonly stuck: ReadonlySet<string>;
}

/** Topological order (Kahn 1962), kept as near to the given order as it can be. */
export function sortByReading(reads: ReadonlyMap<string, readonly string[]>): Topology {
  const names = [...reads.keys()];
  const done = new Set<string>();
  const order: string[] = [];
  const isReady = (name: string) => (reads.get(name) ?? []).every((other) => done.has(other) || !reads.has(other));
  for (let progress = true; progress; ) {
    progress = false;
    for (const name of names) {
      if (done.has(name) || !isReady(name)) continue;
      done.add(name);
      order.push(name);
      progress = true;
    }
  }
  const stuck = new Set(names.filter((name) => !done.has(name)));
  return { order, cycles: cyclesAmong(stuck, reads), stuck };
}

/** Walks from each stuck name along what it reads; the first name met twice closes a cycle. */
function cyclesAmong(stuck: ReadonlySet<string>, reads: ReadonlyMap<string, readonly string[]>): string[][] {
  const cycles: string[][] = [];
  const seen = new Set<string>();
  for (const start of stuck) {
    const path: string[] = [];
    for (let at: string | undefined = start; at !== undefined && !seen.has(at); ) {
      seen.add(at);
      path.push(at);
      const next: string | undefined = (reads.get(at) ?? []).find((name) => stuck.has(name));
      if (next !== undefined && path.includes(next)) cycles.push(path.slice(path.indexOf(next)));
      at = next;
    }
  }
  return cycles;
}
