import { describe, expect, it } from "vitest";
import { coverages, coversAsItSays, NOMINAL } from "../support/coverage.ts";
import { derivedIntervals } from "../support/recovered-economics.ts";
import { coefficientIntervals, drawSample, estimateOf, type RecoveredSystem } from "../support/recovery.ts";
import type { ErrorKind } from "../support/simulated-errors.ts";

/** Percentile intervals of 39 replicates, as many as coverage needs (tests/support/recovery.ts). */
const REPLICATES = 39;

describe("percentile intervals cover coefficients and what is derived from them", () => {
  it.each([
    ["aids", "rows", "independent", 200, 20],
    ["aids", "residuals", "independent", 200, 20],
    ["aids", "rows", "heteroskedastic", 300, 20],
    ["les", "rows", "independent", 200, 25],
    ["rotterdam", "residuals", "independent", 200, 25],
    ["quaids", "rows", "independent", 150, 5],
  ] as const)("%s by %s, errors %s", (system, bootstrap, errors, rows, samples) => {
    const found = cover(system, errors, { bootstrap }, rows, samples);
    for (const coverage of Object.values(found)) expect(coverage).toSatisfy(coversAsItSays);
  });
});

describe("autocorrelated errors", () => {
  it("moving blocks cover", () => {
    const { coefficients } = cover("aids", "autocorrelated", { bootstrap: "blocks", block: 20 }, 1000, 20);
    expect(coefficients).toSatisfy(coversAsItSays);
  });

  it("conventional intervals of the intercepts, the slowest to vary, cover too rarely", () => {
    const { conventional } = coverages(80, (sample) => {
      const drawn = drawSample("aids", { errors: "autocorrelated", rows: 300, seed: 4500 + sample });
      const found = estimateOf(drawn, "conventional");
      const intervals = coefficientIntervals(drawn, found);
      return { conventional: intervals.filter((_, a) => found.coefficients[a].block === "alpha") };
    });
    expect(conventional.covered + conventional.bound).toBeLessThan(NOMINAL);
  });
});

function cover(system: RecoveredSystem, errors: ErrorKind, bootstrap: object, rows: number, samples: number) {
  return coverages(samples, (sample) => {
    const drawn = drawSample(system, { errors, rows, seed: 4000 + sample });
    const found = estimateOf(drawn, { replicates: REPLICATES, seed: sample, ...bootstrap });
    return { coefficients: coefficientIntervals(drawn, found), ...derivedIntervals(drawn, found) };
  });
}
