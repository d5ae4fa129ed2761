import { describe, expect, it } from "vitest";
import { coverageOf, RECOVERED, recover } from "../support/recovery.ts";

/**
 * 95 % intervals cover the coefficients that data were made from within Monte Carlo error (three standard errors of
 * the simulated coverage). A small version of tests/bench/recovery.bench.ts.
 */
const within = ({ covered, monteCarloError }: ReturnType<typeof coverageOf>) =>
  Math.abs(covered - 0.95) / (monteCarloError / 1.96);

describe("conventional errors of independent rows", () => {
  it.each(RECOVERED)("%s", (form) => {
    const samples = { easi: 12, quaids: 20 }[form as string] ?? 40;
    expect(within(coverageOf(samples, (sample) => recover(form, "conventional", 250, 1000 + sample)))).toBeLessThan(3);
  });
});

describe("rows in villages", () => {
  const cover = (errors: Parameters<typeof recover>[1], samples: number) =>
    coverageOf(samples, (sample) => recover("aids", errors, 600, 2000 + sample));

  it("conventional errors cover too rarely", () => {
    const { covered, monteCarloError } = cover("conventional in villages", 30);
    expect(covered + 1.5 * monteCarloError).toBeLessThan(0.95);
  });

  it("clustered errors cover", () => {
    expect(within(cover("clustered", 40))).toBeLessThan(3);
  });

  it("so do those of a bootstrap of clusters", () => {
    expect(within(cover("bootstrap", 15))).toBeLessThan(3);
  });
});
