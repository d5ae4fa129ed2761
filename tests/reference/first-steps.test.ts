import { readFileSync } from "node:fs";
import { beforeAll, describe, expect, it } from "vitest";
import { demoStudy } from "../../server/demo/cells.ts";
import { runData, runSystem } from "../../server/engine/cells/index.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { readCsv } from "../../server/engine/columns/read-csv.ts";
import { type SystemFinding, systemSpecification } from "../../shared/schemas/system.ts";
import { bytesOf } from "../server/engine/columns/bytes.ts";
import { specificationOf } from "../support/tuna.ts";

/**
 * Endogenous expenditure and goods not bought, on the survey of the demo study without the one household that bought no
 * produce, against general-purpose tools: R 4.2.2, lm and glm, systemfit 1.1.28, numDeriv. fixtures/first-steps.R made
 * fixtures/first-steps.json, which carries the versions.
 *
 * Bounds, relative to 1 + |value|: 1e-9 for what the reference has by closed forms or by iteration to rounding, 1e-8 for
 * what it has through numerical derivatives (AIDS) or to the tolerance of glm.
 */
const reference = JSON.parse(readFileSync(new URL("./fixtures/first-steps.json", import.meta.url), "utf8"));
const CLOSE = 1e-9;
const BY_DIFFERENCES = 1e-8;

function near(actual: readonly number[], expected: readonly number[], bound: number, what = "") {
  expect(actual.length, what).toBe(expected.length);
  const distance = actual.reduce(
    (most, v, k) => Math.max(most, Math.abs(v - expected[k]) / (1 + Math.abs(expected[k]))),
    0,
  );
  expect(distance, what).toBeLessThan(bound);
}

function block({ coefficients }: SystemFinding, name: string, what: "estimate" | "standardError" = "estimate") {
  return coefficients.filter((one) => one.block === name).map((one) => one[what]);
}

let data: PreparedData;
const fits = new Map<string, SystemFinding>();

function fitted(specification: object): SystemFinding {
  const key = JSON.stringify(specification);
  if (!fits.has(key)) {
    const common = {
      kind: "system",
      data: "survey",
      impose: ["homogeneity", "symmetry"],
      demographics: ["log_size", "urban"],
    };
    fits.set(key, runSystem(systemSpecification.parse({ ...common, ...specification }), data));
  }
  return fits.get(key)!;
}

beforeAll(async () => {
  const { upload, cells } = demoStudy();
  const { table } = await readCsv(bytesOf(upload.csv, 65_536), upload.name);
  const source = cells.find(({ name }) => name === "survey")!.source;
  data = runData({ ...specificationOf("data", source), keep: "members <= 12 and q_produce > 0" }, table);
});

it("uses the rows the reference uses", () => {
  expect(data.rows).toBe(reference.rows);
});

describe("total expenditure by control function", () => {
  const instruments = ["head_school", "rooms"];

  it("regresses ln x on instruments, prices and demographics as lm does", () => {
    const { firstStage } = fitted({ form: "la-aids", instruments }).endogeneity!;
    // lm has the constant, the demographics, the prices and the instruments in the same order.
    near(
      firstStage.coefficients.map((one) => one.estimate),
      reference.firstStage.coefficients,
      CLOSE,
    );
    near(
      firstStage.coefficients.map((one) => one.standardError),
      reference.firstStage.errors,
      CLOSE,
    );
    expect(firstStage.f.statistic / reference.firstStage.f - 1).toBeCloseTo(0, 9);
    expect([firstStage.f.numerator, firstStage.f.denominator]).toEqual(reference.firstStage.df);
    expect(firstStage.f.pValue / reference.firstStage.p - 1).toBeCloseTo(0, 8);
    expect(firstStage.partialRSquared).toBeCloseTo(reference.firstStage.partialRSquared, 10);
  });

  it("estimates LA-AIDS with the residual as systemfit does", () => {
    const finding = fitted({ form: "la-aids", instruments });
    const { coefficients, errors, logLikelihood, wald, lr, waldP } = reference.laAids;
    const column = (rows: number[][], at: number) => rows.map((row) => row[at]);
    near(block(finding, "alpha").slice(0, 5), column(coefficients, 0), CLOSE);
    near(block(finding, "beta").slice(0, 5), column(coefficients, 9), CLOSE);
    near(block(finding, "beta", "standardError").slice(0, 5), column(errors, 9), CLOSE);
    near(
      block(finding, "gamma").slice(0, 30),
      coefficients.flatMap((row: number[]) => row.slice(3, 9)),
      CLOSE,
    );
    const { residual, exogeneity } = finding.endogeneity!;
    near(
      residual.slice(0, 5).map((one) => one.estimate),
      column(coefficients, 10),
      CLOSE,
    );
    near(
      residual.slice(0, 5).map((one) => one.standardError),
      column(errors, 10),
      CLOSE,
    );
    expect(finding.logLikelihood).toBeCloseTo(logLikelihood, 5);
    expect(exogeneity.wald!.statistic / wald - 1).toBeCloseTo(0, 7);
    expect(exogeneity.wald!.pValue / waldP - 1).toBeCloseTo(0, 6);
    // A difference of two numbers near 43,000.
    expect(exogeneity.likelihoodRatio!.statistic).toBeCloseTo(lr, 5);
    expect(exogeneity.degreesOfFreedom).toBe(5);
  });

  it("estimates AIDS with the residual outside the price index", () => {
    const finding = fitted({ form: "aids", instruments });
    const { alpha, beta, gamma, rho, rhoErrors, betaErrors, logLikelihood } = reference.aids;
    near(block(finding, "alpha"), alpha, BY_DIFFERENCES);
    near(block(finding, "beta"), beta, BY_DIFFERENCES);
    near(block(finding, "beta", "standardError").slice(0, 5), betaErrors, BY_DIFFERENCES);
    near(block(finding, "gamma"), gamma.flat(), BY_DIFFERENCES);
    const { residual } = finding.endogeneity!;
    near(
      residual.slice(0, 5).map((one) => one.estimate),
      rho,
      BY_DIFFERENCES,
    );
    near(
      residual.slice(0, 5).map((one) => one.standardError),
      rhoErrors,
      BY_DIFFERENCES,
    );
    expect(finding.logLikelihood).toBeCloseTo(logLikelihood, 5);
  });
});

describe("goods not bought, in two steps", () => {
  const zeros = { "two-step": ["market_km"] };

  it("estimates the probits as glm does", () => {
    const { goods } = fitted({ form: "la-aids", zeros }).zeros!;
    for (const one of reference.zeros.probits) {
      const { probit, rowsWithout } = goods[one.good - 1];
      expect(rowsWithout).toBe(one.without);
      near(
        probit!.coefficients.map(({ estimate }) => estimate),
        one.coefficients,
        BY_DIFFERENCES,
        `good ${one.good}`,
      );
      near(
        probit!.coefficients.map(({ estimate }) => estimate),
        one.glm,
        BY_DIFFERENCES,
        `good ${one.good} by glm`,
      );
      near(
        probit!.coefficients.map(({ standardError }) => standardError),
        one.errors,
        CLOSE,
        `errors of good ${one.good}`,
      );
      expect(probit!.logLikelihood).toBeCloseTo(one.logLikelihood, 9);
    }
    expect(goods.filter(({ probit }) => probit === undefined).map(({ good }) => good)).toEqual([
      "Grains",
      "Produce",
      "Other food",
    ]);
  });

  it.each([
    ["least squares", "leastSquares", CLOSE],
    ["seemingly unrelated", "oneStep", CLOSE],
    ["maximum likelihood", "likelihood", CLOSE],
  ] as const)("estimates the second step of LA-AIDS by %s", (estimator, name, bound) => {
    const finding = fitted({ form: "la-aids", zeros, estimator });
    const { alpha, beta, gamma, delta, deltaErrors, betaErrors } = reference.zeros[name];
    near(block(finding, "alpha"), alpha, bound);
    near(block(finding, "beta"), beta, bound);
    near(block(finding, "gamma"), gamma.flat(), bound);
    const { corrections } = finding.zeros!;
    near(
      corrections.map(({ estimate }) => estimate),
      delta,
      bound,
    );
    if (name === "leastSquares") return;
    near(
      corrections.map(({ standardError }) => standardError),
      deltaErrors,
      bound,
    );
    near(block(finding, "beta", "standardError").slice(0, 5), betaErrors, bound);
  });

  it("says what the predicted shares of the second step sum to", () => {
    const { predictedSum } = fitted({ form: "la-aids", zeros, estimator: "maximum likelihood" }).zeros!;
    near([predictedSum.lowest, predictedSum.highest, predictedSum.mean], reference.zeros.likelihood.sum, CLOSE);
  });

  it("estimates the second step of AIDS", () => {
    const finding = fitted({ form: "aids", zeros });
    const { alpha, beta, gamma, delta, deltaErrors, logLikelihood } = reference.zeros.aids;
    near(block(finding, "alpha"), alpha, BY_DIFFERENCES);
    near(block(finding, "beta"), beta, BY_DIFFERENCES);
    near(block(finding, "gamma"), gamma.flat(), BY_DIFFERENCES);
    near(
      finding.zeros!.corrections.map(({ estimate }) => estimate),
      delta,
      BY_DIFFERENCES,
    );
    near(
      finding.zeros!.corrections.map(({ standardError }) => standardError),
      deltaErrors,
      BY_DIFFERENCES,
    );
    expect(finding.logLikelihood).toBeCloseTo(logLikelihood, 5);
  });
});
