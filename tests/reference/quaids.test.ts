import { readFileSync } from "node:fs";
import { beforeAll, describe, expect, it } from "vitest";
import { runSystem } from "../../server/engine/cells/system.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { type SystemFinding, systemSpecification } from "../../shared/schemas/system.ts";
import { largestDifference } from "../support/estimating.ts";
import { sampleData } from "../support/sample-findings.ts";
import { tunaWeeks } from "../support/tuna.ts";

/**
 * The quadratic almost ideal system against base R's nlminb with derivatives by numDeriv, on weekly tuna sales and
 * on simulated shares; fixtures/quaids.R made the values, fixtures/quaids.json holds them with its versions.
 *
 * Bounds, relative to 1 + |value|: the reference steps to 5e-10 on the tuna file and to 5e-12 on the simulated rows,
 * as far as numerical derivatives allow; its likelihood is flat there, and agrees to rounding.
 */
interface Expected {
  theta: number[];
  errors: number[];
  free: number;
  logLikelihood: number;
  slutskyAtMean: number[][];
}
const reference = JSON.parse(readFileSync(new URL("fixtures/quaids.json", import.meta.url), "utf8")) as {
  tuna: Expected;
  simulated: {
    both: Expected;
    unrestricted: Expected;
    truth: number[];
    data: { shares: number[][]; logPrices: number[][]; logTotal: number[]; z: number[] };
  };
};
const aidsOnTuna = JSON.parse(readFileSync(new URL("fixtures/tuna.json", import.meta.url), "utf8")).aids;
const TUNA = 2e-8;
const SIMULATED = 1e-9;
const BOTH = ["homogeneity", "symmetry"];

const estimate = (data: PreparedData, keys: object) =>
  runSystem(systemSpecification.parse({ kind: "system", data: "rows", form: "quaids", ...keys }), data);

function expectAgreement(finding: SystemFinding, data: PreparedData, expected: Expected, bound: number) {
  expect(finding.freeCoefficients).toBe(expected.free);
  expect(largestDifference(finding.fitted.theta, expected.theta)).toBeLessThan(bound);
  const errors = finding.coefficients.map(({ standardError }) => standardError);
  expect(largestDifference(errors, expected.errors)).toBeLessThan(bound);
  expect(Math.abs(finding.logLikelihood - expected.logLikelihood)).toBeLessThan(1e-8);
  // R stands at the mean of the logs.
  const mean = (column: Float64Array) => column.reduce((sum, value) => sum + value, 0) / column.length;
  const point = {
    prices: data.logPrices.map((column) => Math.exp(mean(column))),
    total: Math.exp(mean(data.logTotal)),
    demographics: finding.fitted.demographics.map((name) => mean(data.numeric.get(name)!)),
  };
  const units = { priceScale: data.priceScale, totalScale: data.totalScale, pointName: "mean" };
  const { share } = matrixAt(finding.fitted, point, units);
  // Slopes by numerical derivatives of shares in ln p and ln x: 1e-9 more.
  expect(largestDifference(share.flat(), expected.slutskyAtMean.flat())).toBeLessThan(bound + 1e-9);
}

describe("QUAIDS on the tuna file", () => {
  let data: PreparedData;
  let finding: SystemFinding;
  beforeAll(async () => {
    data = await tunaWeeks();
    finding = estimate(data, { impose: BOTH });
  });

  it("agrees with nlminb and numDeriv: coefficients, standard errors, likelihood, matrix", () => {
    expectAgreement(finding, data, reference.tuna, TUNA);
    expect(finding.convergence.gradient).toBeLessThan(1e-6);
  });

  it("contains the almost ideal system: the likelihood ratio is that of two runs of R", () => {
    const test = finding.tests.find(({ restriction }) => restriction === "quadratic terms zero")!;
    const ratio = 2 * (reference.tuna.logLikelihood - aidsOnTuna.logLikelihood);
    expect(Math.abs(test.statistic - ratio)).toBeLessThan(1e-7);
    expect(test.degreesOfFreedom).toBe(6);
  });

  it("depends neither on the good dropped nor on the estimator's way to the likelihood", () => {
    for (const change of [{ dropped: "brand1" }, { estimator: "iterated seemingly unrelated" }]) {
      const other = estimate(data, { impose: BOTH, ...change });
      expect(largestDifference(other.fitted.theta, finding.fitted.theta)).toBeLessThan(1e-8);
      expect(Math.abs(other.logLikelihood - finding.logLikelihood)).toBeLessThan(1e-8);
    }
  });
});

describe("QUAIDS on simulated shares with a demographic", () => {
  const { shares, logPrices, logTotal, z } = reference.simulated.data;
  const data: PreparedData = {
    fingerprint: "0".repeat(64),
    goods: ["bread", "milk", "meat", "fuel"],
    rows: logTotal.length,
    rowNumbers: Int32Array.from(logTotal, (_, t) => t + 1),
    shares: shares.map((column) => Float64Array.from(column)),
    logPrices: logPrices.map((column) => Float64Array.from(column)),
    logTotal: Float64Array.from(logTotal),
    numeric: new Map([["size", Float64Array.from(z)]]),
    priceScale: [1, 1, 1, 1],
    totalScale: 1,
    finding: sampleData(),
  };

  it("agrees with nlminb and numDeriv under homogeneity and symmetry", () => {
    const finding = estimate(data, { impose: BOTH, demographics: ["size"] });
    expectAgreement(finding, data, reference.simulated.both, SIMULATED);
    // The truth is no further away than its standard errors allow, coefficient by coefficient.
    finding.fitted.theta.forEach((value, a) => {
      expect(Math.abs(value - reference.simulated.truth[a])).toBeLessThan(3.5 * finding.coefficients[a].standardError);
    });
    const test = finding.tests.find(({ restriction }) => restriction === "quadratic terms zero")!;
    expect(test.degreesOfFreedom).toBe(3);
    expect(test.pValue).toBeLessThan(1e-6);
  });

  it("agrees with nlminb and numDeriv unrestricted", () => {
    const finding = estimate(data, { demographics: ["size"] });
    expectAgreement(finding, data, reference.simulated.unrestricted, SIMULATED);
    const test = finding.tests.find(({ restriction }) => restriction === "homogeneity")!;
    expect(test.degreesOfFreedom).toBe(3);
  });
});
