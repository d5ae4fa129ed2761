import { beforeAll, describe, expect, test } from "vitest";
import { runElasticities, runSystem } from "../../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import { elasticitiesAt } from "../../../../shared/economics/elasticities.ts";
import { percentileInterval } from "../../../../shared/economics/percentile.ts";
import type { ElasticitiesFinding, ElasticityGroup } from "../../../../shared/schemas/elasticities.ts";
import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { elasticityNotes } from "../../../../shared/tables/elasticity-words.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

/** Weeks of tuna purchases by season and by a half of the file that few weeks are in. */
const KEYS =
  "time: week\nderive: {quarter: 'floor(week / 50)', late: 'week > 395', parity: 'week / 2 == floor(week / 2)'}";
const ROUNDING = 1e-10;

let data: PreparedData;
const systems: Record<string, SystemFinding> = {};
const BOTH = "impose: [homogeneity, symmetry]";

beforeAll(async () => {
  data = await tunaWeeks(KEYS);
  const estimate = (name: string, keys: string) => {
    systems[name] = runSystem(specificationOf("system", `data: d\n${keys}\n`), data);
  };
  estimate("aids", `form: aids\n${BOTH}`);
  estimate("stone", `form: la-aids\nindex: stone\n${BOTH}`);
  estimate("les", "form: les");
  estimate("rotterdam", `form: rotterdam\n${BOTH}`);
  estimate("bootstrap", `form: la-aids\n${BOTH}\nstandard errors: {bootstrap: rows, replicates: 40}`);
});

const run = (keys: string, name = "aids", control = QUIET): ElasticitiesFinding =>
  runElasticities(specificationOf("elasticities", `system: s\n${keys}\n`), systems[name], data, control);

const sum = (entries: readonly number[]) => entries.reduce((total, entry) => total + entry, 0);

function expectIdentities({ shares, expenditure, uncompensated, compensated }: ElasticityGroup, symmetric: boolean) {
  expect(Math.abs(sum(shares) - 1)).toBeLessThan(ROUNDING);
  expect(Math.abs(sum(shares.map((share, i) => share * expenditure.values[i])) - 1)).toBeLessThan(ROUNDING);
  shares.forEach((share, j) => {
    const column = sum(shares.map((other, i) => other * uncompensated.values[i][j]));
    expect(Math.abs(column + share)).toBeLessThan(ROUNDING);
    expect(Math.abs(sum(uncompensated.values[j]) + expenditure.values[j])).toBeLessThan(ROUNDING);
    expect(Math.abs(sum(compensated.values[j]))).toBeLessThan(ROUNDING);
    for (let i = 0; i < j && symmetric; i++) {
      const gap = shares[i] * compensated.values[i][j] - share * compensated.values[j][i];
      expect(Math.abs(gap)).toBeLessThan(ROUNDING);
    }
  });
}

describe("one point", () => {
  test("is the mean unless said otherwise, with exact standard errors and intervals of the level", () => {
    const { groups, checks } = run("level: 0.9");
    const expected = elasticitiesAt(systems.aids.fitted, systems.aids.points.mean);
    expect(groups).toHaveLength(1);
    expect(groups[0]).toMatchObject({ name: "mean", shares: expected.shares });
    expect(groups[0].expenditure.values).toEqual(expected.expenditure);
    expect(groups[0].compensated.errors).toEqual(expected.compensatedErrors);
    const { low, high, errors } = groups[0].expenditure;
    // 1.6448536… is the normal quantile of 0.95.
    expect((high[0] - low[0]) / errors[0]).toBeCloseTo(2 * 1.6448536269514722, 10);
    expect(checks.pointName).toBe("mean");
  });

  test("a row, its own observed shares, a quantile, and prices of one's own", () => {
    const row = run("at: {row: 5}\nshares: observed").groups[0];
    expect(row.shares).toEqual(data.shares.map((column) => column[4]));
    expect(run("at: {x: quantile 0.9}").groups[0].total).toBeGreaterThan(run("at: mean").groups[0].total);
    const prices = data.goods.map((good, i) => `${good}: ${data.priceScale[i]}`).join(", ");
    const own = run(`at: {prices: {${prices}}, x: ${data.totalScale}}`).groups[0];
    expect(own.expenditure.values[0]).toBeCloseTo(run("at: base point").groups[0].expenditure.values[0], 12);
  });

  test("where a predicted share is not positive nothing is divided by it", () => {
    const prices = data.goods.map((good, i) => `${good}: ${data.priceScale[i]}`).join(", ");
    expect(() => run(`at: {prices: {${prices}}, x: ${data.totalScale * 1e9}}`)).toThrow(
      /^At a point of one's own: The predicted share of brand\d is −\d+\.\d{4} there/,
    );
  });

  test("observed shares are refused where none are observed", () => {
    expect(() => specificationOf("elasticities", "system: s\nat: {x: quantile 0.5}\nshares: observed")).toThrow(
      "shares are observed in rows, and none at this point",
    );
  });
});

describe("groups", () => {
  const options = ["", "over: rows", "shares: observed", "over: rows\nshares: observed"];

  test.each(options)("quantiles part all rows into equal weights, and every identity holds in each: %s", (option) => {
    for (const name of ["aids", "stone", "les", "rotterdam"]) {
      const { groups, without } = run(`groups: {of: total expenditure, quantiles: 4}\n${option}`, name);
      expect(without).toEqual([]);
      expect(groups.map((group) => group.name)).toEqual([
        "lowest quarter",
        "second quarter",
        "third quarter",
        "highest quarter",
      ]);
      expect(sum(groups.map(({ rows = 0 }) => rows))).toBe(data.rows);
      expect(sum(groups.map(({ weightShare = 0 }) => weightShare))).toBeCloseTo(1, 12);
      // With observed shares the exact systems' compensated elasticities are not those of a cost function.
      const symmetric = !option.includes("observed") || name === "stone" || name === "rotterdam";
      for (const group of groups) expectIdentities(group, symmetric);
    }
  });

  test("at the group's mean point: geometric means of prices and total", () => {
    const { groups } = run("groups: {of: quarter}");
    const [first] = groups;
    expect(first.name).toMatch(/^quarter = \d+$/);
    const rows = Array.from(data.numeric.get("quarter")!.entries())
      .filter(([, value]) => `quarter = ${value}` === first.name)
      .map(([t]) => t);
    const mean = (column: Float64Array) => Math.exp(sum(rows.map((t) => column[t])) / rows.length);
    const point = { prices: data.logPrices.map(mean), total: mean(data.logTotal), demographics: [] };
    const expected = elasticitiesAt(systems.aids.fitted, point);
    expect(first.rows).toBe(rows.length);
    expect(first.total).toBeCloseTo(point.total * data.totalScale, 6);
    expected.expenditure.forEach((value, i) => {
      expect(first.expenditure.values[i]).toBeCloseTo(value, 12);
    });
  });

  test("over the rows: the average of the rows' elasticities by what each spends on the good", () => {
    const { groups } = run("over: rows");
    expect(groups).toHaveLength(1);
    const rows = Array.from({ length: data.rows }, (_, t) => ({
      prices: data.logPrices.map((column) => Math.exp(column[t])),
      total: Math.exp(data.logTotal[t]),
      demographics: [],
    }));
    const found = rows.map((point) => ({ point, at: elasticitiesAt(systems.aids.fitted, point) }));
    data.goods.forEach((_, i) => {
      const spent = found.map(({ point, at }) => point.total * at.shares[i]);
      const average = sum(found.map(({ at }, t) => spent[t] * at.uncompensated[i][i])) / sum(spent);
      expect(groups[0].uncompensated.values[i][i]).toBeCloseTo(average, 10);
    });
  });

  test("a small group is named, and so is a good that some row has no positive share of", () => {
    const finding = run("groups: {of: late}\nover: rows");
    const small = finding.groups.filter(({ rows = 0 }) => rows < 30);
    expect(small).toHaveLength(1);
    expect(elasticityNotes(finding).join(" ")).toContain(
      `Fewer than 30 rows: ${small[0].name}, ${small[0].rows} rows.`,
    );
  });

  test("rows in which a predicted share is not positive are counted by good, and leave the group defined", () => {
    const { fitted } = systems.aids;
    // A brand with less to begin with is predicted below nought in some weeks, the next one has what it lost.
    const lowest = data.shares.map((column) => sum(Array.from(column)));
    const good = lowest.indexOf(Math.min(...lowest));
    const other = (good + 1) % data.goods.length;
    const theta = fitted.theta.map((entry, a) => (a === good ? entry - 0.02 : a === other ? entry + 0.02 : entry));
    const shifted = { ...systems.aids, fitted: { ...fitted, theta } };
    const below = Array.from({ length: data.rows }, (_, t) => t).filter((t) => {
      const point = {
        prices: data.logPrices.map((column) => Math.exp(column[t])),
        total: Math.exp(data.logTotal[t]),
        demographics: [],
      };
      return elasticitiesAt(shifted.fitted, point).shares[good] <= 0;
    }).length;
    expect(below).toBeGreaterThan(0);
    const told = runElasticities(specificationOf("elasticities", "system: s\nover: rows"), shifted, data);
    expect(told.groups[0].notPositive).toContainEqual({ good: data.goods[good], rows: below });
    expectIdentities(told.groups[0], true);
    expect(elasticityNotes(told).join(" ")).toContain(`${data.goods[good]} in ${below} row`);
  });

  test.each([
    ["groups: {of: nothing}", /no column of the data/],
    ["groups: {of: total expenditure}", "Total expenditure has as many values as rows: give quantiles"],
    ["groups: {of: week}", "week has 338 different values, and at most 24 are groups: give quantiles beside it."],
    [
      "groups: {of: parity, quantiles: 5}",
      /^No row falls into the .* fifth of parity, which has 2 different values in 338/,
    ],
  ])("%s is refused", (keys, sentence) => {
    expect(() => run(keys)).toThrow(sentence);
  });

  test("can be cancelled", () => {
    const control = { ...QUIET, cancelled: () => true };
    expect(() => run("over: rows", "aids", control)).toThrow(Cancelled);
    expect(() => run("groups: {of: quarter}", "aids", control)).toThrow(Cancelled);
  });
});

describe("Stone's index", () => {
  test("may move with the shares, which changes what it says, and in no other system", () => {
    const [held] = run("at: mean", "stone").groups;
    const [exact] = run("at: mean\nindex: exact", "stone").groups;
    expectIdentities(exact, false);
    expect(exact.expenditure.values[0]).not.toBeCloseTo(held.expenditure.values[0], 4);
    expect(elasticityNotes(run("index: exact", "stone")).join(" ")).toContain("Green and Alston 1990");
    for (const name of ["aids", "bootstrap", "les"]) {
      expect(() => run("index: exact", name)).toThrow("index: exact lets the weights of Stone's index in la-aids move");
    }
  });
});

test("a system in differences stands at observed shares, and its compensated responses do not move with them", () => {
  const { shares, groups } = run("groups: {of: total expenditure, quantiles: 2}", "rotterdam");
  expect(shares).toBe("observed");
  const [low, high] = groups.map((group) =>
    group.compensated.values.map((row, i) => row.map((e) => e * group.shares[i])),
  );
  low.forEach((row, i) => {
    row.forEach((entry, j) => {
      expect(entry).toBeCloseTo(high[i][j], 12);
    });
  });
});

test("intervals are the bootstrap's own percentiles where the system has draws", () => {
  const { intervals, groups, standardErrors } = run("at: base point", "bootstrap");
  expect([intervals, standardErrors]).toEqual(["percentile", "bootstrap of rows, 40 replicates, seed 1"]);
  const { fitted, bootstrap, points } = systems.bootstrap;
  const drawn = bootstrap!.draws!.map((theta) => elasticitiesAt({ ...fitted, theta }, points.base).expenditure[2]);
  const [low, high] = percentileInterval(drawn, 0.95);
  expect(groups[0].expenditure.low[2]).toBeCloseTo(low, 12);
  expect(groups[0].expenditure.high[2]).toBeCloseTo(high, 12);
});

test.each(["over: rows", "over: rows\nshares: observed", "groups: {of: late}\nover: rows"])(
  "over the rows they are percentiles of the same averages at every draw (%s)",
  (keys) => {
    const { intervals, groups } = run(keys, "bootstrap");
    expect(intervals).toBe("percentile");
    const { bootstrap, fitted } = systems.bootstrap;
    const asked = specificationOf("elasticities", `system: s\n${keys}\n`);
    const drawn = bootstrap!.draws!.map((theta) => {
      const { bootstrap: _, ...alone } = { ...systems.bootstrap, fitted: { ...fitted, theta: [...theta] } };
      return runElasticities(asked, alone, data).groups;
    });
    groups.forEach((group, g) => {
      const [low, high] = percentileInterval(drawn.map((at) => at[g].compensated.values[1][2]));
      expect(group.compensated.low[1][2]).toBeCloseTo(low, 12);
      expect(group.compensated.high[1][2]).toBeCloseTo(high, 12);
    });
  },
);
