import { beforeAll, describe, expect, it } from "vitest";
import { runPriceChange, runSystem } from "../../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { QUIET, type RunControl } from "../../../../server/engine/run.ts";
import { startThreads } from "../../../../server/engine/threads/start-threads.ts";
import { withoutHouseholds } from "../../../../shared/bundle/without-households.ts";
import type { PriceChangeFinding } from "../../../../shared/schemas/price-change.ts";
import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

/** Every week so often that two chunks of rows are summed, and not every row has its derivatives taken. */
const TIMES = 100;

let few: PreparedData;
let many: PreparedData;
let system: SystemFinding;
beforeAll(async () => {
  few = await tunaWeeks("time: week\nderive: {late: 'week > 200'}");
  system = runSystem(specificationOf("system", "data: d\nform: les\n"), few);
  const often = (column: Float64Array) =>
    Float64Array.from({ length: TIMES * few.rows }, (_, t) => column[t % few.rows]);
  many = {
    ...few,
    rows: TIMES * few.rows,
    rowNumbers: Int32Array.from({ length: TIMES * few.rows }, (_, t) => t + 1),
    shares: few.shares.map(often),
    logPrices: few.logPrices.map(often),
    logTotal: often(few.logTotal),
    numeric: new Map([...few.numeric].map(([name, column]) => [name, often(column)])),
  };
});

const KEYS = "prices: {brand1: {ad valorem: 20}, brand2: {per cent: -5}}\ngroups: {of: late}";
const over = (data: PreparedData, control: RunControl = QUIET): PriceChangeFinding =>
  runPriceChange(specificationOf("price change", `system: s\n${KEYS}\n`), system, data, control);

describe("over many rows", () => {
  it("is the same to the last bit on one thread and on two", () => {
    expect(over(many, { ...QUIET, threads: startThreads(2, 0) })).toEqual(over(many));
  });

  it("has the means of every row, and standard errors from the derivatives of some, which it says", () => {
    const [one, other] = [over(few).incidence!, over(many).incidence!];
    expect(one.derivativeRows).toBeUndefined();
    expect(other.derivativeRows!.of).toBe(many.rows);
    expect(other.derivativeRows!.used).toBeLessThan(many.rows / 2);
    expect(other.namedRows).toBe(TIMES * one.namedRows);
    expect(other.brokenRows).toHaveLength(Math.min(500, other.namedRows));
    for (const [a, b] of [[one.all, other.all], ...one.groups.map((group, g) => [group, other.groups[g]] as const)]) {
      const [left, right] = [a.welfare!.equivalent, b.welfare!.equivalent];
      expect(Math.abs(right.value / left.value - 1)).toBeLessThan(1e-12);
      // Some thousand of the rows: about 1/√1000 of itself.
      expect(Math.abs(right.error / left.error - 1)).toBeLessThan(0.1);
    }
  });

  it("says how far it has come", () => {
    const told: { step: string; fraction?: number }[] = [];
    over(many, { ...QUIET, progress: (now) => told.push(now) });
    expect(new Set(told.map(({ step }) => step))).toEqual(new Set(["going over the rows", "taking derivatives"]));
    const fractions = told.filter(({ step }) => step === "going over the rows").map(({ fraction }) => fraction!);
    expect(fractions).toEqual(fractions.toSorted((a, b) => a - b));
    expect(fractions.at(-1)).toBe(1);
  });
});

it("leaves no row of the upload where findings go without households", () => {
  const plain = JSON.stringify(withoutHouseholds(over(few)));
  expect(over(few).incidence!.brokenRows.length).toBeGreaterThan(0);
  expect(plain).not.toContain("brokenRows");
  expect(plain).toContain('"namedRows"');
});
