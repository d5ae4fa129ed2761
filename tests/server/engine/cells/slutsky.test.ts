import { beforeAll, describe, expect, it } from "vitest";
import { runSlutsky, runSystem } from "../../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import { slutskyFinding } from "../../../../shared/schemas/slutsky.ts";
import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

let data: PreparedData;
let system: SystemFinding;
let free: SystemFinding;
beforeAll(async () => {
  data = await tunaWeeks("time: week\nkeep: week != 7 and week <= 330");
  system = runSystem(specificationOf("system", "data: weeks\nform: aids\nimpose: [homogeneity, symmetry]"), data);
  free = runSystem(specificationOf("system", "data: weeks\nform: aids"), data);
});

const at = (point: string, fitted = system) =>
  runSlutsky(specificationOf("slutsky", `system: base\nat: ${point}`), fitted, data);
function refusal(point: string): Refusal {
  try {
    at(point);
  } catch (error) {
    if (error instanceof Refusal) return error;
    throw error;
  }
  throw new Error("nothing was refused");
}

describe("where a matrix stands", () => {
  it.each([
    ["base point", "base point"],
    ["mean", "mean"],
    ["{row: 5}", "row 5"],
    ["{x: quantile 0.9}", "quantile 0.9 of expenditure"],
    [
      "{prices: {brand1: 1, brand2: 1, brand3: 1, brand4: 1, brand5: 1, brand6: 2, brand7: 1}, x: 30000}",
      "a point of one's own",
    ],
  ])("%s is called %s", (point, name) => {
    const finding = at(point);
    expect(finding.pointName).toBe(name);
    expect(finding.at.checks.pointName).toBe(name);
    expect(slutskyFinding.parse(JSON.parse(JSON.stringify(finding)))).toEqual(finding);
  });

  it("in units uploaded, mean prices and mean total are the base point", () => {
    const prices = data.goods.map((good, i) => `${good}: ${data.priceScale[i]}`).join(", ");
    const own = at(`{prices: {${prices}}, x: ${data.totalScale}}`);
    expect(own.at.share).toEqual(at("base point").at.share);
  });

  it("a row is its own prices and total", () => {
    // Row 8 of the file is the seventh row used: row 7 is left out.
    const { point } = at("{row: 8}");
    expect(point.prices).toEqual(data.logPrices.map((column) => Math.exp(column[6])));
    expect(point.total).toBe(Math.exp(data.logTotal[6]));
  });

  it("a quantile is that of total expenditure, at mean prices", () => {
    const { point } = at("{x: quantile 0.9}");
    const sorted = [...data.logTotal].sort((a, b) => a - b);
    expect(point.total).toBe(Math.exp(sorted[Math.ceil(0.9 * data.rows) - 1]));
    expect(point.prices).toEqual(system.points.mean.prices);
  });

  it("refuses a row that is left out, with its reason, and one that is not there", () => {
    expect(refusal("{row: 7}").problems).toEqual([
      {
        sentence: "Row 7 is not among the rows used: left out by keep: week != 7 and week <= 330.",
        key: ["at", "row"],
        row: 7,
      },
    ]);
    expect(refusal("{row: 339}").problems).toEqual([
      { sentence: "The upload has 338 rows; there is no row 339.", key: ["at", "row"], row: 339 },
    ]);
  });
});

describe("negativity over the sample", () => {
  it("counts what the system's own checks count", () => {
    const { sample, brokenRows, at: matrix } = at("base point");
    expect(matrix.checks.sample).toEqual(system.checks.sample);
    expect(sample?.breaks).toBe(system.checks.sample?.negativity?.breaks);
    const listed = (law: "negativity" | "monotonicity") =>
      brokenRows.filter(({ breaks }) => breaks.includes(law)).length;
    expect(listed("negativity")).toBe(system.checks.sample?.negativity?.breaks);
    expect(listed("monotonicity")).toBe(system.checks.sample?.monotonicity.breaks);
    expect(listed("negativity")).toBeGreaterThan(0);
  });

  it("names the rows as the upload counts them, the worst first", () => {
    const { brokenRows } = at("base point");
    for (const { row, total, largestEigenvalue } of brokenRows) {
      const finding = at(`{row: ${row}}`);
      expect(finding.at.eigenvalues[0].value).toBeCloseTo(largestEigenvalue ?? Number.NaN, 10);
      expect(finding.point.total * data.totalScale).toBeCloseTo(total, 6);
    }
    const eigenvalues = brokenRows
      .filter(({ breaks }) => breaks.includes("negativity"))
      .map((row) => row.largestEigenvalue ?? 0);
    expect(eigenvalues.toSorted((a, b) => b - a)).toEqual(eigenvalues);
  });

  it("draws a histogram that holds every row once and has an edge at nought", () => {
    const { sample } = at("base point");
    const { edges, shares } = sample!.histogram;
    expect(edges).toHaveLength(shares.length + 1);
    expect(shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 12);
    expect(edges).toContain(0);
    const above = shares.filter((_, i) => edges[i] >= 0).reduce((sum, share) => sum + share, 0);
    expect(above).toBeCloseTo(sample!.breaks / sample!.rows, 12);
  });

  it("parts the rows by tenths of expenditure", () => {
    const { sample } = at("base point");
    expect(sample?.byTenth).toHaveLength(10);
    const holding = sample!.byTenth.reduce((sum, share) => sum + share, 0) / 10;
    expect(holding).toBeCloseTo(1 - sample!.breaks / sample!.rows, 2);
  });

  it("is not stated without homogeneity; shares that leave their range still are", () => {
    const finding = at("base point", free);
    expect(finding.sample).toBeUndefined();
    expect(finding.at.eigenvalues).toEqual([]);
    expect(finding.brokenRows).toHaveLength(free.checks.sample?.monotonicity.breaks ?? -1);
    for (const row of finding.brokenRows) expect(row).toMatchObject({ breaks: ["monotonicity"] });
  });

  it("stops when told to", () => {
    const slutsky = specificationOf("slutsky", "system: base");
    expect(() => runSlutsky(slutsky, system, data, { ...QUIET, cancelled: () => true })).toThrow(Cancelled);
  });
});
