import { spawn } from "node:child_process";
import { once } from "node:events";
import { availableParallelism } from "node:os";
import { fileURLToPath } from "node:url";
import { coverageOf, coverages, coversAsItSays, NOMINAL } from "../support/coverage.ts";
import { derivedIntervals } from "../support/recovered-economics.ts";
import { coefficientIntervals, drawSample, estimateOf, RECOVERED, type RecoveredSystem } from "../support/recovery.ts";
import { firstStageIntervals } from "../support/recovery-control-function.ts";
import type { ErrorKind } from "../support/simulated-errors.ts";
import { say } from "./timing.ts";

/**
 * How often 95 % intervals cover what data were made from, beside the Monte Carlo standard error and what chance allows,
 * both of as many samples as the line has. Lines with `tooNarrow` are of errors that the intervals do not allow for.
 *
 * Every line draws samples of its own seeds, so that what chance does to one it does not do to the next. Lines are
 * shared out among processes, one a core; `processorMs` is all that a line's process took. A number after the name of
 * this file is the one line to run.
 */
const SAMPLES = 200;
/** Errors by cluster are a little too small however many clusters there are: more samples, to see how little. */
const CLUSTERED: Readonly<Record<RecoveredSystem, number>> = {
  "la-aids": 600,
  aids: 600,
  les: 600,
  rotterdam: 600,
  quaids: 400,
  easi: 300,
  "cubic easi": 200,
};
/** Apart by more than there are samples of a line. */
const SEEDS_OF_A_LINE = 10_000;

interface Asked {
  readonly system: RecoveredSystem;
  readonly made: ErrorKind;
  readonly errors: unknown;
  readonly rows: number;
  readonly samples?: number;
  readonly rowsOfACluster?: number;
  readonly tooNarrow?: string;
}

const bootstrap = (of: string, more: object = {}) => ({ bootstrap: of, replicates: 39, ...more });
const byCluster = { cluster: "cluster" };
const aids = { system: "aids" } as const;

const LINES: readonly (Asked | "first stage")[] = [
  ...RECOVERED.map((system) => ({ system, made: "independent", errors: "conventional", rows: 400 }) as const),
  ...RECOVERED.map((system) => {
    const samples = CLUSTERED[system];
    return { system, made: "in clusters", errors: byCluster, rows: 960, samples } as const;
  }),
  ...RECOVERED.map((system) => ({ system, made: "independent", errors: bootstrap("rows"), rows: 200 }) as const),
  { ...aids, made: "in clusters", errors: "conventional", rows: 960, tooNarrow: "errors alike within clusters" },
  { ...aids, made: "in clusters", errors: bootstrap("clusters", byCluster), rows: 960 },
  ...[12, 80].map((clusters) => {
    const few = { rows: 8 * clusters, rowsOfACluster: 8, tooNarrow: `${clusters} clusters are few` };
    return { ...aids, made: "in clusters", errors: byCluster, ...few } as const;
  }),
  { ...aids, made: "heteroskedastic", errors: "conventional", rows: 800, tooNarrow: "errors vary with a price" },
  { ...aids, made: "heteroskedastic", errors: "heteroskedastic", rows: 800 },
  { ...aids, made: "heteroskedastic", errors: bootstrap("rows"), rows: 800 },
  { ...aids, made: "independent", errors: bootstrap("residuals"), rows: 200 },
  { ...aids, made: "autocorrelated", errors: "conventional", rows: 1600, tooNarrow: "errors are autocorrelated" },
  { ...aids, made: "autocorrelated", errors: bootstrap("blocks", { block: 25 }), rows: 1600 },
  "first stage",
];

const [, , line] = process.argv;
if (line === undefined) await shareOut();
else {
  const asked = LINES[Number(line)];
  const firstSeed = 1 + SEEDS_OF_A_LINE * Number(line);
  if (asked === "first stage") benchFirstStage(firstSeed);
  else bench(asked, firstSeed);
}

/** Runs every line in a process of its own, as many at a time as there are cores. */
async function shareOut(): Promise<void> {
  const left = [...LINES.keys()];
  const work = async () => {
    for (let at = left.shift(); at !== undefined; at = left.shift()) {
      const words = [...process.execArgv, fileURLToPath(import.meta.url), String(at)];
      const [code] = await once(spawn(process.execPath, words, { stdio: "inherit" }), "exit");
      if (code !== 0) process.exitCode = 1;
    }
  };
  await Promise.all(Array.from({ length: availableParallelism() }, work));
}

function bench(asked: Asked, firstSeed: number): void {
  const { system, made, errors, rows, samples = SAMPLES, rowsOfACluster = 4, tooNarrow } = asked;
  const found = coverages(samples, (sample) => {
    const seed = firstSeed + sample;
    const drawn = drawSample(system, { errors: made, rows, seed, rowsOfACluster });
    const seeded = typeof errors === "object" && errors !== null && "bootstrap" in errors;
    const estimate = estimateOf(drawn, seeded ? { ...errors, seed } : errors);
    return { coefficients: coefficientIntervals(drawn, estimate), ...derivedIntervals(drawn, estimate) };
  });
  for (const [of, coverage] of Object.entries(found)) {
    say({
      figure: "recovery",
      system,
      made,
      errors,
      of,
      rows,
      ...(made === "in clusters" && { clusters: rows / rowsOfACluster }),
      ...coverage,
      nominal: NOMINAL,
      ...(tooNarrow ? { tooNarrow } : { withinBound: coversAsItSays(coverage) }),
      processorMs: processorMs(),
    });
  }
}

function benchFirstStage(firstSeed: number): void {
  const drawn = Array.from({ length: SAMPLES }, (_, sample) => firstStageIntervals(300, firstSeed + sample));
  const whole = coverageOf(drawn.map(({ intervals }) => intervals.bootstrap));
  const ignoring = coverageOf(drawn.map(({ intervals }) => intervals.conventional));
  say({
    figure: "recovery",
    system: "aids",
    made: "endogenous total expenditure",
    errors: "bootstrap of rows, first stage estimated anew",
    of: "β",
    rows: 300,
    ...whole,
    nominal: NOMINAL,
    withinBound: coversAsItSays(whole),
    coveredIgnoringTheFirstStage: ignoring.covered,
    widthIgnoringTheFirstStage: drawn.reduce((sum, { width }) => sum + width, 0) / SAMPLES,
    processorMs: processorMs(),
  });
}

function processorMs(): number {
  const { user, system } = process.cpuUsage();
  return Math.round((user + system) / 1000);
}
