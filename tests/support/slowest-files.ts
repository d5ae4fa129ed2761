import type { Reporter, TestModule } from "vitest/node";

const NAMED = 10;
const inSeconds = (ms: number) => `${(ms / 1000).toFixed(1).padStart(6)} s`;

/** All a file takes by the clock: imports, what it sets up, and its tests. */
function durationOf(file: TestModule): number {
  const { environmentSetupDuration, prepareDuration, collectDuration, setupDuration, duration } = file.diagnostic();
  return environmentSetupDuration + prepareDuration + collectDuration + setupDuration + duration;
}

/** Names the ten slowest files at the end of a run, so that whoever adds tests sees what they cost. */
export default class SlowestFiles implements Reporter {
  onTestRunEnd(files: readonly TestModule[]): void {
    const timed = files.map((file) => ({ name: file.relativeModuleId, ms: durationOf(file) }));
    if (timed.length <= NAMED) return;
    const slowest = timed.toSorted((a, b) => b.ms - a.ms).slice(0, NAMED);
    const all = timed.reduce((sum, { ms }) => sum + ms, 0);
    console.log(`\nThe ${NAMED} slowest of ${timed.length} files, which took ${inSeconds(all).trim()} together:`);
    for (const { name, ms } of slowest) console.log(`${inSeconds(ms)}  ${name}`);
  }
}
