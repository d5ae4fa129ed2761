import { describe, expect, it } from "vitest";
import { coverageOf, coversAsItSays } from "../support/coverage.ts";
import { firstStageIntervals } from "../support/recovery-control-function.ts";

describe("endogenous total expenditure", () => {
  const samples = Array.from({ length: 20 }, (_, sample) => firstStageIntervals(250, 5000 + sample));

  it("a bootstrap that estimates the first stage anew covers", () => {
    expect(coverageOf(samples.map(({ intervals }) => intervals.bootstrap))).toSatisfy(coversAsItSays);
  });

  it("intervals that take its residual for data are narrower", () => {
    const narrower = samples.filter(({ width }) => width < 1).length;
    // Were they as often wider, so many would be narrower less than once in 1,000 times.
    expect(narrower).toBeGreaterThanOrEqual(17);
  });
});
