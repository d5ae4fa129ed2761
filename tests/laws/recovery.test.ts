import { describe, expect, it } from "vitest";
import { coverages, coversAsItSays, NOMINAL } from "../support/coverage.ts";
import { derivedIntervals } from "../support/recovered-economics.ts";
import { coefficientIntervals, drawSample, estimateOf, RECOVERED, type RecoveredSystem } from "../support/recovery.ts";
import type { ErrorKind } from "../support/simulated-errors.ts";

/**
 * 95 % intervals cover the coefficients that data were made from, and what is derived from them, within what chance
 * allows (tests/support/coverage.ts). A small version of tests/bench/recovery.bench.ts.
 */
const SAMPLES: Readonly<Record<RecoveredSystem, number>> = {
  "la-aids": 40,
  aids: 40,
  quaids: 20,
  les: 40,
  rotterdam: 40,
  easi: 15,
  "cubic easi": 10,
};

describe("conventional errors of independent rows", () => {
  it.each(RECOVERED)("%s: coefficients, elasticities, the Slutsky matrix, the compensating variation", (system) => {
    const found = coverages(SAMPLES[system], (sample) => {
      const drawn = drawSample(system, { rows: 250, seed: 1000 + sample });
      const estimate = estimateOf(drawn, "conventional");
      return { coefficients: coefficientIntervals(drawn, estimate), ...derivedIntervals(drawn, estimate) };
    });
    for (const coverage of Object.values(found)) expect(coverage).toSatisfy(coversAsItSays);
  });
});

describe("errors that vary with a price", () => {
  const cover = (errors: ErrorKind, ...asked: string[]) =>
    coverages(120, (sample) => {
      const drawn = drawSample("aids", { errors, rows: 500, seed: 3000 + sample });
      return Object.fromEntries(
        asked.map((kind) => {
          const found = estimateOf(drawn, kind);
          // Where the errors vary with p_1, those of γ_i1 are what conventional errors get wrong.
          const first = (_: unknown, a: number) =>
            found.coefficients[a].block === "gamma" && found.coefficients[a].column === drawn.data.goods[0];
          return [kind, coefficientIntervals(drawn, found).filter(first)];
        }),
      );
    });

  it("conventional intervals cover too rarely, heteroskedastic ones as they say", () => {
    const { conventional, heteroskedastic } = cover("heteroskedastic", "conventional", "heteroskedastic");
    expect(conventional.covered + conventional.bound).toBeLessThan(NOMINAL);
    expect(heteroskedastic).toSatisfy(coversAsItSays);
  });

  it("heteroskedastic ones also where errors do not vary", () => {
    expect(cover("independent", "heteroskedastic").heteroskedastic).toSatisfy(coversAsItSays);
  });
});
