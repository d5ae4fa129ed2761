import { coverageOf, coverages, coversAsItSays, NOMINAL } from "../support/coverage.ts";
import { derivedIntervals } from "../support/recovered-economics.ts";
import { coefficientIntervals, drawSample, estimateOf, RECOVERED, type RecoveredSystem } from "../support/recovery.ts";
import { firstStageIntervals } from "../support/recovery-control-function.ts";
import type { ErrorKind } from "../support/simulated-errors.ts";
import { say } from "./timing.ts";

/**
 * How often 95 % intervals cover what data were made from, over 200 samples a system, beside the Monte Carlo standard
 * error and what chance allows. Lines with `tooNarrow` are of errors that the intervals do not allow for.
 */
const SAMPLES = 200;

interface Asked {
  readonly system: RecoveredSystem;
  readonly made: ErrorKind;
  readonly errors: unknown;
  readonly rows: number;
  readonly samples?: number;
  readonly rowsOfACluster?: number;
  readonly tooNarrow?: string;
}

function bench({ system, made, errors, rows, samples = SAMPLES, rowsOfACluster = 4, tooNarrow }: Asked): void {
  const begun = performance.now();
  const found = coverages(samples, (sample) => {
    const drawn = drawSample(system, { errors: made, rows, seed: sample + 1, rowsOfACluster });
    const seed = sample + 1;
    const estimate = estimateOf(
      drawn,
      typeof errors === "object" && errors && "bootstrap" in errors ? { ...errors, seed } : errors,
    );
    return { coefficients: coefficientIntervals(drawn, estimate), ...derivedIntervals(drawn, estimate) };
  });
  const ms = Math.round(performance.now() - begun);
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
      ms,
    });
  }
}

const bootstrap = (of: string, more: object = {}) => ({ bootstrap: of, replicates: 39, ...more });
const byCluster = { cluster: "cluster" };

for (const system of RECOVERED) bench({ system, made: "independent", errors: "conventional", rows: 400 });
for (const system of RECOVERED) bench({ system, made: "in clusters", errors: byCluster, rows: 960 });
// Where implicit utility holds the shares of its row every replicate iterates from the rows: fewer samples.
const BOOTSTRAPPED: Readonly<Record<RecoveredSystem, number>> = {
  "la-aids": SAMPLES,
  aids: SAMPLES,
  les: SAMPLES,
  rotterdam: SAMPLES,
  quaids: SAMPLES,
  easi: 40,
  "cubic easi": 12,
};
for (const system of RECOVERED) {
  bench({ system, made: "independent", errors: bootstrap("rows"), rows: 200, samples: BOOTSTRAPPED[system] });
}

const aids = { system: "aids" } as const;
bench({ ...aids, made: "in clusters", errors: "conventional", rows: 960, tooNarrow: "errors alike within clusters" });
bench({ ...aids, made: "in clusters", errors: bootstrap("clusters", byCluster), rows: 960 });
for (const clusters of [12, 80]) {
  const tooNarrow = `${clusters} clusters are few`;
  bench({ ...aids, made: "in clusters", errors: byCluster, rows: 8 * clusters, rowsOfACluster: 8, tooNarrow });
}
bench({ ...aids, made: "heteroskedastic", errors: "conventional", rows: 800, tooNarrow: "errors vary with a price" });
bench({ ...aids, made: "heteroskedastic", errors: "heteroskedastic", rows: 800 });
bench({ ...aids, made: "heteroskedastic", errors: bootstrap("rows"), rows: 800 });
bench({ ...aids, made: "independent", errors: bootstrap("residuals"), rows: 200 });
bench({ ...aids, made: "autocorrelated", errors: "conventional", rows: 1600, tooNarrow: "errors are autocorrelated" });
bench({ ...aids, made: "autocorrelated", errors: bootstrap("blocks", { block: 25 }), rows: 1600 });

const begun = performance.now();
const drawn = Array.from({ length: SAMPLES }, (_, sample) => firstStageIntervals(300, sample + 1));
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
  ms: Math.round(performance.now() - begun),
});
