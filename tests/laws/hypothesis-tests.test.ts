import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { accumulateMoments, momentsRequest } from "../../server/engine/estimation/index.ts";
import { systemTests } from "../../server/engine/inference/system-tests.ts";
import { QUIET } from "../../server/engine/run.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { ChiSquareStatistic, MadeTest } from "../../shared/schemas/tests.ts";
import type { SystemName } from "../../shared/systems/names.ts";
import { estimated, systemOver } from "../support/estimating.ts";
import { simulateShares } from "../support/simulated-shares.ts";

const NAMES = ["homogeneity", "symmetry", "homogeneity and symmetry", "demographics"] as const;

function testsOf(data: PreparedData, specification: object) {
  const parsed = systemOver(data, specification);
  const { fitted } = estimated(data, specification);
  const moments = accumulateMoments(data, momentsRequest(parsed, data), QUIET);
  const { tests } = systemTests(NAMES, parsed, fitted, data, moments, QUIET);
  return tests.filter((test): test is MadeTest => "wald" in test);
}

function numberOf(statistic: ChiSquareStatistic): number {
  if ("absent" in statistic) throw new Error(statistic.absent);
  return statistic.statistic;
}

function simulated(seed: number, form: SystemName, rows = 60, demographics = 2) {
  const random = seededRandom(seed);
  return simulateShares({ form, goods: 4, rows, random, noise: 0.02, demographics }).data;
}

const everyNumber = (tests: readonly MadeTest[]) =>
  tests.flatMap(({ wald, likelihoodRatio, score, corrected }) =>
    [wald, likelihoodRatio, score, corrected].map(numberOf),
  );

describe("Berndt & Savin (1977, Econometrica 45): in linear systems under maximum likelihood W ≥ LR ≥ LM", () => {
  it.each([1, 2, 3, 4, 5])("whatever is tested (sample %d)", (seed) => {
    const tests = testsOf(simulated(seed, "la-aids", 30 + 10 * seed), { form: "la-aids", index: "laspeyres" });
    expect(tests.map(({ hypothesis, column }) => column ?? hypothesis)).toEqual([...NAMES, "z1", "z2"]);
    for (const { wald, likelihoodRatio, score } of tests) {
      expect(numberOf(wald)).toBeGreaterThan(numberOf(likelihoodRatio));
      expect(numberOf(likelihoodRatio)).toBeGreaterThan(numberOf(score));
    }
  });

  it("and all three agree where the restriction is nearly true of many rows", () => {
    const data = simulateShares({
      form: "la-aids",
      goods: 4,
      rows: 4000,
      random: seededRandom(6),
      noise: 0.02,
      impose: ["homogeneity", "symmetry"],
    }).data;
    for (const { wald, likelihoodRatio, score } of testsOf(data, { form: "la-aids" })) {
      expect(Math.abs(numberOf(wald) / numberOf(score) - 1)).toBeLessThan(0.01);
      expect(Math.abs(numberOf(likelihoodRatio) / numberOf(score) - 1)).toBeLessThan(0.01);
    }
  });
});

describe("what the tests do not depend on", () => {
  it.each(["la-aids", "aids"] as const)("which equation of %s is dropped, and what the system imposes", (form) => {
    const data = simulated(7, form);
    const theory = (specification: object) => everyNumber(testsOf(data, specification).slice(0, 3));
    const expected = theory({ form, impose: ["homogeneity", "symmetry"] });
    for (const specification of [{ dropped: "good 1" }, { impose: ["homogeneity"] }, { estimator: "least squares" }]) {
      theory({ form, ...specification }).forEach((value, k) => {
        expect(value).toBeCloseTo(expected[k], 7);
      });
    }
  });

  it("the order of goods", () => {
    const data = simulated(8, "aids");
    const turned = {
      ...data,
      goods: data.goods.toReversed(),
      shares: data.shares.toReversed(),
      logPrices: data.logPrices.toReversed(),
    };
    const [one, other] = [testsOf(data, { form: "aids" }), testsOf(turned, { form: "aids" })].map(everyNumber);
    other.forEach((value, k) => {
      expect(value).toBeCloseTo(one[k], 7);
    });
  });

  it("units, where the system does not: prices and money of la-aids with Törnqvist's index", () => {
    const data = simulated(9, "la-aids");
    const scaled: PreparedData = {
      ...data,
      logPrices: data.logPrices.map((column, i) => column.map((value) => value + [3, -5, 0, 1][i])),
      logTotal: data.logTotal.map((value) => value + 4),
    };
    const [one, other] = [testsOf(data, { form: "la-aids" }), testsOf(scaled, { form: "la-aids" })].map(everyNumber);
    other.forEach((value, k) => {
      expect(value).toBeCloseTo(one[k], 6);
    });
  });
});

describe("what they are made of", () => {
  it("homogeneity in linear systems: Wald and score are functions of Laitinen's T²", () => {
    const data = simulated(10, "la-aids", 50);
    const [homogeneity] = testsOf(data, { form: "la-aids", index: "laspeyres" });
    if (!homogeneity.laitinen || "absent" in homogeneity.laitinen) throw new Error("no T²");
    const { tSquared, approximate } = homogeneity.laitinen;
    const freedom = 50 - 8;
    expect(approximate).toBe(false);
    expect(numberOf(homogeneity.wald)).toBeCloseTo((50 * tSquared) / freedom, 8);
    expect(numberOf(homogeneity.score)).toBeCloseTo((50 * tSquared) / (freedom + tSquared), 8);
  });

  it("one demographic of one system of two goods is a t of one equation, squared", () => {
    const random = seededRandom(11);
    const { data } = simulateShares({ form: "la-aids", goods: 2, rows: 40, random, noise: 0.02, demographics: 1 });
    const specification = { form: "la-aids", index: "laspeyres", estimator: "maximum likelihood" };
    const { coefficients } = estimated(data, specification);
    const [, demographic] = testsOf(data, specification)
      .filter(({ hypothesis }) => hypothesis !== "symmetry")
      .slice(-2);
    const own = coefficients.find(({ block }) => block === "demographic")!;
    expect(demographic.degreesOfFreedom).toBe(1);
    expect(numberOf(demographic.wald)).toBeCloseTo((own.estimate / own.standardError) ** 2, 8);
  });

  it("degrees of freedom: n − 1, ½(n − 1)(n − 2), both, and n − 1 for each demographic", () => {
    const counts = testsOf(simulated(12, "aids"), { form: "aids" }).map(({ degreesOfFreedom }) => degreesOfFreedom);
    expect(counts).toEqual([3, 3, 6, 6, 3, 3]);
  });
});
