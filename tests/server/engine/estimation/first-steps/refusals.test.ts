import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../../../../server/engine/columns/prepared-data.ts";
import { Refusal } from "../../../../../server/engine/refusal.ts";
import { systemSpecification } from "../../../../../shared/schemas/system.ts";
import { estimated } from "../../../../support/estimating.ts";
import { endogenousShares } from "./endogenous.ts";

function refused(data: PreparedData, specification: object) {
  try {
    estimated(data, { form: "la-aids", demographics: [], ...specification });
  } catch (error) {
    if (error instanceof Refusal) return error.problems[0];
    throw error;
  }
  throw new Error("nothing was refused");
}

const { data } = endogenousShares({ rows: 200, demographics: 1 });
const withColumn = (values: Float64Array): PreparedData => ({
  ...data,
  numeric: new Map([...data.numeric, ["more", values]]),
});
const bought = (share: Float64Array): PreparedData => {
  const sums = data.shares[0].map((value, t) => 1 - value + share[t]);
  const shares = data.shares.map((column, i) => (i === 0 ? share : column).map((value, t) => value / sums[t]));
  return { ...data, shares };
};

describe("what a first stage cannot be made of is refused under instruments", () => {
  it.each([
    ["a column of that name is not there", data, ["earning"], /"earning".*no numeric column.*nearest is "earnings"/],
    ["it is named twice", data, ["earnings", "earnings"], /names "earnings" twice/],
    ["it never varies", withColumn(new Float64Array(200).fill(3)), ["more"], /more is constant over the rows used/],
    [
      "it follows from the others",
      withColumn(data.logPrices[0].map((value, t) => 2 * value - data.logPrices[1][t] + 1)),
      ["earnings", "more"],
      /instrument more is an exact linear combination/,
    ],
    [
      "it explains ln x without fail",
      withColumn(data.logTotal.map((value) => 1 + value)),
      ["more"],
      /explain ln total expenditure exactly/,
    ],
  ])("when %s", (_, rows, instruments, sentence) => {
    const problem = refused(rows, { instruments });
    expect(problem.sentence).toMatch(sentence);
    expect(problem.key).toEqual(["instruments"]);
  });

  it("when it is a demographic too", () => {
    const problem = refused(data, { demographics: ["z1"], instruments: ["z1"] });
    expect(problem).toMatchObject({ key: ["instruments"], column: "z1" });
    expect(problem.sentence).toContain("also a demographic");
  });

  it("when it has no value in some row", () => {
    const incomplete = { ...data, incomplete: new Map([["wage", { missing: 7, firstRow: 12 }]]) };
    expect(refused(incomplete, { instruments: ["wage"] })).toMatchObject({ key: ["instruments"], row: 12 });
  });
});

describe("what two steps cannot be made of is refused under zeros", () => {
  it("when every row buys everything", () => {
    expect(refused(data, { zeros: "two-step" })).toMatchObject({
      key: ["zeros"],
      sentence: expect.stringContaining("Every one of the 200 rows used buys all 3 goods"),
    });
  });

  it("when nobody buys a good", () => {
    const none = bought(new Float64Array(200));
    expect(refused(none, { zeros: "two-step" }).sentence).toMatch(/None of the 200 rows used buys good 1/);
  });

  it("when prices tell buyers from others without fail", () => {
    const split = bought(data.shares[0].map((value, t) => (data.logPrices[0][t] > 0.3 ? 0 : value)));
    const problem = refused(split, { zeros: "two-step" });
    expect(problem.sentence).toMatch(/probit of good 1 has no estimate.*rows used buy none, first row \d+/);
    expect(problem.row).toBe(data.rowNumbers[data.logPrices[0].findIndex((value) => value > 0.3)]);
  });

  it("when a column named is a constant", () => {
    const some = bought(data.shares[0].map((value, t) => (t % 3 === 0 ? 0 : value)));
    const rows = { ...some, numeric: new Map([...some.numeric, ["more", new Float64Array(200).fill(2)]]) };
    expect(refused(rows, { zeros: { "two-step": ["more"] } }).sentence).toMatch(/more of the probits is constant/);
  });
});

describe("keys that do not go together are refused before any row is read", () => {
  const issues = (specification: object) => {
    const parsed = systemSpecification.safeParse({ kind: "system", data: "survey", ...specification });
    return parsed.success ? [] : parsed.error.issues.map(({ path, message }) => `${path.join(".")}: ${message}`);
  };

  it.each([
    [{ form: "rotterdam", instruments: ["rent"] }, /^instruments: instruments belongs to systems in levels: rotterdam/],
    [{ form: "la-aids", differences: true, zeros: "two-step" }, /^zeros: zeros belongs to systems in levels/],
    [
      { form: "les", errors: "expenditures", instruments: ["rent"] },
      /^instruments: instruments belongs to equations of shares/,
    ],
    [{ form: "easi", instruments: ["rent"] }, /^instruments: instruments needs real expenditure: approximate/],
    [
      { form: "aids", instruments: ["rent"], zeros: "two-step" },
      /^instruments: instruments and zeros do not go together/,
    ],
  ])("%j", (specification, message) => {
    expect(issues(specification).some((issue) => message.test(issue))).toBe(true);
  });

  it("but go with approximate EASI", () => {
    expect(issues({ form: "easi", "real expenditure": "approximate", instruments: ["rent"] })).toEqual([]);
  });
});
