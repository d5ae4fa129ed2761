import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { type CoefficientForm, linearForm } from "../../../../server/engine/estimation/coefficient-form.ts";
import { accumulateMoments, momentsRequest } from "../../../../server/engine/estimation/index.ts";
import { minimise } from "../../../../server/engine/estimation/minimise.ts";
import { equalWeights } from "../../../../server/engine/estimation/weighting.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import { estimated, systemOver } from "../../../support/estimating.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";

const SYMMETRIC = { form: "aids", impose: ["homogeneity", "symmetry"] };

function sample(rows = 120, goods = 3, demographics = 0): PreparedData {
  return simulateShares({ form: "aids", goods, rows, random: seededRandom(2), noise: 0.02, demographics }).data;
}

function refusalOf(work: () => unknown): string {
  try {
    work();
  } catch (error) {
    expect(error).toBeInstanceOf(Refusal);
    return (error as Refusal).message;
  }
  throw new Error("nothing was refused");
}

function placesOf(work: () => unknown) {
  try {
    work();
  } catch (error) {
    return (error as Refusal).problems.map(({ key, column }) => ({ key, column }));
  }
  throw new Error("nothing was refused");
}

describe("singular moments name the columns", () => {
  it("and the key at which they are mended", () => {
    const data = sample(120, 3, 1);
    const rural = Float64Array.from({ length: data.rows }, () => 0.1);
    const numeric = new Map([...data.numeric, ["rural", rural]]);
    expect(placesOf(() => estimated({ ...data, numeric }, SYMMETRIC))).toEqual([
      { key: ["demographics"], column: "rural" },
    ]);
    const logPrices = [data.logPrices[0], data.logPrices[1], data.logPrices[0]];
    expect(placesOf(() => estimated({ ...data, logPrices }, { form: "la-aids" }))[0]).toEqual({ key: ["data"] });
    const constant = data.shares[0].map(() => 0.1);
    const shares = [constant, data.shares[1], data.shares[1].map((share) => 0.9 - share)];
    expect(placesOf(() => estimated({ ...data, shares }, SYMMETRIC))[0]).toEqual({ key: ["data"] });
  });

  const reductions = ["reflected", "summed"] as const;

  it.each(reductions)("a price that follows from others (%s)", (reduction) => {
    const data = sample();
    const follows = data.logPrices[0].map((value, t) => 0.5 * value + 2 * data.logPrices[1][t] + 0.1);
    const logPrices = [data.logPrices[0], data.logPrices[1], follows];
    for (const form of ["aids", "la-aids"]) {
      const message = refusalOf(() => estimated({ ...data, logPrices }, { form }, reduction));
      expect(message).toMatch(/The moments are singular/);
      expect(message).toMatch(/exact linear combination of/);
      for (const good of ["good 1", "good 2", "good 3"]) expect(message).toContain(`ln price of ${good}`);
    }
  });

  it.each(reductions)("a demographic that never changes, one that repeats another (%s)", (reduction) => {
    const data = sample(120, 3, 1);
    const rural = Float64Array.from({ length: data.rows }, () => 0.1);
    const constant = { ...data, numeric: new Map([...data.numeric, ["rural", rural]]) };
    expect(refusalOf(() => estimated(constant, SYMMETRIC, reduction))).toContain("rural is constant");
    const twice = {
      ...data,
      numeric: new Map([...data.numeric, ["again", data.numeric.get("z1")!.map((z) => 3 * z)]]),
    };
    expect(refusalOf(() => estimated(twice, SYMMETRIC, reduction))).toContain(
      "again is an exact linear combination of z1",
    );
  });

  it("prices that are all constant, for the linear expenditure system", () => {
    const data = sample();
    const logPrices = data.logPrices.map((column, i) => column.map(() => 0.3 * i));
    expect(refusalOf(() => estimated({ ...data, logPrices }, { form: "les" }))).toMatch(
      /price of good 2 over total expenditure is an exact linear combination of price of good 1 over total expenditure/,
    );
  });

  it("but a constant price is no obstacle to a homogeneous system, and only the test against none imposed is left out", () => {
    const data = sample();
    const logPrices = [data.logPrices[0], data.logPrices[1], data.logPrices[2].map(() => 0)];
    const finding = estimated({ ...data, logPrices }, SYMMETRIC);
    expect(finding.tests.map((test) => test.restriction)).toEqual(["symmetry given homogeneity"]);
    expect(refusalOf(() => estimated({ ...data, logPrices }, { form: "aids" }))).toContain(
      "ln price of good 3 is constant",
    );
  });
});

describe("too little data", () => {
  it("fewer rows than the coefficients need: both numbers", () => {
    const message = refusalOf(() => estimated(sample(7, 4), SYMMETRIC));
    expect(message).toContain("7 rows");
    expect(message).toContain("12 free coefficients in 3 equations need at least 8");
  });

  it("a share that never varies, zero or not, whichever equation is dropped", () => {
    const data = sample();
    const { shares } = data;
    const rest = (level: number) => shares[0].map((share) => 1 - level - 0.5 * share);
    const half = shares[0].map((share) => 0.5 * share);
    for (const level of [0, 0.1]) {
      const constant = shares[0].map(() => level);
      for (const [place, arranged] of [
        [1, [constant, half, rest(level)]],
        [2, [half, constant, rest(level)]],
        [3, [half, rest(level), constant]],
      ] as const) {
        for (const form of ["aids", "la-aids", "les"]) {
          const message = refusalOf(() => estimated({ ...data, shares: [...arranged] }, { form }));
          expect(message).toContain(
            `the share of good ${place} is ${level === 0 ? "0" : "0.1000"} in all 120 rows used`,
          );
        }
      }
    }
  });

  it("residuals of one equation that follow from those of the others", () => {
    const data = sample(120, 4);
    const [first, second] = data.shares;
    const shares = [first, second, first.map((share, t) => 0.5 * (1 - share - second[t]) + 0.1 * (share - second[t]))];
    shares.push(first.map((_, t) => 1 - shares[0][t] - shares[1][t] - shares[2][t]));
    const message = refusalOf(() => estimated({ ...data, shares }, { form: "la-aids", index: "laspeyres" }));
    expect(message).toMatch(/singular: the residuals of the share of good 3 are a linear combination/);
  });
});

describe("a specification the data do not fit", () => {
  it("names the dropped good and the demographic", () => {
    const data = sample(120, 3, 1);
    expect(refusalOf(() => estimated(data, { ...SYMMETRIC, dropped: "bread" }))).toContain('"bread"');
    expect(refusalOf(() => momentsRequest(systemOver(data, { form: "aids", demographics: ["age"] }), data))).toContain(
      '"age"',
    );
    const gaps = { ...data, numeric: new Map(), incomplete: new Map([["age", { missing: 3, firstRow: 17 }]]) };
    expect(refusalOf(() => momentsRequest(systemOver(gaps, { form: "aids", demographics: ["age"] }), gaps))).toContain(
      'demographics names "age", which has no value in 3 of the 120 rows used, first in row 17',
    );
  });
});

describe("no convergence", () => {
  const data = sample();
  const moments = accumulateMoments(data, momentsRequest(systemOver(data, { form: "la-aids" }), data), QUIET);
  const places = Array.from({ length: 5 }, (_, term) => [0, term] as const);
  const right = linearForm(3, 5, places);

  it("says after how many iterations, with which gradient and condition number", () => {
    const uphill: CoefficientForm = {
      ...right,
      derivatives: (free) => right.derivatives(free).map((entries) => entries.map(([e, t, v]) => [e, t, -v] as const)),
    };
    const estimation = { moments, form: uphill, equations: [0], coefficientLabels: places.map(String) };
    const criterion = { kind: "weighted", weight: equalWeights(1, false) } as const;
    const message = refusalOf(() => minimise(estimation, criterion, [0, 0, 0, 0, 0], QUIET));
    expect(message).toMatch(/did not converge: after 1 iterations the largest gradient .* condition number \d/);
  });

  it("is cancelled between iterations and between chunks of rows", () => {
    const control = { ...QUIET, cancelled: () => true };
    const estimation = { moments, form: right, equations: [0], coefficientLabels: places.map(String) };
    const criterion = { kind: "weighted", weight: equalWeights(1, false) } as const;
    expect(() => minimise(estimation, criterion, [0, 0, 0, 0, 0], control)).toThrow(Cancelled);
    const request = momentsRequest(systemOver(data, SYMMETRIC), data);
    expect(() => accumulateMoments(data, request, control)).toThrow(Cancelled);
  });
});
