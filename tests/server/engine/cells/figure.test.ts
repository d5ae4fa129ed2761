import { beforeAll, describe, expect, it } from "vitest";
import { runElasticities, runFigure, runPriceChange, runSystem } from "../../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import { type DrawnOf, type FigureName, figureFinding } from "../../../../shared/schemas/figure.ts";
import type { PriceChangeFinding } from "../../../../shared/schemas/price-change.ts";
import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { systemOf } from "../../../../shared/systems/index.ts";
import { tableCsv } from "../../../../shared/tables/csv.ts";
import { figureTable } from "../../../../shared/tables/figure.ts";
import { figureSentence } from "../../../../shared/tables/figure-words.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

const BOTH = "impose: [homogeneity, symmetry]";
const FIFTHS = "groups: {of: total expenditure, quantiles: 5}";
let data: PreparedData;
let system: SystemFinding;
let free: SystemFinding;
let levy: PriceChangeFinding;
beforeAll(async () => {
  data = await tunaWeeks("time: week");
  system = runSystem(specificationOf("system", `data: weeks\nform: aids\n${BOTH}`), data);
  free = runSystem(specificationOf("system", "data: weeks\nform: aids"), data);
  const levied = `system: base\nprices: {brand1: {per cent: 10}}\n${FIFTHS}`;
  levy = runPriceChange(specificationOf("price change", levied), system, data);
});

const KEYS = { system: "base", data: "weeks", "price change": "levy" };
function figure<S extends FigureName>(
  show: S,
  keys = "",
  of: keyof typeof KEYS = "system",
  basis: SystemFinding | PriceChangeFinding = system,
) {
  const specification = specificationOf("figure", `${of}: ${KEYS[of]}\nshow: ${show}\n${keys}`);
  const finding = runFigure(specification, of === "data" ? undefined : basis, data);
  // What is sent over a wire and what every schema lets through is what was found.
  expect(figureFinding.parse(JSON.parse(JSON.stringify(finding)))).toEqual(finding);
  return { finding, drawn: finding.drawn as DrawnOf<S> };
}

function refused(run: () => unknown): string {
  try {
    run();
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
  throw new Error("nothing was refused");
}

const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;

describe("figures of a system", () => {
  it("draw Engel curves in the units uploaded, of the goods named in the data's order", () => {
    const { drawn, finding } = figure("engel curves", "goods: [brand3, brand1]");
    expect(drawn.curves.map(({ good }) => good)).toEqual(["brand1", "brand3"]);
    expect(drawn.totals).toHaveLength(41);
    const sorted = data.logTotal.toSorted();
    expect(drawn.totals[0]).toBeCloseTo(Math.exp(sorted[Math.ceil(0.01 * data.rows) - 1]) * data.totalScale, 6);
    expect(drawn.leftOut).toEqual({ points: 0, of: 41 });
    expect(finding.pointName).toBe("mean");
    expect(figureSentence(finding)).toMatch(/^The predicted share of brand\d .* at prices of the sample mean\.$/);
  });

  it("draw demand through the point, and the table says so to the last digit", () => {
    const { drawn, finding } = figure("demand curve", "goods: [brand2]");
    const at = drawn.prices.indexOf(drawn.here.price);
    expect(drawn.here.price).toBeCloseTo(system.points.mean.prices[1] * data.priceScale[1], 12);
    expect(drawn.uncompensated.values[at]).toBe(drawn.here.quantity);
    expect(drawn.compensated?.values[at]).toBeCloseTo(drawn.here.quantity, 6);
    const csv = tableCsv(figureTable(finding));
    for (const value of drawn.uncompensated.values) expect(csv).toContain(String(value));
    for (const end of drawn.compensated?.high ?? []) expect(csv).toContain(String(end));
  });

  it("draw the elasticities that an elasticities cell finds", () => {
    const { drawn } = figure("elasticities", FIFTHS);
    const found = runElasticities(specificationOf("elasticities", `system: base\n${FIFTHS}`), system, data);
    expect(drawn.groups.map(({ name }) => name)).toEqual(found.groups.map(({ name }) => name));
    found.groups.forEach((group, g) => {
      expect(drawn.groups[g].expenditure).toEqual(group.expenditure);
      expect(drawn.groups[g].own.low).toEqual(group.uncompensated.low.map((row, i) => row[i]));
      expect(drawn.groups[g].ownCompensated.values).toEqual(group.compensated.values.map((row, i) => row[i]));
    });
  });

  it("draw the fit in bins whose means are the sample's, every row in one of them", () => {
    const { drawn } = figure("fit of shares");
    const evaluated = systemOf(system.fitted);
    const predicted = [...data.logTotal].map((logTotal, t) => {
      const prices = data.logPrices.map((column) => Math.exp(column[t]));
      const point = { prices, total: Math.exp(logTotal), demographics: [] };
      return evaluated.system.slopes(system.fitted.theta, evaluated.size, point).shares;
    });
    drawn.goods.forEach(({ bins }, i) => {
      expect(bins).toHaveLength(10);
      expect(bins.reduce((sum, { rows }) => sum + rows, 0)).toBe(data.rows);
      const over = (of: (bin: (typeof bins)[number]) => number) =>
        bins.reduce((sum, bin) => sum + bin.weightShare * of(bin), 0);
      const observed = mean([...data.shares[i]]);
      expect(over(({ observed: { value } }) => value)).toBeCloseTo(observed, 12);
      expect(over(({ predicted }) => predicted)).toBeCloseTo(mean(predicted.map((shares) => shares[i])), 12);
      expect(bins.map(({ predicted }) => predicted)).toEqual(
        bins.map(({ predicted }) => predicted).toSorted((a, b) => a - b),
      );
    });
  });

  it("draw the largest eigenvalue, and refuse it where negativity is not stated", () => {
    const { drawn, finding } = figure("largest eigenvalue");
    expect(drawn.totals.length + drawn.leftOut.points).toBe(41);
    expect(figureSentence(finding)).toMatch(/^Negativity (holds|breaks)/);
    expect(refused(() => figure("largest eigenvalue", "", "system", free))).toMatch(/Without homogeneity/);
  });

  it("say that a system in differences predicts no shares", () => {
    const rotterdam = runSystem(specificationOf("system", `data: weeks\nform: rotterdam\n${BOTH}`), data);
    for (const show of ["engel curves", "fit of shares", "largest eigenvalue"] as const) {
      expect(refused(() => figure(show, "", "system", rotterdam))).toMatch(/^There are no .*: /);
    }
  });

  it("carry the verdicts and cautions of the system beneath", () => {
    const { finding } = figure("engel curves");
    expect(finding.checks).toEqual(system.checks);
    expect(finding.tests).toEqual(system.tests);
    expect(finding.standardErrors).toBe("conventional");
  });

  it("stop when they are told to", () => {
    const specification = specificationOf("figure", "system: base\nshow: engel curves");
    expect(() => runFigure(specification, system, data, { ...QUIET, cancelled: () => true })).toThrow(Cancelled);
  });

  it("are refused for a good that is not there", () => {
    expect(refused(() => figure("engel curves", "goods: [brand9]"))).toBe(
      "There is no good brand9; the goods are brand1, brand2, brand3, brand4, brand5, brand6, brand7.",
    );
  });
});

describe("a figure of a price change", () => {
  it("draws what its own cell found, group by group", () => {
    const { drawn, finding } = figure("incidence", "", "price change", levy);
    expect(drawn.groups.map(({ share }) => share)).toEqual(
      levy.incidence?.groups.map(({ welfareShare }) => welfareShare?.compensating),
    );
    expect(drawn.all.amount).toEqual(levy.incidence?.all.welfare?.compensating);
    expect(finding.checks).toEqual(levy.checks);
    expect(figureTable(finding).notes[0]).toMatch(/no substitute for the responsible office/);
  });

  it("is refused where the rows are parted into no groups", () => {
    const alone = runPriceChange(
      specificationOf("price change", "system: base\nprices: {brand1: {per cent: 10}}"),
      system,
      data,
    );
    expect(refused(() => figure("incidence", "", "price change", alone))).toMatch(/into no groups/);
  });
});

describe("figures of data", () => {
  it("draw weighted mean shares by tenth unless groups are named", () => {
    const { drawn } = figure("shares by group", "", "data");
    expect(drawn.groups).toHaveLength(10);
    drawn.goods.forEach((_, i) => {
      const whole = drawn.groups.reduce((sum, { rows, shares }) => sum + rows * shares.values[i], 0) / data.rows;
      expect(whole).toBeCloseTo(mean([...data.shares[i]]), 12);
    });
    // Of rows drawn independently: √(Σ (w − w̄)²)/m.
    const lowest = [...data.logTotal.keys()].sort((a, b) => data.logTotal[a] - data.logTotal[b]);
    const own = lowest.slice(0, drawn.groups[0].rows).map((t) => data.shares[0][t]);
    const squares = own.reduce((sum, share) => sum + (share - mean(own)) ** 2, 0);
    expect(drawn.groups[0].shares.errors[0]).toBeCloseTo(Math.sqrt(squares) / own.length, 12);
  });

  it("sum within clusters before they square", () => {
    const codes = Int32Array.from({ length: data.rows }, (_, t) => t % 2);
    const clustered = { ...data, clusters: { column: "half", codes, labels: ["0", "1"] } };
    const specification = specificationOf(
      "figure",
      "data: weeks\nshow: shares by group\ngroups: {of: total expenditure, quantiles: 2}",
    );
    const { drawn, standardErrors } = runFigure(specification, undefined, clustered);
    const [lower] = (drawn as DrawnOf<"shares by group">).groups;
    const order = [...data.logTotal.keys()].sort((a, b) => data.logTotal[a] - data.logTotal[b]).slice(0, lower.rows);
    const away = (cluster: number) =>
      order.reduce((sum, t) => sum + (t % 2 === cluster ? data.shares[0][t] - lower.shares.values[0] : 0), 0);
    expect(lower.shares.errors[0]).toBeCloseTo(Math.hypot(away(0), away(1)) / order.length, 12);
    expect(standardErrors).toBe("of means, clustered by half, 2 clusters");
  });

  it("draw how prices are spread, and show no household's own at the ends", () => {
    const { drawn } = figure("price distribution", "goods: [brand1]", "data");
    expect(drawn.shares.reduce((sum, part) => sum + part, drawn.below + drawn.above)).toBeCloseTo(1, 12);
    const prices = data.logPrices[0].map((log) => Math.exp(log) * data.priceScale[0]);
    const inside = prices.filter((price) => price >= drawn.edges[3] && price < drawn.edges[4]).length;
    expect(drawn.shares[3]).toBeCloseTo(inside / data.rows, 12);
    expect(drawn.edges[0]).toBeGreaterThan(Math.min(...prices));
    expect(drawn.edges[30]).toBeLessThan(Math.max(...prices));
    expect(drawn.below).toBeGreaterThan(0);
  });
});
