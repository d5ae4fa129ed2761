/** One figure is one line of JSON, with its reference measured in the same run. */
export function say(figure: Record<string, unknown>): void {
  process.stdout.write(`${JSON.stringify(figure)}\n`);
}

export interface Timing<T> {
  /** By the clock, milliseconds. */
  readonly ms: number;
  /** Of the processor: what is left when other work on the machine is taken out. */
  readonly processorMs: number;
  readonly result: T;
}

/** The fastest of some runs, by the processor's time. */
export function fastest<T>(runs: number, work: () => T): Timing<T> {
  let best: Timing<T> | undefined;
  for (let run = 0; run < runs; run++) {
    const begun = performance.now();
    const before = process.cpuUsage();
    const result = work();
    const { user, system } = process.cpuUsage(before);
    const processorMs = Math.round((user + system) / 100) / 10;
    if (best === undefined || processorMs < best.processorMs) {
      best = { ms: Math.round((performance.now() - begun) * 10) / 10, processorMs, result };
    }
  }
  return best!;
}
