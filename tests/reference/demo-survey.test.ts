import { readFileSync } from "node:fs";
import { beforeAll, describe, expect, it } from "vitest";
import { demoStudy } from "../../server/demo/cells.ts";
import { runData, runSlutsky, runSystem } from "../../server/engine/cells/index.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { readCsv } from "../../server/engine/columns/read-csv.ts";
import { elasticitiesAt } from "../../shared/economics/elasticities.ts";
import type { SlutskyFinding } from "../../shared/schemas/slutsky.ts";
import type { SystemFinding } from "../../shared/schemas/system.ts";
import { bytesOf } from "../server/engine/columns/bytes.ts";
import { specificationOf } from "../support/tuna.ts";

/**
 * The survey of the demo study, with its weights and demographics, against general-purpose tools: R 4.2.2, systemfit
 * 1.1.28 on rows scaled by the square roots of their weights (LA-AIDS), nlminb and numDeriv on the weighted likelihoods
 * (AIDS and LES). fixtures/demo-survey.R made fixtures/demo-survey.json, which carries the versions.
 *
 * Bounds, relative to 1 + |value|: 1e-9 for estimates, shares and eigenvalues; 1e-8 for standard errors, which the
 * reference has by numerical derivatives; 1e-6 for the likelihood ratios, differences of numbers near 40,000.
 */
const reference = JSON.parse(readFileSync(new URL("./fixtures/demo-survey.json", import.meta.url), "utf8"));
const CLOSE = 1e-9;
const BY_DIFFERENCES = 1e-8;
const RATIOS = 1e-6;

/** The largest |actual − expected|/(1 + |expected|) of numbers nested alike. */
function distance(actual: unknown, expected: unknown): number {
  if (Array.isArray(actual) && Array.isArray(expected)) {
    expect(actual.length).toBe(expected.length);
    return actual.reduce((most, value, k) => Math.max(most, distance(value, expected[k])), 0);
  }
  if (typeof actual !== "number" || typeof expected !== "number") throw new TypeError(`${actual} against ${expected}`);
  return Math.abs(actual - expected) / (1 + Math.abs(expected));
}

function near(actual: unknown, expected: unknown, bound: number, what = "") {
  expect(distance(actual, expected), what).toBeLessThan(bound);
}

/** A block as rows by good, or as one number a good. */
function block(finding: SystemFinding, name: string, what: "estimate" | "standardError" = "estimate") {
  const rows = finding.fitted.goods.map((good) =>
    finding.coefficients.filter((one) => one.block === name && one.good === good).map((one) => one[what]),
  );
  return rows.every(({ length }) => length === 1) ? rows.flat() : rows;
}

let data: PreparedData;
const sources = Object.fromEntries(demoStudy().cells.map(({ name, source }) => [name, source]));
const fitted = (source: string) => runSystem(specificationOf("system", source), data);

beforeAll(async () => {
  const { upload } = demoStudy();
  const { table } = await readCsv(bytesOf(upload.csv, 65_536), upload.name);
  data = runData(specificationOf("data", sources.survey), table);
});

const WHERE: Record<string, string> = {
  base: "base point",
  mean: "mean",
  quantile: "{x: quantile 0.9}",
  row: `{row: ${reference.first}}`,
  own: "{prices: {Grains: 6, Dairy: 9, Produce: 7.5, Meat & fish: 30, Sweet drinks: 6, Other food: 12}, x: 200}",
};
const PARTS = ["share", "quantity", "compensated"] as const;

function agreesAt(system: SystemFinding, place: string, expected: Record<string, unknown>) {
  const source = `system: base\nat: ${WHERE[place]}\n`;
  const found: SlutskyFinding = runSlutsky(specificationOf("slutsky", source), system, data);
  near(found.at.shares, expected.shares, CLOSE, "shares");
  for (const part of PARTS) {
    near(found.at[part], expected[part], CLOSE, part);
    near(found.at[`${part}Errors`], expected[`${part}Errors`], BY_DIFFERENCES, `${part} errors`);
  }
  const { expenditure, expenditureErrors } = elasticitiesAt(system.fitted, found.point);
  near(expenditure, expected.expenditure, CLOSE, "expenditure elasticities");
  near(expenditureErrors, expected.expenditureErrors, BY_DIFFERENCES, "their errors");
  if (found.at.eigenvalues.length > 0) {
    near(
      found.at.eigenvalues.map(({ value }) => value),
      expected.eigenvalues,
      CLOSE,
      "eigenvalues",
    );
    near(
      found.at.eigenvalues.map(({ standardError }) => standardError),
      expected.eigenvalueErrors,
      BY_DIFFERENCES,
      "their errors",
    );
  }
}

function agreesInFit(finding: SystemFinding, { fit }: { fit: Record<string, unknown> }) {
  expect(finding.freeCoefficients).toBe(fit.free);
  for (const measure of ["logLikelihood", "aic", "bic", "rSquared", "systemRSquared"] as const) {
    near(finding[measure], fit[measure], CLOSE, measure);
  }
}

interface Count {
  breaks: number;
  holds: number;
}
type Sample = Record<"negativity" | "monotonicity" | "regular", Count> & {
  byTenth: number[];
  richest: number;
  worst: { row: number[]; value: number[] };
};

/** Every row's largest eigenvalue by R's eigen. */
function agreesOverRows(system: SystemFinding, expected: Sample) {
  const { sample } = system.checks;
  for (const law of ["negativity", "monotonicity", "regular"] as const) {
    expect(sample?.[law]?.breaks, law).toBe(expected[law].breaks);
    near(sample?.[law]?.weightedShareThatHolds, expected[law].holds, CLOSE, law);
  }
  const matrix = runSlutsky(specificationOf("slutsky", "system: base\n"), system, data);
  expect(matrix.sample?.breaks).toBe(expected.negativity.breaks);
  expect(matrix.sample?.breaksInRichestTenth).toBe(expected.richest);
  near(matrix.sample?.byTenth, expected.byTenth, CLOSE, "by tenth");
  const worst = matrix.brokenRows.filter(({ breaks }) => breaks.includes("negativity")).slice(0, 5);
  expect(worst.map(({ row }) => row)).toEqual(expected.worst.row.slice(0, worst.length));
  near(
    worst.map(({ largestEigenvalue }) => largestEigenvalue),
    expected.worst.value.slice(0, worst.length),
    CLOSE,
  );
}

function agreesInTests(
  { tests }: SystemFinding,
  { homogeneity, symmetry }: Record<string, Record<string, number>>,
  laitinen: boolean,
) {
  expect(tests.map(({ restriction }) => restriction)).toEqual(["homogeneity", "symmetry given homogeneity"]);
  for (const [at, expected] of [homogeneity, symmetry].entries()) {
    near(tests[at].statistic, expected.statistic, RATIOS);
    expect(tests[at].degreesOfFreedom).toBe(expected.df);
    near(tests[at].pValue, expected.p, RATIOS);
    near(tests[at].corrected.statistic, expected.corrected, RATIOS);
    near(tests[at].corrected.pValue, expected.correctedP, RATIOS);
  }
  expect(tests[0].exact === undefined).toBe(!laitinen);
  if (!laitinen) return;
  near(tests[0].exact?.tSquared, homogeneity.tSquared, RATIOS);
  near(tests[0].exact?.f, homogeneity.f, RATIOS);
  near(tests[0].exact?.pValue, homogeneity.fP, RATIOS);
  expect(tests[0].exact?.approximate).toBe(true);
}

describe("the rows used and their means", () => {
  it("are those counted in R", () => {
    const { accounting, priceScale, totalScale, goods } = data.finding;
    expect(accounting.used).toBe(reference.rows);
    expect(accounting.leftOut.map(({ count }) => count)).toEqual(Object.values(reference.leftOut));
    near(priceScale, Object.values(reference.priceScale), CLOSE);
    near(totalScale, reference.totalScale, CLOSE);
    near(
      goods.map(({ meanShare }) => meanShare),
      Object.values(reference.meanShares),
      CLOSE,
    );
  });
});

describe("weighted LA-AIDS with demographics agrees with systemfit on scaled rows", () => {
  const impositions = { unrestricted: "[]", homogeneity: "[homogeneity]", both: "[homogeneity, symmetry]" };
  const under = (impose: string) => fitted(sources.linear.replace(/impose: .*/, `impose: ${impose}`));

  it.each(Object.entries(impositions))("%s", (name, impose) => {
    const expected = reference.laAids[name];
    const finding = under(impose);
    const rows = finding.fitted.goods
      .slice(0, -1)
      .map((good) => finding.coefficients.filter((one) => one.good === good));
    near(
      rows.map((row) => row.map(({ estimate }) => estimate)),
      expected.coefficients,
      CLOSE,
    );
    near(
      rows.map((row) => row.map(({ standardError }) => standardError)),
      expected.errors,
      CLOSE,
    );
    agreesInFit(finding, expected);
    agreesInTests(finding, reference.laAids.tests, true);
  });

  it.each(["base", "mean", "row"])("in the matrix at the %s", (place) => {
    agreesAt(under(impositions.both), place, reference.laAids.both.points[place]);
  });

  it("in negativity and monotonicity row by row", () =>
    agreesOverRows(under(impositions.both), reference.laAids.both.sample));
});

describe("weighted AIDS with demographics agrees with a general optimiser", () => {
  let finding: SystemFinding;
  const expected = reference.aids.both;
  beforeAll(() => {
    finding = fitted(sources.base);
  });

  it("in coefficients, standard errors and fit", () => {
    for (const [name, key] of [
      ["alpha", "alpha"],
      ["demographic", "demographics"],
      ["gamma", "gamma"],
      ["beta", "beta"],
    ]) {
      near(block(finding, name), expected[key], CLOSE, name);
      near(block(finding, name, "standardError"), expected[`${key}Errors`], BY_DIFFERENCES, `${name} errors`);
    }
    agreesInFit(finding, expected);
  });

  it("in its tests", () => agreesInTests(finding, reference.aids.tests, false));

  it.each(Object.keys(WHERE))("in the matrix at the %s", (place) => agreesAt(finding, place, expected.points[place]));

  it("in negativity and monotonicity row by row", () => agreesOverRows(finding, expected.sample));

  it("in its Engel curves", () => {
    near(finding.engel.logTotal, expected.engel.logTotal, CLOSE);
    near(finding.engel.shares, expected.engel.shares, CLOSE);
  });

  it("in an unrestricted fit and its matrix, which states no negativity", () => {
    const free = fitted(sources.base.replace(/impose: .*/, "impose: []"));
    agreesInFit(free, reference.aids.unrestricted);
    near(block(free, "gamma"), reference.aids.unrestricted.gamma, CLOSE);
    agreesAt(free, "mean", reference.aids.unrestricted.points.mean);
    expect(free.checks.negativity).toEqual({ stated: false });
    expect(free.checks.sample?.negativity).toBeUndefined();
  });
});

describe("the weighted linear expenditure system agrees with a general optimiser", () => {
  let finding: SystemFinding;
  const expected = reference.les;
  beforeAll(() => {
    finding = fitted(sources.needs);
  });

  it("in coefficients, standard errors and fit", () => {
    near(block(finding, "committed"), expected.committed, CLOSE);
    near(block(finding, "committed", "standardError"), expected.committedErrors, BY_DIFFERENCES);
    near((block(finding, "marginal") as number[]).slice(0, -1), expected.marginal, CLOSE);
    near(
      (block(finding, "marginal", "standardError") as number[]).slice(0, -1),
      expected.marginalErrors,
      BY_DIFFERENCES,
    );
    agreesInFit(finding, expected);
  });

  it.each(["mean", "own"])("in the matrix at the %s", (place) => agreesAt(finding, place, expected.points[place]));

  it("in negativity and monotonicity row by row", () => agreesOverRows(finding, expected.sample));
});
