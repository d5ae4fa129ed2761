import { beforeAll, describe, expect, it, test } from "vitest";
import { runPriceChange, runSystem } from "../../../../server/engine/cells/index.ts";
import { pointOfRow } from "../../../../server/engine/cells/points.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import { changeAt } from "../../../../shared/economics/price-change/change-at.ts";
import { type HouseholdMeasures, householdMeasures } from "../../../../shared/economics/price-change/household.ts";
import { standardError } from "../../../../shared/numerics/matrix.ts";
import type { IncidenceGroup, PriceChangeFinding } from "../../../../shared/schemas/price-change.ts";
import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

const BOTH = "impose: [homogeneity, symmetry]";
/** Weeks by season; a made-up scale that differs from week to week. */
const KEYS = "time: week\nderive: {quarter: 'floor(week / 50)', adults: '1 + week / 100', late: 'week > 395'}";

let data: PreparedData;
beforeAll(async () => {
  data = await tunaWeeks(KEYS);
});

const SYSTEMS = {
  aids: `form: aids\n${BOTH}`,
  quaids: `form: quaids\n${BOTH}`,
  les: "form: les",
  free: "form: aids",
  linear: `form: la-aids\n${BOTH}`,
  rotterdam: `form: rotterdam\n${BOTH}`,
  bootstrap: `form: les\nstandard errors: {bootstrap: rows, replicates: 40}`,
} as const;
type Name = keyof typeof SYSTEMS;

const estimates = new Map<Name, SystemFinding>();
/** Each estimated once, by the first test that asks for it. */
function systemOf(name: Name): SystemFinding {
  const known = estimates.get(name) ?? runSystem(specificationOf("system", `data: d\n${SYSTEMS[name]}\n`), data);
  estimates.set(name, known);
  return known;
}

const run = (keys: string, name: Name = "aids", control = QUIET): PriceChangeFinding =>
  runPriceChange(specificationOf("price change", `system: s\n${keys}\n`), systemOf(name), data, control);

const LEVY = "prices: {brand1: {ad valorem: 20, pass-through: 0.8}, brand3: {specific: 0.2}}";

/** What the finding tells of rows, the slow way: each by itself, and summed in the plainest order. */
function slowly(name: Name, finding: PriceChangeFinding, rows: readonly number[]) {
  const { fitted } = systemOf(name);
  const each = rows.map((t) =>
    householdMeasures(
      { fitted, derivatives: true },
      pointOfRow(data, fitted.demographics, t),
      data.shares.map((column) => column[t]),
      finding.question,
      data.priceScale,
    ),
  );
  const mean = (
    of: (one: HouseholdMeasures) => { value: number; gradient: readonly number[] } | undefined,
    scale: number,
  ) => {
    const found = each.map((one) => of(one)!);
    const gradient = fitted.theta.map((_, a) => found.reduce((sum, one) => sum + one.gradient[a], 0) / rows.length);
    const value = found.reduce((sum, one) => sum + one.value, 0) / rows.length;
    return { value: scale * value, error: scale * standardError(fitted.covariance, gradient) };
  };
  return { mean, expenditure: rows.reduce((sum, t) => sum + Math.exp(data.logTotal[t]), 0) / rows.length };
}

/** Relative 1e-10, of sums of hundreds of numbers of one size. */
function expectSame(found: { value: number; error: number } | undefined, expected: { value: number; error: number }) {
  expect(Math.abs(found!.value - expected.value) / Math.max(1, Math.abs(expected.value))).toBeLessThan(1e-10);
  expect(Math.abs(found!.error - expected.error) / Math.max(1, expected.error)).toBeLessThan(1e-8);
}

function expectGroup(group: IncidenceGroup, name: Name, finding: PriceChangeFinding, rows: readonly number[]) {
  const { mean, expenditure } = slowly(name, finding, rows);
  const { totalScale, priceScale } = data;
  expect(group.rows).toBe(rows.length);
  expectSame({ value: group.expenditure, error: 0 }, { value: expenditure * totalScale, error: 0 });
  expectSame(
    group.welfare?.compensating,
    mean((one) => one.compensating, totalScale),
  );
  expectSame(
    group.welfare?.equivalent,
    mean((one) => one.equivalent, totalScale),
  );
  expectSame(
    group.welfareShare?.equivalent,
    mean((one) => one.equivalent, 1 / expenditure),
  );
  expectSame(
    group.secondOrder,
    mean((one) => one.secondOrder, totalScale),
  );
  expectSame(
    group.tax?.revenue,
    mean((one) => one.tax.revenue, totalScale),
  );
  expectSame(
    group.tax?.paidByBuyers,
    mean((one) => one.tax.paidByBuyers, totalScale),
  );
  finding.fitted.goods.forEach((_, i) => {
    const unit = totalScale / priceScale[i];
    const change = mean((one) => one.change[i], unit);
    expectSame({ value: group.quantityChange.values[i], error: group.quantityChange.errors[i] }, change);
    const substitution = mean((one) => one.substitution?.[i], unit);
    expectSame({ value: group.substitution!.values[i], error: group.substitution!.errors[i] }, substitution);
  });
}

describe("who bears a change", () => {
  it.each(["aids", "quaids", "les"] as const)("is of %s what every row by itself adds up to", (name) => {
    const finding = run(`${LEVY}\nexpenditure: 1`, name);
    const { all, groups, without, derivativeRows } = finding.incidence!;
    expect({ groups, without, derivativeRows }).toEqual({ groups: [], without: [], derivativeRows: undefined });
    expect(all.notDefined).toBeUndefined();
    expectGroup(all, name, finding, [...data.logTotal.keys()]);
  });

  it("is told by group, and the groups add up to all", () => {
    const finding = run(`${LEVY}\ngroups: {of: quarter}`);
    const { all, groups } = finding.incidence!;
    const quarter = data.numeric.get("quarter")!;
    const members = [...data.logTotal.keys()].filter((t) => quarter[t] === 2);
    expect(groups.map(({ name }) => name)).toContain("quarter = 2");
    expectGroup(groups.find(({ name }) => name === "quarter = 2")!, "aids", finding, members);
    const together = (of: (group: IncidenceGroup) => number) =>
      groups.reduce((sum, group) => sum + group.weightShare * of(group), 0);
    expect(together(() => 1)).toBeCloseTo(1, 12);
    for (const of of ["compensating", "equivalent"] as const) {
      const total = together((group) => group.welfare![of].value);
      expect(Math.abs(total / all.welfare![of].value - 1)).toBeLessThan(1e-12);
    }
    expect(Math.abs(together((group) => group.tax!.revenue.value) / all.tax!.revenue.value - 1)).toBeLessThan(1e-12);
  });

  it("is told by expenditure per equivalent adult, declared or by the square root of members", () => {
    const groups = "groups: {of: expenditure per equivalent adult, quantiles: 5}";
    const declared = run(`${LEVY}\n${groups}\nequivalence scale: adults`).incidence!;
    expect(declared.groups.map(({ name }) => name)).toEqual(
      ["lowest", "second", "third", "fourth", "highest"].map((which) => `${which} fifth`),
    );
    const adults = data.numeric.get("adults")!;
    const mean = (needs: (t: number) => number) =>
      (data.totalScale * data.logTotal.reduce((sum, logTotal, t) => sum + Math.exp(logTotal) / needs(t), 0)) /
      data.rows;
    expect(declared.all.perAdult! / mean((t) => adults[t])).toBeCloseTo(1, 12);
    const root = run(`${LEVY}\n${groups}\nequivalence scale: {square root of: adults}`).incidence!;
    expect(root.all.perAdult! / mean((t) => Math.sqrt(adults[t]))).toBeCloseTo(1, 12);
    const rising = declared.groups.map(({ perAdult }) => perAdult!);
    expect(rising).toEqual(rising.toSorted((a, b) => a - b));
  });

  it("weighs rows as the data do", () => {
    const weights = Float64Array.from(data.logTotal, (_, t) => 1 + (t % 3));
    const weighted = { ...data, weights };
    const { all } = runPriceChange(specificationOf("price change", `system: s\n${LEVY}\n`), systemOf("aids"), weighted)
      .incidence!;
    const doubled = [...data.logTotal.keys()].flatMap((t) => Array.from({ length: 1 + (t % 3) }, () => t));
    const { mean } = slowly("aids", run(LEVY), doubled);
    expectSame(
      all.welfare?.equivalent,
      mean((one) => one.equivalent, data.totalScale),
    );
    expectSame(
      all.tax?.revenue,
      mean((one) => one.tax.revenue, data.totalScale),
    );
  });

  it("has an excess burden, EV less what buyers pay, where taxes alone change", () => {
    const { tax, welfare } = run(LEVY).incidence!.all;
    expect(tax!.excessBurden!.value).toBeCloseTo(welfare!.equivalent.value - tax!.paidByBuyers.value, 8);
    expect(tax!.revenue.value).toBeGreaterThan(tax!.paidByBuyers.value);
    const mixed = run("prices: {brand1: {ad valorem: 20}, brand3: {per cent: 10}}");
    expect(mixed.incidence!.all.tax!.excessBurden).toBeUndefined();
    expect(mixed.at.tax!.noExcessBurden).toBe("The price of brand3 changes too, and not by a tax.");
    expect(run("prices: {brand3: {per cent: 10}}").at.tax).toBeUndefined();
  });
});

describe("rows without an answer", () => {
  /** So much is committed that some weeks spend less, before or after the change. */
  const needy = (): SystemFinding => {
    const { fitted } = systemOf("les");
    const theta = fitted.theta.map((entry, a) => (a < fitted.goods.length ? 0.1 : entry));
    return { ...systemOf("les"), fitted: { ...fitted, theta } };
  };

  it("are counted and named, and in none of the means", () => {
    const finding = runPriceChange(specificationOf("price change", `system: s\n${LEVY}\n`), needy(), data);
    const { all, brokenRows: named, namedRows } = finding.incidence!;
    const { fitted } = needy();
    const answers = [...data.logTotal.keys()].map((t) =>
      householdMeasures(
        { fitted, derivatives: false },
        pointOfRow(data, [], t),
        data.shares.map((column) => column[t]),
        finding.question,
        data.priceScale,
      ),
    );
    const without = [...data.logTotal.keys()].filter((t) => answers[t].compensating === undefined);
    expect(without.length).toBeGreaterThan(0);
    expect(all.notDefined).toMatchObject({ rows: without.length });
    expect(all.notDefined!.weightedShare).toBeCloseTo(without.length / data.rows, 12);
    const told = named.filter(({ notDefined }) => notDefined !== undefined);
    expect(told.map(({ row }) => row)).toEqual(without.map((t) => data.rowNumbers[t]));
    expect(told[0].notDefined).toContain("is not defined");
    expect(namedRows).toBeGreaterThanOrEqual(without.length);
    const within = answers.filter(({ compensating }) => compensating !== undefined);
    const mean = within.reduce((sum, one) => sum + one.compensating!.value, 0) / within.length;
    expect(Math.abs((all.welfare!.compensating.value / data.totalScale - mean) / mean)).toBeLessThan(1e-10);
  });

  it("are, where a share leaves 0 to 1, in the means as they are, and named with the share", () => {
    const { all, brokenRows: named } = run("prices: {brand1: {per cent: 60}}").incidence!;
    expect(all.outside.household + all.outside.system).toBeGreaterThan(0);
    const [worst] = named;
    expect(worst.notDefined).toBeUndefined();
    for (const { share } of worst.outside) expect(share < 0 || share > 1).toBe(true);
    const size = (row: (typeof named)[number]) =>
      Math.max(...row.outside.map(({ share }) => Math.max(-share, share - 1)));
    const sizes = named.map(size);
    expect(sizes).toEqual(sizes.toSorted((a, b) => b - a));
  });

  it("are a refusal where there is no other", () => {
    const nothingLeft = specificationOf("price change", `system: s\n${LEVY}\nexpenditure: -99\n`);
    expect(() => runPriceChange(nothingLeft, needy(), data)).toThrow(
      /^No row has an answer: .*the utility after the change, or its cost at the prices before, is not defined\.$/,
    );
  });
});

describe("a system that lacks something", () => {
  it.each([
    ["linear", "no cost function"],
    ["free", "homogeneity is not imposed"],
  ] as const)("%s has quantities and the second-order variation, and says why there is no more", (name, why) => {
    const { at, incidence } = run(LEVY, name);
    expect(at.absent).toContain(why.charAt(0) === "h" ? "Homogeneity is not imposed" : why);
    expect(at.hicks ?? at.welfare ?? at.quantities.hicks).toBeUndefined();
    expect(at.quantities.after?.values).toHaveLength(data.goods.length);
    expect(at.slutsky).toBeDefined();
    expect(at.tax?.revenue.value).toBeGreaterThan(0);
    expect(at.tax?.noExcessBurden).toBeDefined();
    expect(incidence!.all.secondOrder.value).toBeGreaterThan(0);
    expect(incidence!.all.welfare ?? incidence!.all.substitution).toBeUndefined();
  });

  it("rotterdam predicts no shares: differentials and the second-order variation alone", () => {
    const { at, incidence, noIncidence } = run(LEVY, "rotterdam");
    expect(noIncidence).toContain("has no level of shares to predict");
    expect(incidence ?? at.total ?? at.slutsky ?? at.quantities.after ?? at.tax).toBeUndefined();
    expect(at.secondOrder.value).toBeGreaterThan(0);
    expect(at.infinitesimal.substitution.values).toHaveLength(data.goods.length);
  });
});

describe("the point", () => {
  it("is answered by the function that a browser calls too, to the last bit", () => {
    const { fitted, point, question, priceScale, totalScale, level, at } = run(`${LEVY}\nat: {row: 5}`);
    const again = changeAt(fitted, point, question, { priceScale, totalScale, level });
    expect(JSON.parse(JSON.stringify(again))).toEqual(at);
  });

  it.each([
    ["mean", "mean"],
    ["base point", "base point"],
    ["{row: 5}", "row 5"],
    ["{x: quantile 0.9}", "quantile 0.9 of expenditure"],
  ])("may be %s", (at, pointName) => {
    expect(run(`${LEVY}\nat: ${at}`).pointName).toBe(pointName);
  });

  it("has percentile intervals of the bootstrap's draws where there are some", () => {
    const { at, intervals } = run(LEVY, "bootstrap");
    expect(intervals).toBe("percentile");
    expect(at.draws).toBe(40);
    const { value, low, high, error } = at.welfare!.equivalent;
    expect(low).toBeLessThan(value);
    expect(high).toBeGreaterThan(value);
    expect(high - low).toBeLessThan(8 * error);
    expect(low + high - 2 * value).not.toBe(0);
  });

  it("is warned of where a new price lies outside the sample's, with both numbers", () => {
    const { unseen, priceRange, at, incidence } = run("prices: {brand1: {per cent: 100}, brand2: {per cent: 1}}");
    expect(unseen).toEqual([{ good: "brand1", price: at.pricesAfter[0], bound: priceRange.high[0], side: "above" }]);
    const dearest = data.logPrices[0].reduce((most, logPrice) => Math.max(most, logPrice), -Infinity);
    expect(priceRange.high[0]).toBeCloseTo(Math.exp(dearest) * data.priceScale[0], 10);
    const above = data.logPrices[0].filter((logPrice) => 2 * Math.exp(logPrice) > Math.exp(dearest)).length;
    const [first] = incidence!.unseen;
    expect(first).toMatchObject({ good: "brand1", side: "above", rows: above });
    expect(first.price / (2 * priceRange.high[0])).toBeCloseTo(1, 12);
  });
});

describe("refusals", () => {
  const problems = (keys: string, name: Name = "aids") => {
    try {
      run(keys, name);
    } catch (error) {
      if (error instanceof Refusal) return error.problems;
      throw error;
    }
    return [];
  };

  test("name the good, the column or the row, and the key", () => {
    expect(problems("prices: {brand9: {to: 2}}")).toMatchObject([
      { sentence: expect.stringContaining("no good brand9"), key: ["prices", "brand9"] },
    ]);
    expect(problems("equivalence scale: adlts")).toMatchObject([
      {
        sentence: "The data have no column of numbers adlts to be an equivalence scale. The nearest is adults.",
        key: ["equivalence scale"],
      },
    ]);
    expect(problems("equivalence scale: {square root of: late}")).toMatchObject([
      {
        sentence: expect.stringContaining("late is 0 in row 1,"),
        key: ["equivalence scale", "square root of"],
        row: 1,
      },
    ]);
    expect(problems("groups: {of: nothing}")).toMatchObject([{ key: ["groups", "of"] }]);
    expect(problems("at: {row: 999}")).toMatchObject([{ key: ["at", "row"], row: 999 }]);
    expect(problems("prices: {brand1: {specific: -5}}")[0].sentence).toMatch(
      /the subsidy takes the price of brand1 from 0\.\d+ to -4\.\d+/,
    );
  });

  test("stop when told to", () => {
    const control = { progress() {}, cancelled: () => true };
    expect(() => run(LEVY, "aids", control)).toThrow(Cancelled);
  });
});
