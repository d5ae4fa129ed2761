import { describe, expect, test } from "vitest";
import { runSystem } from "../../../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../../../server/engine/columns/prepared-data.ts";
import { matrixAt } from "../../../../../shared/economics/slutsky.ts";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import { largestDifference, systemOver } from "../../../../support/estimating.ts";
import { simulateShares } from "../../../../support/simulated-shares.ts";
import { tunaWeeks } from "../../../../support/tuna.ts";

const WITH_SYMMETRY = { impose: ["homogeneity", "symmetry"] };

function simulated(form: "aids" | "la-aids", rows = 400): PreparedData {
  const random = seededRandom(31);
  return simulateShares({ form, goods: 5, rows, random, noise: 0.08, impose: ["homogeneity", "symmetry"] }).data;
}

const atBase = (rank?: number) => ({ curvature: { at: "base point", ...(rank && { rank }) } });

/** A week at which negativity breaks in all three systems. */
const WEEK = 76;

describe.each(["aids", "la-aids", "quaids"] as const)("%s with curvature on the tuna weeks", (form) => {
  test(`where it breaks, the matrix becomes negative semidefinite of one rank less, and no rank fits better`, async () => {
    const data = await tunaWeeks();
    const run = (curvature?: object) =>
      runSystem(systemOver(data, { form, demographics: [], ...WITH_SYMMETRY, ...(curvature && { curvature }) }), data);
    const free = run();
    const bent = run({ at: { row: WEEK } });
    expect(bent.curvature).toMatchObject({ asked: 6, rank: 5, binds: true });
    expect(bent.curvature?.logLikelihoodWithout).toBeCloseTo(free.logLikelihood, 8);
    expect(bent.logLikelihood).toBeLessThan(free.logLikelihood);
    const point = {
      prices: data.logPrices.map((column) => Math.exp(column[WEEK - 1])),
      total: Math.exp(data.logTotal[WEEK - 1]),
      demographics: [],
    };
    const options = { priceScale: data.priceScale, totalScale: data.totalScale, pointName: "there" };
    const before = matrixAt(free.fitted, point, options).eigenvalues;
    const after = matrixAt(bent.fitted, point, options).eigenvalues;
    expect(before[0].value).toBeGreaterThan(1e-4);
    // At the bound of its rank the largest eigenvalue is zero, and by construction not an estimate.
    expect(Math.abs(after[0].value)).toBeLessThan(1e-12);
    expect(after[0].standardError).toBeLessThan(1e-9);
    expect(after[1].value).toBeLessThan(-1e-3);
    expect(run({ at: { row: WEEK }, rank: 5 }).logLikelihood).toBeCloseTo(bent.logLikelihood, 8);
    expect(run({ at: { row: WEEK }, rank: 4 }).logLikelihood).toBeLessThan(bent.logLikelihood);
  });

  test("the dropped good does not matter", async () => {
    const data = await tunaWeeks();
    const run = (dropped: string) =>
      runSystem(
        systemOver(data, { form, demographics: [], ...WITH_SYMMETRY, dropped, curvature: { at: { row: WEEK } } }),
        data,
      ).fitted;
    const [one, other] = [run("brand1"), run("brand7")];
    expect(largestDifference(one.theta, other.theta)).toBeLessThan(1e-9);
    const errors = ({ covariance }: typeof one) => covariance.map((row, a) => Math.sqrt(Math.max(0, row[a])));
    expect(largestDifference(errors(one), errors(other))).toBeLessThan(1e-8);
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
