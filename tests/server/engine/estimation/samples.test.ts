import { describe, expect, it } from "vitest";
import { demographicColumn, withTimeTerms } from "../../../../server/engine/columns/seasonal-terms.ts";
import { momentsRequest } from "../../../../server/engine/estimation/request.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import { systemSpecification } from "../../../../shared/schemas/system.ts";
import { estimated, systemOver } from "../../../support/estimating.ts";
import { inPeriods } from "../../../support/periods.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";

function problemsOf(run: () => unknown) {
  try {
    run();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    return error.problems;
  }
  throw new Error("nothing was refused");
}

const simulated = (rows = 60, goods = 3) =>
  simulateShares({ form: "les", goods, rows, random: seededRandom(3), noise: 0.02 }).data;
const periods = (rows = 60) => inPeriods(simulated(rows), seededRandom(4));
const requested = (keys: object, data = periods()) => momentsRequest(withTimeTerms(systemOver(data, keys), data), data);

describe("rows in the order of time", () => {
  it.each([
    [{ form: "la-aids", index: "lagged stone" }, ["index"], "The lagged Stone index"],
    [{ form: "la-aids", differences: true }, ["differences"], "A system in differences"],
    [{ form: "rotterdam" }, ["form"], "The Rotterdam system"],
  ])(
    "are needed by %j and refused under its key without a time column, or with two rows at one time",
    (keys, key, what) => {
      const [none] = problemsOf(() => requested(keys, simulated()));
      expect(none).toMatchObject({
        key,
        sentence: expect.stringContaining(`${what} needs the rows in the order of time`),
      });
      const data = periods();
      const time = data.time!.slice();
      const [one, other] = [time.indexOf(7), time.indexOf(8)];
      time[other] = 7;
      const [tied] = problemsOf(() => requested(keys, { ...data, time }));
      const [first, second] = [one + 1, other + 1].sort((a, b) => a - b);
      expect(tied).toEqual({
        key,
        row: second,
        sentence: `${what} needs one row a period: 60 rows used share 59 different times, first rows ${first} and ${second}.`,
      });
    },
  );

  it("are not needed by a season or a trend", () => {
    const data = { ...periods(), time: Float64Array.from({ length: 60 }, (_, t) => 1 + (t % 12)) };
    expect(requested({ form: "la-aids", season: { period: 4 }, trend: true }, data).demographics).toEqual([
      "trend",
      "season 1 of 4",
      "season 2 of 4",
      "season 3 of 4",
    ]);
  });
});

describe("Rotterdam", () => {
  it("refuses quantities that have no log: how many, and the first row", () => {
    const data = periods();
    const shares = data.shares.map((share) => share.slice());
    for (const row of [11, 30]) {
      shares[0][row] += shares[1][row];
      shares[1][row] = 0;
    }
    const [problem] = problemsOf(() => estimated({ ...data, shares }, { form: "rotterdam" }));
    expect(problem.sentence).toBe(
      "The Rotterdam system needs the log of every quantity, and nothing of good 2 is bought in 2 of the 60 rows used, first in row 12.",
    );
    expect(problem).toMatchObject({ key: ["form"], row: 12 });
  });

  it("keeps the observed mean shares, uses T − 1 rows and says so", () => {
    const data = periods();
    const { fitted, rows, equations } = estimated(data, { form: "rotterdam", impose: ["homogeneity", "symmetry"] });
    const [mean] = data.shares.map((share) => share.reduce((sum, value) => sum + value, 0) / 60);
    expect(fitted.meanShares![0]).toBeCloseTo(mean, 14);
    expect(rows).toBe(59);
    expect(equations).toEqual({ explains: "contributions to volume", leftOut: 1, because: ["differences"], gaps: 0 });
  });
});

describe("terms of time", () => {
  it("are centred at their weighted means and follow the time, not the order of the rows", () => {
    const data = { ...periods(), weights: Float64Array.from({ length: 60 }, (_, t) => (t % 2 === 0 ? 1.5 : 0.5)) };
    for (const name of ["trend", "season 2 of 4", "season sine 1 of 12", "season cosine 6 of 12"]) {
      const column = demographicColumn(data, name)!;
      const mean = column.reduce((sum, value, t) => sum + data.weights[t] * value, 0) / 60;
      expect(Math.abs(mean)).toBeLessThan(1e-13);
    }
    const trend = demographicColumn(data, "trend")!;
    expect(trend[data.time!.indexOf(9)] - trend[data.time!.indexOf(3)]).toBeCloseTo(6, 12);
    const dummy = demographicColumn(data, "season 2 of 4")!;
    expect(dummy[data.time!.indexOf(6)] - dummy[data.time!.indexOf(7)]).toBeCloseTo(1, 12);
    expect(demographicColumn(data, "season sine 1")).toBeUndefined();
  });

  it("are two for every pair of waves, and one for the shortest", () => {
    const { demographics } = requested({ form: "les", season: { period: 4, harmonics: 2 } });
    expect(demographics).toEqual(["season sine 1 of 4", "season cosine 1 of 4", "season cosine 2 of 4"]);
  });

  it("are refused under their keys: no time, fewer periods than a round, a time in pieces, a name taken", () => {
    const refused = (keys: object, data = periods()) => problemsOf(() => requested({ form: "la-aids", ...keys }, data));
    expect(refused({ trend: true }, simulated())[0]).toMatchObject({ key: ["trend"] });
    expect(refused({ season: { period: 4 } }, simulated())[0]).toMatchObject({ key: ["season"] });
    expect(refused({ season: { period: 61 } })[0]).toEqual({
      key: ["season", "period"],
      sentence: "One round of the seasons is 61 periods, and the data have 60: shorten period, or leave season out.",
    });
    const halves = { ...periods(), time: periods().time!.map((value) => value / 2) };
    expect(refused({ season: { period: 4 } }, halves)[0].sentence).toMatch(/in row \d+ the time is \d+\.5/);
    const taken = { ...periods(), numeric: new Map([["trend", new Float64Array(60)]]) };
    expect(refused({ demographics: [], trend: true }, taken)[0]).toMatchObject({ key: ["trend"] });
  });
});

describe("keys that do not fit the form", () => {
  const issueOf = (keys: object) => {
    const parsed = systemSpecification.safeParse({ kind: "system", data: "d", ...keys });
    return parsed.error?.issues.map(({ path, message }) => `${path.join(".")}: ${message}`);
  };
  it.each([
    [{ form: "aids", errors: "expenditures" }, "errors: errors belongs to les; those of aids stand on one thing only"],
    [
      { form: "rotterdam", differences: true },
      "differences: rotterdam explains changes already: leave differences out",
    ],
    [
      { form: "aids", differences: true },
      "differences: differences belongs to la-aids: the price index of aids holds coefficients, so its changes are not linear in them",
    ],
    [
      { form: "aids", season: { period: 4, harmonics: 3 } },
      "season.harmonics: harmonics is 3; a season of 4 periods has at most 2",
    ],
  ])("%j", (keys, issue) => {
    expect(issueOf(keys)).toEqual([issue]);
  });
});

describe("the linear expenditure system", () => {
  it("needs as many rows as a combination of its equations has coefficients", () => {
    // Of four goods a combination of three shares has two weights, four committed quantities and a marginal share: seven rows fit.
    const [problem] = problemsOf(() => estimated(simulated(7, 4), { form: "les" }));
    expect(problem.sentence).toBe("The data have 7 rows used; 7 free coefficients in 3 equations need at least 8.");
    expect(estimated(simulated(8, 4), { form: "les" }).rows).toBe(8);
  });

  it("returns the coefficients the data were made from, demographics and either errors", () => {
    const { data, theta } = simulateShares({
      form: "les",
      goods: 4,
      rows: 80,
      random: seededRandom(8),
      noise: 0,
      demographics: 2,
    });
    for (const errors of ["shares", "expenditures"]) {
      const { fitted } = estimated(data, { form: "les", errors });
      fitted.theta.forEach((value, a) => {
        expect(Math.abs(value - theta[a])).toBeLessThan(1e-9);
      });
    }
  });
});
