import { createReadStream, readFileSync } from "node:fs";
import { beforeAll, describe, expect, it } from "vitest";
import { runSystem } from "../../server/engine/cells/system.ts";
import { prepareData } from "../../server/engine/columns/prepare.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { readCsv } from "../../server/engine/columns/read-csv.ts";
import { QUIET } from "../../server/engine/run.ts";
import { dataSpecification } from "../../shared/schemas/data.ts";
import { type SystemFinding, systemSpecification } from "../../shared/schemas/system.ts";
import { easiMoments } from "../../shared/systems/easi-moments.ts";
import { systemOf } from "../../shared/systems/index.ts";
import { INTERACTION_NAMES } from "../../shared/systems/names.ts";
import { tunaWeeks } from "../support/tuna.ts";

/**
 * EASI against general-purpose tools (fixtures/easi.R; R 4.2.2, systemfit 1.1.28, numDeriv 2016.8): the approximate form
 * by systemfit's SUR, the exact one by three-stage least squares written out in base R and by nlminb on the likelihood
 * with the Jacobian as a determinant. On the weekly tuna sales and on 300 rows of a known EASI of three goods.
 *
 * Bounds, relative to 1 + |value|, are 1e-9, where both sides stop at rounding; of standard errors, relative to themselves,
 * 1e-7 in the approximate form, 1e-6 in the exact one, whose derivatives of the residuals are numerical there, and 1e-5 of
 * maximum likelihood, curved there by second differences of the likelihood and here by differences of its gradient.
 */
interface Reference {
  /** C, (n − 1 or n) × |Z|, in the order of the terms. */
  readonly theta: number[][];
  /** Of the free coefficients in the script's order, or like θ. */
  readonly errors: number[] & number[][];
  readonly robust: number[];
  readonly logLikelihood: number;
  readonly residualCovariance: number[][];
  readonly free: number[];
}
const fixtures = new URL("./fixtures/", import.meta.url);
const reference: { approximate: Record<string, Reference>; exact: Record<string, Reference> } = JSON.parse(
  readFileSync(new URL("easi.json", fixtures), "utf8"),
);
const NUMERICAL = 1e-6;
const CURVATURE = 1e-5;
const BOTH = ["homogeneity", "symmetry"];
const FULL = { degree: 2, interactions: INTERACTION_NAMES, demographics: ["z"] };

function near(actual: number, expected: number, bound: number) {
  expect(Math.abs(actual - expected) / (1 + Math.abs(expected))).toBeLessThan(bound);
}

/** Standard errors are small: relative to themselves. */
function sameErrors(actual: readonly number[], expected: readonly number[], bound: number) {
  expect(actual.length).toBe(expected.length);
  actual.forEach((error, f) => {
    expect(Math.abs(error / expected[f] - 1)).toBeLessThan(bound);
  });
}

let tuna: PreparedData;
let simulated: PreparedData;

beforeAll(async () => {
  tuna = await tunaWeeks();
  const name = "easi-simulated.csv";
  const { table } = await readCsv(createReadStream(new URL(name, fixtures)), name, QUIET);
  const goods = Object.fromEntries([1, 2, 3].map((i) => [`good${i}`, { price: `p${i}`, expenditure: `e${i}` }]));
  simulated = prepareData(dataSpecification.parse({ kind: "data", upload: name, goods, normalise: "none" }), table);
});

const estimated = (data: PreparedData, specification: object) =>
  runSystem(systemSpecification.parse({ kind: "system", data: "rows", form: "easi", ...specification }), data, QUIET);

/** C(θ) and its standard errors term by term. */
function overTerms({ fitted, coefficients }: SystemFinding) {
  const { size } = systemOf(fitted);
  const errors = coefficients.map((coefficient) => coefficient.standardError);
  return { theta: easiMoments.coefficients(fitted.theta, size), errors: easiMoments.coefficients(errors, size) };
}

function expectTerms(finding: SystemFinding, expected: Reference, bound: number) {
  const { theta } = overTerms(finding);
  expected.theta.forEach((row, i) => {
    row.forEach((value, term) => {
      near(theta[i][term], value, bound);
    });
  });
}

describe("the approximate form agrees with systemfit", () => {
  const cases = [
    ["tunaHomogeneityOneStep", { impose: ["homogeneity"], estimator: "seemingly unrelated" }],
    ["tunaIterated", { impose: BOTH, estimator: "iterated seemingly unrelated" }],
    ["simulatedIterated", { ...FULL, impose: BOTH, estimator: "maximum likelihood" }],
  ] as const;

  it.each(cases)("%s", (name, asked) => {
    const data = name.startsWith("tuna") ? tuna : simulated;
    const finding = estimated(data, { ...asked, "real expenditure": "approximate" });
    const expected = reference.approximate[name];
    expectTerms(finding, expected, 1e-9);
    near(finding.logLikelihood, expected.logLikelihood, 1e-9);
    const { errors } = overTerms(finding);
    expected.errors.forEach((row, i) => {
      sameErrors(errors[i], row as unknown as number[], 1e-7);
    });
  });
});

/** The free coefficients, or their standard errors, in the script's order: b_0, b_r, C, D equation by equation, then lower triangles. */
function ofFree(finding: SystemFinding, what: "estimate" | "standardError" = "standardError"): number[] {
  const { goods } = finding.fitted;
  const kept = goods.slice(0, -1);
  const of = (block: string, matches: (column: string | undefined) => boolean = () => true) =>
    finding.coefficients.filter((one) => one.block === block && matches(one.column) && kept.includes(one.good));
  const columns = (block: string) => [...new Set(of(block).map(({ column }) => column))];
  const byColumn = (block: string) => columns(block).flatMap((column) => of(block, (other) => other === column));
  const triangle = (block: string) =>
    columns(block)
      .slice(0, kept.length)
      .flatMap((column, j) => of(block, (other) => other === column).slice(j));
  return [
    ...of("constant"),
    ...byColumn("power"),
    ...byColumn("demographic"),
    ...byColumn("demographic expenditure"),
    ...["price", "price demographic", "price expenditure"].flatMap(triangle),
  ].map((one) => one[what]);
}

describe("the exact form agrees with base R", () => {
  const cases = [
    ["tunaIterated", { impose: BOTH, estimator: "iterated seemingly unrelated" }],
    ["simulatedLeast", { ...FULL, impose: BOTH, estimator: "least squares" }],
    ["simulatedIterated", { ...FULL, impose: BOTH, estimator: "iterated seemingly unrelated" }],
  ] as const;

  it.each(cases)("by stages: %s", (name, asked) => {
    const data = name.startsWith("tuna") ? tuna : simulated;
    const expected = reference.exact[name];
    const finding = estimated(data, asked);
    expectTerms(finding, expected, 1e-9);
    near(finding.logLikelihood, expected.logLikelihood, 1e-9);
    expected.residualCovariance.forEach((row, i) => {
      row.forEach((value, j) => {
        near(finding.residualCovariance[i][j], value, 1e-9);
      });
    });
    sameErrors(ofFree(finding), expected.errors, NUMERICAL);
    const robust = estimated(data, { ...asked, "standard errors": "heteroskedastic" });
    sameErrors(ofFree(robust), expected.robust, NUMERICAL);
  });

  it("by maximum likelihood", () => {
    const expected = reference.exact.simulatedMaximum;
    const finding = estimated(simulated, { ...FULL, impose: BOTH, estimator: "maximum likelihood" });
    near(finding.logLikelihood, expected.logLikelihood, 1e-9);
    ofFree(finding, "estimate").forEach((value, f) => {
      near(value, expected.free[f], 1e-9);
    });
    sameErrors(ofFree(finding), expected.errors, CURVATURE);
  });
});
