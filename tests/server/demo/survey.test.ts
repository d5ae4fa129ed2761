import { beforeAll, describe, expect, test } from "vitest";
import { demoStudy } from "../../../server/demo/cells.ts";
import { simulateSurvey } from "../../../server/demo/simulate.ts";
import { VELMARK_GOODS, velmarkTruth } from "../../../server/demo/velmark-truth.ts";
import { runSystem } from "../../../server/engine/cells/system.ts";
import { prepareData } from "../../../server/engine/columns/prepare.ts";
import type { PreparedData } from "../../../server/engine/columns/prepared-data.ts";
import { type ReadCsv, readCsv } from "../../../server/engine/columns/read-csv.ts";
import { QUIET } from "../../../server/engine/run.ts";
import { symmetricEigen } from "../../../shared/numerics/eigen.ts";
import type { DataSpecification } from "../../../shared/schemas/data.ts";
import type { SystemFinding, SystemSpecification } from "../../../shared/schemas/system.ts";
import { spread } from "../../../shared/study/order.ts";
import { resolveCells } from "../../../shared/study/resolve.ts";
import { bytesOf } from "../engine/columns/bytes.ts";

const study = demoStudy();
let file: ReadCsv;
let data: PreparedData;

const read = (csv: string) => readCsv(bytesOf(csv, 65_536), study.upload.name, QUIET);

function resolve() {
  const places = spread(study.cells.length);
  const sources = study.cells.map((cell, at) => ({ ...cell, id: cell.name, order: places[at] }));
  const { table, columns } = file;
  return resolveCells(sources, [{ name: table.name, sha256: table.sha256, rows: table.rows, columns }]);
}
const specificationOf = (name: string) => resolve().find((cell) => cell.name === name)?.specification;

beforeAll(async () => {
  file = await read(study.upload.csv);
  data = prepareData(specificationOf("survey") as DataSpecification, file.table);
});

describe("the survey", () => {
  test("is the same to the last byte each time, and another under another seed", () => {
    expect(simulateSurvey()).toBe(study.upload.csv);
    expect(simulateSurvey({ seed: 1 })).not.toBe(study.upload.csv);
  });

  test("has the columns and rows of a household survey", () => {
    expect(file.table.rows).toBe(4938);
    expect(file.columns).toHaveLength(31);
    const described = Object.fromEntries(file.columns.map((column) => [column.name, column]));
    expect(described.village).toMatchObject({ type: "number", distinct: 212, missing: 0 });
    expect(described.household_id).toMatchObject({ type: "text", distinct: 4938 });
    expect(described.month).toMatchObject({ minimum: 1, maximum: 36 });
    expect(described.p_dairy.zeros).toBe(7);
    expect(described.p_meat.missing).toBeGreaterThanOrEqual(29);
    expect(described.members.maximum).toBeGreaterThan(12);
    const { columns } = file.table;
    const litres = columns.find((column) => column.name === "q_sweet_l");
    const bottles = columns.find((column) => column.name === "q_sweet");
    if (litres?.type !== "number" || bottles?.type !== "number") throw new Error("quantities are numbers");
    const gaps = litres.values.map((value, row) => Math.abs(bottles.values[row] * 0.75 - value));
    expect(Math.max(...gaps)).toBeLessThan(0.005);
  });

  test("every row is accounted for", () => {
    const { accounting } = data.finding;
    expect(accounting.leftOut.map(({ label, count }) => [label, count])).toEqual([
      ["Left out by keep: members <= 12", 63],
      ["Left out: a price missing", 41],
      ["Left out: a price of zero in p_dairy", 7],
      ["Left out: bought nothing", 12],
      ["Left out: goods do not sum to e_total", 3],
    ]);
    expect(accounting.used).toBe(4812);
    const missing = accounting.leftOut[1].rows;
    const village = file.table.columns.find((column) => column.name === "village");
    const spoiled = village?.type === "number" ? missing.filter((row) => village.values[row - 1] === 131) : [];
    expect(spoiled).toHaveLength(29);
    expect(spoiled[28] - spoiled[0]).toBe(28);
  });

  test("has the levels of the country", () => {
    const { finding } = data;
    expect(finding.meanTotal).toBeGreaterThan(175);
    expect(finding.meanTotal).toBeLessThan(195);
    const expected = [6.2, 9.1, 7.4, 31, 4.8, 12];
    finding.goods.forEach(({ meanPrice, logPriceDeviation }, good) => {
      expect(Math.abs(meanPrice / expected[good] - 1)).toBeLessThan(0.05);
      expect(logPriceDeviation).toBeGreaterThan(0.18);
    });
    const sweet = finding.goods[4];
    expect(sweet.name).toBe("Sweet drinks");
    expect(sweet.boughtNone).toBeGreaterThan(0.025);
    expect(sweet.boughtNone).toBeLessThan(0.035);
    expect(finding.flags.find(({ about }) => about === "shares")).toBeUndefined();
  });
});

describe("the truth behind it", () => {
  const { alpha, beta, gamma, demographics, slutsky } = velmarkTruth();
  const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

  test("adds up, is homogeneous and symmetric", () => {
    expect(sum(alpha)).toBeCloseTo(1, 14);
    for (const block of [beta, demographics.log_size, demographics.urban]) expect(sum(block)).toBeCloseTo(0, 14);
    gamma.forEach((row, i) => {
      expect(sum(row)).toBeCloseTo(0, 14);
      expect(row).toEqual(gamma.map((other) => other[i]));
    });
  });

  test("has a Slutsky matrix that is negative but for all prices together", () => {
    const values = [...symmetricEigen(slutsky.map((row) => [...row])).values].sort((a, b) => b - a);
    expect(values[0]).toBeCloseTo(0, 14);
    expect(values[1]).toBeLessThan(-0.04);
    // Compensated own-price elasticity of sweet drinks, whose base share is 0.065.
    expect(slutsky[4][4] / 0.065).toBeLessThan(-0.7);
  });
});

describe("estimation finds it again", () => {
  const truth = velmarkTruth();
  const goodAt = (name: string) => (VELMARK_GOODS as readonly string[]).indexOf(name);

  function trueValue({ block, good, column }: SystemFinding["coefficients"][number]): number {
    const i = goodAt(good);
    if (block === "alpha") return truth.alpha[i];
    if (block === "beta") return truth.beta[i];
    if (block === "gamma") return truth.gamma[i][goodAt(column ?? "")];
    if (column === "log_size" || column === "urban") return truth.demographics[column][i];
    throw new Error(`no true value for ${block} ${column}`);
  }

  test("within 3.5 standard errors where every household buys every good", async () => {
    // Without zeros the system is exactly true; of 60 standard normals one lies beyond 3.5 in about 3 of 100 seeds.
    const { table } = await read(simulateSurvey({ tastes: 0.5 }));
    const calm = prepareData(specificationOf("survey") as DataSpecification, table);
    expect(calm.finding.goods.every(({ boughtNone }) => boughtNone < 0.0005)).toBe(true);
    const { coefficients } = runSystem(specificationOf("base") as SystemSpecification, calm);
    expect(coefficients).toHaveLength(60);
    for (const coefficient of coefficients) {
      const distance = (coefficient.estimate - trueValue(coefficient)) / coefficient.standardError;
      expect(Math.abs(distance), JSON.stringify(coefficient)).toBeLessThan(3.5);
    }
  });

  test("and close to it in the demo study, where a few buy no sweet drinks", () => {
    const found = runSystem(specificationOf("base") as SystemSpecification, data);
    for (const coefficient of found.coefficients) {
      expect(Math.abs(coefficient.estimate - trueValue(coefficient)), JSON.stringify(coefficient)).toBeLessThan(0.01);
    }
    expect(found.checks.negativity).toMatchObject({ holds: true });
  });
});

describe("the cells", () => {
  test("all resolve, and read one another", () => {
    const cells = resolve();
    expect(cells.flatMap(({ problems }) => problems)).toEqual([]);
    expect(cells.map(({ name, kind, reads }) => [name, kind, reads])).toEqual([
      ["survey", "data", []],
      ["base", "system", ["survey"]],
      ["laws", "tests", ["base"]],
      ["matrix", "slutsky", ["base"]],
      ["ninetieth", "slutsky", ["base"]],
      ["fifths", "elasticities", ["base"]],
      ["levy", "price change", ["base"]],
      ["demand", "figure", ["base"]],
      ["linear", "system", ["survey"]],
      ["needs", "system", ["survey"]],
      ["argument", "text", ["base", "matrix", "survey"]],
    ]);
  });

  test("every form of system is asked for once", () => {
    const forms = study.cells.flatMap(({ source }) => /^form: (aids|la-aids|les)$/m.exec(source)?.[1] ?? []);
    expect(forms.sort()).toEqual(["aids", "la-aids", "les"]);
  });
});
