import { beforeAll, describe, expect, it } from "vitest";
import { runSystem } from "../../../../server/engine/cells/index.ts";
import { pointOfRow } from "../../../../server/engine/cells/points.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import { matrixAt } from "../../../../shared/economics/slutsky.ts";
import { systemFinding } from "../../../../shared/schemas/system.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

const AIDS = specificationOf("system", "data: weeks\nform: aids\nimpose: [homogeneity, symmetry]");
const FREE = specificationOf("system", "data: weeks\nform: la-aids");
let data: PreparedData;
let weighted: PreparedData;
beforeAll(async () => {
  data = await tunaWeeks();
  weighted = await tunaWeeks("weight: week\nkeep: week > 40");
});

describe("runSystem", () => {
  it.each(["la-aids", "aids", "quaids", "les"])("gives a finding of %s that its schema takes as it is", (form) => {
    const finding = runSystem(specificationOf("system", `data: weeks\nform: ${form}\nimpose: [homogeneity]`), data);
    expect(systemFinding.parse(JSON.parse(JSON.stringify(finding)))).toEqual(finding);
  });

  it("checks every row as the matrix at that row says", () => {
    for (const prepared of [data, weighted]) {
      const { fitted, checks } = runSystem(AIDS, prepared);
      const rows = Array.from({ length: prepared.rows }, (_, t) => {
        const options = { priceScale: prepared.priceScale, totalScale: prepared.totalScale, pointName: `row ${t}` };
        return matrixAt(fitted, pointOfRow(prepared, [], t), options).checks;
      });
      const weightOf = (t: number) => prepared.weights?.[t] ?? 1;
      const all = rows.reduce((sum, _, t) => sum + weightOf(t), 0);
      const held = (holds: (row: (typeof rows)[number]) => boolean | undefined) =>
        rows.reduce((sum, row, t) => sum + (holds(row) ? weightOf(t) : 0), 0) / all;
      expect(checks.sample?.negativity?.breaks).toBe(rows.filter(({ negativity }) => !negativity.holds).length);
      expect(checks.sample?.monotonicity.breaks).toBe(rows.filter(({ monotonicity }) => !monotonicity.holds).length);
      expect(checks.sample?.negativity?.weightedShareThatHolds).toBeCloseTo(
        held((row) => row.negativity.holds),
        12,
      );
      expect(checks.sample?.monotonicity.weightedShareThatHolds).toBeCloseTo(
        held((row) => row.monotonicity.holds),
        12,
      );
      expect(checks.sample?.regular?.weightedShareThatHolds).toBeCloseTo(
        held((row) => row.negativity.holds && row.monotonicity.holds),
        12,
      );
    }
  });

  it("states negativity nowhere without homogeneity", () => {
    const { checks } = runSystem(FREE, data);
    expect(checks.negativity.stated).toBe(false);
    expect(checks.sample).toEqual({ rows: 338, monotonicity: checks.sample?.monotonicity });
  });

  it("of data not normalised, speaks of the mean, and says what makes units matter", async () => {
    const asUploaded = await tunaWeeks("normalise: none");
    const found = (source: string) => runSystem(specificationOf("system", `data: weeks\n${source}`), asUploaded);
    const les = found("form: les");
    expect(les.checks.pointName).toBe("mean");
    // The linear expenditure system is the same in any units, and so is what it says at the mean.
    const normalised = runSystem(specificationOf("system", "data: weeks\nform: les"), data);
    const options = { priceScale: data.priceScale, totalScale: data.totalScale, pointName: "mean" };
    const { eigenvalues } = matrixAt(normalised.fitted, normalised.points.mean, options);
    expect(les.checks.negativity.largest).toBeCloseTo(eigenvalues[0].value, 8);
    expect(les.unitsMatterBy).toBeUndefined();
    expect(found("form: aids").unitsMatterBy).toBe("a fixed α₀");
    expect(found("form: la-aids\nindex: stone").unitsMatterBy).toBe("Stone's index");
    expect(found("form: la-aids").unitsMatterBy).toBeUndefined();
    expect(runSystem(AIDS, data)).not.toHaveProperty("unitsMatterBy");
    expect(runSystem(AIDS, data).checks.pointName).toBe("base point");
  });

  it("stands at the base point and at the geometric mean", () => {
    const { points } = runSystem(AIDS, weighted);
    expect(points.base).toEqual({ prices: [1, 1, 1, 1, 1, 1, 1], total: 1, demographics: [] });
    const h = weighted.weights!;
    const mean = (column: Float64Array) =>
      column.reduce((sum, value, t) => sum + h[t] * value, 0) / h.reduce((a, b) => a + b, 0);
    expect(Math.log(points.mean.total)).toBeCloseTo(mean(weighted.logTotal), 12);
    for (const [j, price] of points.mean.prices.entries()) {
      expect(Math.log(price)).toBeCloseTo(mean(weighted.logPrices[j]), 12);
    }
  });

  it("gives elasticities that satisfy Engel aggregation, with errors of the matrix's own coefficients", () => {
    const { fitted, expenditureElasticities } = runSystem(AIDS, data);
    const at = { prices: data.goods.map(() => 1), total: 1, demographics: [] };
    const { shares, totalSlopes } = matrixAt(fitted, at, {
      priceScale: at.prices,
      totalScale: 1,
      pointName: "base point",
    });
    const engel = expenditureElasticities.reduce((sum, { estimate }, i) => sum + shares[i] * estimate, 0);
    expect(engel).toBeCloseTo(1, 12);
    expenditureElasticities.forEach(({ estimate, standardError }, i) => {
      expect(estimate).toBeCloseTo(1 + totalSlopes[i] / shares[i], 12);
      expect(standardError).toBeGreaterThan(0);
    });
  });

  it("draws Engel curves whose shares sum to one, from the 1st to the 99th percentile", () => {
    const { engel } = runSystem(AIDS, data);
    expect(engel.logTotal).toHaveLength(25);
    for (const i of engel.logTotal.keys()) {
      expect(engel.shares.reduce((sum, curve) => sum + curve[i], 0)).toBeCloseTo(1, 12);
    }
    const sorted = [...data.logTotal].sort((a, b) => a - b);
    expect([engel.logTotal[0], engel.logTotal[24]]).toEqual([sorted[3], sorted[334]]);
  });

  it("reads the rows once for all specifications that need the same moments", async () => {
    const fresh = await tunaWeeks();
    const stepsOf = (specification: typeof AIDS) => {
      const steps = new Set<string>();
      const found = runSystem(specification, fresh, {
        progress: ({ step }) => void steps.add(step),
        cancelled: () => false,
      });
      return { found, steps: [...steps] };
    };
    const first = stepsOf(AIDS);
    expect(first.steps).toContain("accumulating moments");
    expect(stepsOf({ ...AIDS, impose: [] }).steps).not.toContain("accumulating moments");
    expect(first.found).toEqual(runSystem(AIDS, data));
  });

  it("finds the same to the last digit whatever was estimated before", async () => {
    const [one, other] = [await tunaWeeks(), await tunaWeeks()];
    const alone = runSystem(AIDS, one);
    runSystem({ ...AIDS, impose: [] }, other);
    expect(runSystem(AIDS, other)).toEqual(alone);
    expect(runSystem(AIDS, other)).toEqual(alone);
  });

  it("stops when told to", () => {
    let asked = 0;
    expect(() => runSystem(AIDS, data, { ...QUIET, cancelled: () => asked++ > 5 })).toThrow(Cancelled);
  });

  it("refuses fewer rows than coefficients with both numbers", async () => {
    const few = await tunaWeeks("keep: week <= 8");
    expect(() => runSystem(AIDS, few)).toThrow(
      /have 8 rows used; 33 free coefficients in 6 equations need at least \d+/,
    );
  });
});
