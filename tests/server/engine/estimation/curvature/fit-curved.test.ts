import { describe, expect, test } from "vitest";
import { runSystem } from "../../../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../../../server/engine/columns/prepared-data.ts";
import { matrixAt } from "../../../../../shared/economics/slutsky.ts";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import { systemOver } from "../../../../support/estimating.ts";
import { simulateShares } from "../../../../support/simulated-shares.ts";
import { tunaWeeks } from "../../../../support/tuna.ts";

const WITH_SYMMETRY = { impose: ["homogeneity", "symmetry"] };

function simulated(form: "aids" | "la-aids", rows = 400): PreparedData {
  const random = seededRandom(31);
  return simulateShares({ form, goods: 5, rows, random, noise: 0.08, impose: ["homogeneity", "symmetry"] }).data;
}

const atBase = (rank?: number) => ({ curvature: { at: "base point", ...(rank && { rank }) } });

describe.each(["aids", "la-aids", "quaids"] as const)("%s with curvature on the tuna weeks", (form) => {
  test("the matrix at the point is negative semidefinite of the rank found, and nothing nearby fits better", async () => {
    const data = await tunaWeeks();
    for (const at of ["base point", { row: 100 }] as const) {
      const run = (rank?: number) =>
        runSystem(
          systemOver(data, { form, demographics: [], ...WITH_SYMMETRY, curvature: { at, ...(rank && { rank }) } }),
          data,
        );
      const free = runSystem(systemOver(data, { form, demographics: [], ...WITH_SYMMETRY }), data);
      const whole = run();
      const { curvature, fitted, points } = whole;
      expect(curvature?.logLikelihoodWithout).toBeCloseTo(free.logLikelihood, 6);
      expect(whole.logLikelihood).toBeLessThanOrEqual(free.logLikelihood + 1e-8);
      const point =
        at === "base point"
          ? points.base
          : {
              prices: data.logPrices.map((column) => Math.exp(column[99])),
              total: Math.exp(data.logTotal[99]),
              demographics: [],
            };
      const options = { priceScale: data.priceScale, totalScale: data.totalScale, pointName: "there" };
      const { eigenvalues } = matrixAt(fitted, point, options);
      expect(eigenvalues[0].value).toBeLessThan(1e-9);
      const rank = eigenvalues.filter(({ value }) => value < -1e-7).length;
      expect(rank).toBe(curvature?.rank);
      // A lower rank asked for fits no better.
      const lower = run(2);
      expect(lower.logLikelihood).toBeLessThanOrEqual(whole.logLikelihood + 1e-6);
      expect(lower.curvature?.rank).toBeLessThanOrEqual(2);
    }
  });
});

test("where estimates are negative already, curvature changes no digit", () => {
  const data = simulated("aids");
  const free = runSystem(systemOver(data, { form: "aids", ...WITH_SYMMETRY }), data);
  expect(free.checks.negativity.holds).toBe(true);
  const bent = runSystem(systemOver(data, { form: "aids", ...WITH_SYMMETRY, ...atBase() }), data);
  expect(bent.curvature?.binds).toBe(false);
  expect(bent.fitted.theta).toEqual(free.fitted.theta);
});

test("a rank no matrix of so many goods has is refused with both numbers", () => {
  const data = simulated("aids");
  expect(() => runSystem(systemOver(data, { form: "aids", ...WITH_SYMMETRY, ...atBase(5) }), data)).toThrow(
    "curvature asks for rank 5; the Slutsky matrix of 5 goods has rank 4 at most",
  );
});
