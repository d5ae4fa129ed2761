import { createReadStream, readFileSync } from "node:fs";
import { beforeAll, describe, expect, it } from "vitest";
import { runSlutsky } from "../../server/engine/cells/slutsky.ts";
import { runSystem } from "../../server/engine/cells/system.ts";
import { prepareData } from "../../server/engine/columns/prepare.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { readCsv } from "../../server/engine/columns/read-csv.ts";
import { QUIET } from "../../server/engine/run.ts";
import { dataSpecification } from "../../shared/schemas/data.ts";
import { slutskySpecification } from "../../shared/schemas/slutsky.ts";
import { type SystemFinding, systemSpecification } from "../../shared/schemas/system.ts";

/**
 * Weekly tuna sales (338 weeks, 7 brands; provenance in fixtures/tuna-weekly.md) against general-purpose
 * tools: R 4.2.2, systemfit 1.1.28 (iterated SUR, LA-AIDS), nlminb and numDeriv (AIDS and LES likelihoods).
 * The script that made the values is fixtures/tuna.R, the values with its versions are fixtures/tuna.json.
 *
 * Bounds, relative to 1 + |value|: 1e-9 where both sides stop at rounding (linear systems); 1e-8 for AIDS
 * and LES, whose reference steps to 1e-9 because its derivatives are numerical.
 */
const fixtures = new URL("./fixtures/", import.meta.url);
const reference = JSON.parse(readFileSync(new URL("tuna.json", fixtures), "utf8"));
const BRANDS = 7;
const LINEAR = 1e-9;
const NONLINEAR = 1e-8;

function near(actual: number, expected: number, bound: number) {
  expect(Math.abs(actual - expected) / (1 + Math.abs(expected))).toBeLessThan(bound);
}

function block(finding: SystemFinding, name: string, what: "estimate" | "standardError" = "estimate") {
  return finding.coefficients.filter((one) => one.block === name).map((one) => one[what]);
}

/** γ as rows by good. */
function gammaRows(finding: SystemFinding, what: "estimate" | "standardError" = "estimate") {
  const flat = block(finding, "gamma", what);
  return Array.from({ length: BRANDS }, (_, i) => flat.slice(i * BRANDS, (i + 1) * BRANDS));
}

let data: PreparedData;

beforeAll(async () => {
  const { table } = await readCsv(createReadStream(new URL("tuna-weekly.csv", fixtures)), "tuna-weekly.csv", QUIET);
  const goods = Object.fromEntries(
    Array.from({ length: BRANDS }, (_, i) => [`brand${i + 1}`, { price: `p${i + 1}`, quantity: `q${i + 1}` }]),
  );
  data = prepareData(
    dataSpecification.parse({ kind: "data", upload: "tuna-weekly.csv", goods, time: "week", normalise: "mean" }),
    table,
  );
});

const estimated = (specification: object) =>
  runSystem(systemSpecification.parse({ kind: "system", data: "weeks", ...specification }), data, QUIET);

describe("LA-AIDS on the tuna file agrees with systemfit's iterated SUR", () => {
  const cases = [
    ["unrestricted", []],
    ["homogeneity", ["homogeneity"]],
    ["both", ["homogeneity", "symmetry"]],
  ] as const;

  it.each(cases)("%s", (name, impose) => {
    const expected = reference.laAids[name];
    const finding = estimated({
      form: "la-aids",
      index: "tornqvist",
      impose,
      estimator: "iterated seemingly unrelated",
    });
    near(finding.logLikelihood, expected.logLikelihood, LINEAR);
    const gamma = gammaRows(finding);
    const gammaErrors = gammaRows(finding, "standardError");
    for (let i = 0; i < BRANDS - 1; i++) {
      near(block(finding, "alpha")[i], expected.alpha[i], LINEAR);
      near(block(finding, "beta")[i], expected.beta[i], LINEAR);
      near(block(finding, "alpha", "standardError")[i], expected.alphaErrors[i], LINEAR);
      near(block(finding, "beta", "standardError")[i], expected.betaErrors[i], LINEAR);
      for (let j = 0; j < BRANDS; j++) {
        near(gamma[i][j], expected.gamma[i][j], LINEAR);
        near(gammaErrors[i][j], expected.gammaErrors[i][j], LINEAR);
      }
    }
  });

  it("tests homogeneity and symmetry by the difference of systemfit's log-likelihoods", () => {
    const finding = estimated({ form: "la-aids", impose: ["homogeneity", "symmetry"] });
    const { unrestricted, homogeneity, both } = reference.laAids;
    const byName = Object.fromEntries(finding.tests.map((test) => [test.restriction, test]));
    near(byName.homogeneity.statistic, 2 * (unrestricted.logLikelihood - homogeneity.logLikelihood), 1e-8);
    expect(byName.homogeneity.degreesOfFreedom).toBe(6);
    near(byName["symmetry given homogeneity"].statistic, 2 * (homogeneity.logLikelihood - both.logLikelihood), 1e-8);
    expect(byName["symmetry given homogeneity"].degreesOfFreedom).toBe(15);
  });
});

describe("AIDS with the exact translog index agrees with a general optimiser", () => {
  let finding: SystemFinding;
  beforeAll(() => {
    finding = estimated({ form: "aids", impose: ["homogeneity", "symmetry"], estimator: "maximum likelihood" });
  });

  it("in log-likelihood, coefficients and standard errors", () => {
    const expected = reference.aids;
    near(finding.logLikelihood, expected.logLikelihood, LINEAR);
    const gamma = gammaRows(finding);
    const gammaErrors = gammaRows(finding, "standardError");
    for (let i = 0; i < BRANDS - 1; i++) {
      near(block(finding, "alpha")[i], expected.alpha[i], NONLINEAR);
      near(block(finding, "beta")[i], expected.beta[i], NONLINEAR);
      near(block(finding, "alpha", "standardError")[i], expected.alphaErrors[i], NONLINEAR);
      near(block(finding, "beta", "standardError")[i], expected.betaErrors[i], NONLINEAR);
      for (let j = 0; j < BRANDS; j++) near(gamma[i][j], expected.gamma[i][j], NONLINEAR);
      for (let j = 0; j < BRANDS - 1; j++) near(gammaErrors[i][j], expected.gammaErrors[i][j], NONLINEAR);
    }
  });

  it.each([
    ["base point", "base"],
    ["mean", "mean"],
  ] as const)("in the Slutsky matrix at the %s, its errors and eigenvalues", (at, key) => {
    const expected = reference.aids[key];
    const found = runSlutsky(
      slutskySpecification.parse({ kind: "slutsky", system: "base", at }),
      finding,
      data,
      QUIET,
    ).at;
    for (let i = 0; i < BRANDS; i++) {
      for (let j = 0; j < BRANDS; j++) {
        near(found.share[i][j], expected.matrix[i][j], NONLINEAR);
        near(found.shareErrors[i][j], expected.errors[i][j], NONLINEAR);
      }
    }
    found.eigenvalues.forEach((one, k) => {
      near(one.value, expected.eigenvalues[k], NONLINEAR);
      near(one.standardError, expected.eigenvalueErrors[k], NONLINEAR);
    });
  });
});

describe("the linear expenditure system in share form agrees with a general optimiser", () => {
  it("in log-likelihood, coefficients and standard errors", () => {
    const finding = estimated({ form: "les" });
    const expected = reference.les;
    near(finding.logLikelihood, expected.logLikelihood, LINEAR);
    for (let i = 0; i < BRANDS; i++) {
      near(block(finding, "committed")[i], expected.committed[i], NONLINEAR);
      near(block(finding, "committed", "standardError")[i], expected.committedErrors[i], NONLINEAR);
    }
    for (let i = 0; i < BRANDS - 1; i++) {
      near(block(finding, "marginal")[i], expected.marginal[i], NONLINEAR);
      near(block(finding, "marginal", "standardError")[i], expected.marginalErrors[i], NONLINEAR);
    }
  });
});
