import { createReadStream, readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { prepareData } from "../../../../server/engine/columns/prepare.ts";
import type { UploadTable } from "../../../../server/engine/columns/prepared-data.ts";
import { readCsv } from "../../../../server/engine/columns/read-csv.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import { dataFinding, dataSpecification } from "../../../../shared/schemas/data.ts";
import { bytesOf } from "./bytes.ts";
import { problemsOf, tableOf } from "./tables.ts";

const TWO_GOODS = {
  Grains: { price: "p_grains", quantity: "q_grains" },
  "Meat & fish": { price: "p_meat", expenditure: "e_meat" },
};

const specify = (keys: object) =>
  dataSpecification.parse({ kind: "data", upload: "survey.csv", goods: TWO_GOODS, ...keys });

const SURVEY = {
  village: ["a", "a", "b", "b"],
  month: [1, 2, 1, 2],
  members: [1, 2, 3, 4],
  weight: [1, 3, 1, 3],
  p_grains: [1, 2, 4, 2],
  q_grains: [10, 0, 5, 10],
  p_meat: [10, 10, 5, 20],
  e_meat: [30, 40, 60, 20],
  e_total: [40, 40, 80, 40],
};
type Survey = Partial<Record<keyof typeof SURVEY | "extra", readonly (number | null)[] | readonly (string | null)[]>>;
const survey = (changes: Survey = {}) => tableOf({ ...SURVEY, ...changes });
const prepare = (keys: object = {}, changes: Survey = {}) => prepareData(specify(keys), survey(changes));
const problems = (keys: object, changes: Survey = {}) => problemsOf(() => prepare(keys, changes));
const accounts = (keys: object, changes: Survey = {}) => prepare(keys, changes).finding.accounting;

describe("shares, prices and totals", () => {
  test("by hand", () => {
    const data = prepare({ normalise: "none" });
    expect(data.goods).toEqual(["Grains", "Meat & fish"]);
    expect(data.shares.map((share) => [...share])).toEqual([
      [0.25, 0, 0.25, 0.5],
      [0.75, 1, 0.75, 0.5],
    ]);
    expect(data.logPrices.map((prices) => [...prices])).toEqual([
      [1, 2, 4, 2].map(Math.log),
      [10, 10, 5, 20].map(Math.log),
    ]);
    expect([...data.logTotal]).toEqual([40, 40, 80, 40].map(Math.log));
    expect(data).toMatchObject({ priceScale: [1, 1], totalScale: 1, rows: 4 });
    expect([...data.rowNumbers]).toEqual([1, 2, 3, 4]);
  });

  test("each pair of price, quantity and expenditure says the same", () => {
    const columns = { p1: [2, 4], q1: [3, 5], e1: [6, 20], p2: [1, 7], q2: [8, 2], e2: [8, 14] };
    const pairs = [
      ["price", "quantity"],
      ["price", "expenditure"],
      ["quantity", "expenditure"],
    ];
    const all = pairs.map((pair) => {
      const goods = ["1", "2"].map((good) => [
        `good ${good}`,
        Object.fromEntries(pair.map((part) => [part, `${part[0]}${good}`])),
      ]);
      const named = new Set(pair.flatMap((part) => [`${part[0]}1`, `${part[0]}2`]));
      const kept = Object.fromEntries(Object.entries(columns).filter(([name]) => named.has(name)));
      return prepareData(specify({ goods: Object.fromEntries(goods) }), tableOf(kept));
    });
    for (const other of all.slice(1)) {
      expect(other.shares).toEqual(all[0].shares);
      expect(other.logPrices).toEqual(all[0].logPrices);
      expect(other.fingerprint).toBe(all[0].fingerprint);
      expect(other.finding.goods).toEqual(all[0].finding.goods);
    }
  });

  test("weights scale to the number of rows and enter every mean", () => {
    const data = prepare({ weight: "weight" });
    expect([...(data.weights ?? [])]).toEqual([0.5, 1.5, 0.5, 1.5]);
    expect(data.priceScale[0]).toBeCloseTo((1 + 3 * 2 + 4 + 3 * 2) / 8, 14);
    expect(data.totalScale).toBeCloseTo((40 + 120 + 80 + 120) / 8, 14);
    const [grains, meat] = data.finding.goods;
    expect(grains.meanShare).toBeCloseTo((0.25 + 0 + 0.25 + 1.5) / 8, 14);
    expect(grains.meanShare + meat.meanShare).toBeCloseTo(1, 14);
    expect(grains.boughtNone).toBeCloseTo(3 / 8, 14);
    expect(grains.meanQuantity).toBeCloseTo((10 + 0 + 5 + 30) / 8, 14);
    expect(meat.meanPrice).toBeCloseTo((10 + 30 + 5 + 60) / 8, 14);
    const mean = grains.meanShare;
    const variance = ((0.25 - mean) ** 2 + 3 * mean ** 2 + (0.25 - mean) ** 2 + 3 * (0.5 - mean) ** 2) / 8;
    expect(grains.shareDeviation).toBeCloseTo(Math.sqrt(variance), 14);
  });

  test("the finding keeps to its schema", () => {
    const { finding } = prepare({ weight: "weight", cluster: "village", time: "month", total: "e_total" });
    expect(dataFinding.parse(finding)).toEqual(finding);
    expect(finding).toMatchObject({ weighted: true, clusters: 2, timeColumn: "month", meanTotal: 45 });
    expect(finding.upload).toEqual({ name: "survey.csv", rows: 4, columns: 9, sha256: "0".repeat(64) });
  });

  test("under normalise: mean nothing depends on the units of prices or money (Moschini 1995)", () => {
    const factor = fc.double({ min: 1e-6, max: 1e6, noNaN: true });
    fc.assert(
      fc.property(factor, factor, factor, (money, kilos, units) => {
        const scaled = prepare(
          {},
          {
            p_grains: SURVEY.p_grains.map((price) => (price * money) / kilos),
            q_grains: SURVEY.q_grains.map((quantity) => quantity * kilos),
            p_meat: SURVEY.p_meat.map((price) => (price * money) / units),
            e_meat: SURVEY.e_meat.map((spent) => spent * money),
          },
        );
        const plain = prepare();
        const same = (a: Float64Array, b: Float64Array) =>
          expect([...a].every((value, row) => Math.abs(value - b[row]) < 1e-10)).toBe(true);
        for (const good of [0, 1]) {
          same(scaled.shares[good], plain.shares[good]);
          same(scaled.logPrices[good], plain.logPrices[good]);
        }
        same(scaled.logTotal, plain.logTotal);
      }),
      { numRuns: 50, seed: 11 },
    );
  });

  test("clusters, time and columns for demographics", () => {
    const data = prepare(
      {
        cluster: "village",
        time: "month",
        weight: "weight",
        derive: { log_size: "log(members)" },
        keep: "members > 1",
      },
      { extra: [1, 2, null, 4] },
    );
    expect(data.clusters).toEqual({ column: "village", codes: Int32Array.of(0, 1, 1), labels: ["a", "b"] });
    expect([...(data.time ?? [])]).toEqual([2, 1, 2]);
    expect([...data.numeric.keys()]).toEqual(["month", "members", "e_total", "log_size"]);
    expect([...(data.numeric.get("log_size") ?? [])]).toEqual([2, 3, 4].map(Math.log));
    expect(data.incomplete).toEqual(new Map([["extra", { missing: 1, firstRow: 3 }]]));
    expect(prepare({ cluster: "month" }).clusters?.labels).toEqual(["1", "2"]);
  });

  test("dates written year first are time by the calendar where all are written alike, by their rank elsewhere", () => {
    const timeOf = (extra: string[]) => [...(prepare({ time: "extra" }, { extra }).time ?? [])];
    expect(timeOf(["2030-01-05", "2029-12-31", "2029-11-02", "2029-12-31"])).toEqual([21919, 21914, 21855, 21914]);
    expect(timeOf(["2030-01", "2029-12", "2029-10", "2029-12"])).toEqual([24361, 24360, 24358, 24360]);
    expect(timeOf(["2030-Q1", "2029-Q4", "2029-Q2", "2029-Q4"])).toEqual([8121, 8120, 8118, 8120]);
    expect(timeOf(["2030-01", "2029-Q4", "2029-12-31", "2029"])).toEqual([4, 3, 2, 1]);
    const [problem] = problems({ time: "extra" }, { extra: ["2030-01", "March", "2029-11", "2029-12"] });
    expect(problem).toMatchObject({ key: ["time"], row: 2, column: "extra" });
    expect(problem.sentence).toMatch(/"March"/);
  });
});

describe("row accounting", () => {
  test("each reason in its order, with its label and rows", () => {
    const rows = 12;
    const fill = (value: number, at: Record<number, number | null> = {}) =>
      Array.from({ length: rows }, (_, row) => (row + 1 in at ? at[row + 1] : value));
    const table = tableOf({
      members: fill(3, { 1: 14, 2: 13, 4: null }),
      weight: fill(1, { 5: 0 }),
      p_grains: fill(2, { 1: null, 2: 0, 3: null, 6: 0, 7: 0 }),
      q_grains: fill(5, { 8: -1, 9: 0 }),
      p_meat: fill(4),
      e_meat: fill(10, { 9: 0 }),
      e_total: fill(20, { 9: 0, 10: 20.00001, 11: 20.0001, 12: 21 }),
    });
    const { accounting } = prepareData(
      specify({ weight: "weight", total: "e_total", keep: "members <= 12" }),
      table,
    ).finding;
    const told = accounting.leftOut.map(({ reason, label, rows: named }) => [reason, label, named]);
    expect(told).toEqual([
      ["keep", "Left out by keep: members <= 12", [1, 2]],
      ["missing value", "Left out: a value missing in p_grains and members", [3, 4]],
      ["weight not positive", "Left out: a weight of zero in weight", [5]],
      ["price not positive", "Left out: a price of zero in p_grains", [6, 7]],
      ["negative purchase", "Left out: a negative quantity in q_grains", [8]],
      ["total not positive", "Left out: bought nothing", [9]],
      ["shares do not sum to one", "Left out: goods do not sum to e_total", [11, 12]],
    ]);
    expect(accounting.used).toBe(1);
    for (const { count, strip } of accounting.leftOut) expect(strip.reduce((a, b) => a + b)).toBe(count);
  });

  test("one column alone is named by its part", () => {
    const label = (keys: object, changes: Survey) => accounts(keys, changes).leftOut.map((entry) => entry.label);
    expect(label({}, { p_grains: [null, 2, 4, 2] })).toEqual(["Left out: a price missing in p_grains"]);
    expect(label({}, { p_grains: [null, 2, 4, 2], p_meat: [1, null, 1, 1] })).toEqual([
      "Left out: a price missing in p_grains and p_meat",
    ]);
    expect(label({}, { q_grains: [null, 2, 4, 2] })).toEqual(["Left out: a quantity missing in q_grains"]);
    expect(label({ cluster: "village" }, { village: ["a", null, "b", "b"] })).toEqual([
      "Left out: a cluster missing in village",
    ]);
    expect(label({}, { p_grains: [-1, 2, 4, 0] })).toEqual(["Left out: a price of zero or below in p_grains"]);
    expect(label({}, { e_meat: [-1, 2, 4, 2] })).toEqual(["Left out: a negative expenditure in e_meat"]);
  });

  test("a derived value that is no number is explained", () => {
    const { leftOut } = accounts({ derive: { size: "log(members - 1)" } });
    expect(leftOut).toMatchObject([
      {
        reason: "missing value",
        label: "Left out: a value missing in size (size is no finite number in 1 row, first in row 1)",
      },
    ]);
    expect(accounts({ keep: "1 / (members - 2) > 0.1" })).toMatchObject({
      used: 2,
      leftOut: [{ reason: "keep" }, { reason: "missing value", label: "Left out: an answer of keep missing" }],
    });
  });

  test("nothing bought is a share of zero where the price is known, and no price where it is not", () => {
    const byExpenditure = { ...TWO_GOODS, Grains: { quantity: "q_grains", expenditure: "extra" } };
    const { leftOut, used } = accounts({ goods: byExpenditure }, { extra: [10, 0, 20, 0] });
    expect(used).toBe(2);
    expect(leftOut.map(({ reason, label, rows }) => [reason, label, rows])).toEqual([
      ["missing value", "Left out: a price missing in Grains, expenditure ÷ quantity", [2]],
      ["price not positive", "Left out: a price of zero in Grains, expenditure ÷ quantity", [4]],
    ]);
    expect(prepare().shares[0][1]).toBe(0);
  });

  test("a row keeps its place when what is missing cannot change the answer of keep", () => {
    const missing = { members: [null, 2, 3, 4] };
    expect(accounts({ keep: "members < 10 or p_meat > 5" }, missing).used).toBe(4);
    expect(accounts({ keep: "members < 10" }, missing)).toMatchObject({
      used: 3,
      leftOut: [{ reason: "missing value", label: "Left out: a value missing in members", rows: [1] }],
    });
  });

  test("at most 200 rows are named; the counts and the strip are whole", () => {
    const rows = 1000;
    const ones = Array.from({ length: rows }, () => 1);
    const table = tableOf({
      id: ones.map((_, row) => row),
      p_grains: ones,
      q_grains: ones,
      p_meat: ones,
      e_meat: ones,
    });
    const { accounting } = prepareData(specify({ keep: "id >= 600" }), table).finding;
    expect(accounting.leftOut[0]).toMatchObject({ count: 600 });
    expect(accounting.leftOut[0].rows).toHaveLength(200);
    expect(accounting.leftOut[0].strip).toEqual(Array.from({ length: 100 }, (_, slice) => (slice < 60 ? 10 : 0)));
  });

  test("whatever the numbers, every row is used or left out for one reason, and used rows are sound", () => {
    const cell = fc.option(fc.constantFrom(-1, 0, 0, 1, 2, 3.5, 1e-8), { nil: null, freq: 6 });
    const rowOf = fc.array(cell, { minLength: 8, maxLength: 8 });
    fc.assert(
      fc.property(fc.array(rowOf, { minLength: 1, maxLength: 30 }), (body) => {
        const names = ["p_grains", "q_grains", "q_meat", "e_meat", "e_total", "weight", "members", "month"];
        const table = tableOf({
          ...Object.fromEntries(names.map((name, at) => [name, body.map((row) => row[at])])),
          sound: body.map(() => 1),
        });
        // A last row is certainly used, so that something is left to be looked at.
        for (const column of table.columns) if (column.type === "number") column.values[body.length - 1] = 1;
        table.columns[4].type === "number" && table.columns[4].values.set([2], body.length - 1);
        const data = prepareData(
          specify({
            goods: { ...TWO_GOODS, "Meat & fish": { quantity: "q_meat", expenditure: "e_meat" } },
            total: "e_total",
            weight: "weight",
            keep: "members > 0 or month / members < 1",
          }),
          table,
        );
        const { uploaded, leftOut, used } = data.finding.accounting;
        expect(uploaded).toBe(body.length);
        expect(leftOut.reduce((sum, { count }) => sum + count, used)).toBe(uploaded);
        expect(new Set([...leftOut.flatMap(({ rows }) => rows), ...data.rowNumbers]).size).toBe(uploaded);
        expect(dataFinding.parse(data.finding)).toEqual(data.finding);
        for (let row = 0; row < used; row++) {
          expect(data.shares[0][row] + data.shares[1][row]).toBeCloseTo(1, 14);
          for (const logs of [...data.logPrices, data.logTotal]) expect(Number.isFinite(logs[row])).toBe(true);
        }
      }),
      { numRuns: 300, seed: 5 },
    );
  });
});

describe("refusals carry the key and the nearest name", () => {
  test("everything at once", () => {
    const found = problems({
      goods: {
        Grains: { price: "p_grain", quantity: "q_grains" },
        "Meat & fish": { price: "village", expenditure: "e_meat" },
      },
      weight: "wieght",
      cluster: "vilage",
      time: "moth",
      total: "e_totl",
      derive: { members: "1", size: "log(membrs)", a: "b + 1", b: "a + 1", c: "size + 1" },
      keep: "month < and",
    });
    expect(new Map(found.map(({ key, nearest }) => [key?.join("."), nearest]))).toEqual(
      new Map([
        ["derive.members", undefined],
        ["derive.size", "members"],
        ["derive.a", undefined],
        ["keep", undefined],
        ["goods.Grains.price", "p_grains"],
        ["goods.Meat & fish.price", undefined],
        ["total", "e_total"],
        ["weight", "weight"],
        ["cluster", "village"],
        ["time", "month"],
      ]),
    );
    expect(found).toHaveLength(10);
    const sentence = (key: string) => found.find((problem) => problem.key?.join(".") === key)?.sentence;
    expect(sentence("derive.members")).toMatch(/already has a column members/);
    expect(sentence("derive.a")).toMatch(/a reads b reads a/);
    expect(sentence("goods.Meat & fish.price")).toBe(
      'village is to be the price, a column of numbers, and row 1 has "a".',
    );
  });

  test("derived columns may read one another in any order, and play any part", () => {
    const data = prepare({
      goods: { Grains: { price: "p", quantity: "q" }, "Meat & fish": TWO_GOODS["Meat & fish"] },
      derive: { q: "2 * half", half: "q_grains / 2", p: "p_grains" },
    });
    expect(data.shares).toEqual(prepare().shares);
  });

  test("one good, no good, and one column for two goods", () => {
    expect(problems({ goods: { Grains: TWO_GOODS.Grains } })[0]).toMatchObject({
      sentence: "A demand system needs at least 2 goods; goods names 1 good, Grains.",
      key: ["goods"],
    });
    expect(problems({ goods: {} })[0].sentence).toMatch(/0 goods/);
    const twice = { Grains: TWO_GOODS.Grains, Rice: TWO_GOODS.Grains };
    expect(problems({ goods: twice })).toMatchObject([
      {
        sentence: "q_grains is named twice, for Grains and as the quantity of Rice.",
        key: ["goods", "Rice", "quantity"],
      },
    ]);
  });

  test("a text in a numeric column, by its row and value", async () => {
    const csv = "p_grains,q_grains,p_meat,e_meat\n1,2,3,4\n1,2,3,4\n1,2,n.a.,4\n1,2,3,4\n";
    const { table } = await readCsv(bytesOf(csv), "survey.csv", QUIET);
    expect(problemsOf(() => prepareData(specify({}), table))).toEqual([
      {
        sentence: 'p_meat is to be the price, a column of numbers, and row 3 has "n.a.".',
        key: ["goods", "Meat & fish", "price"],
        row: 3,
        column: "p_meat",
      },
    ]);
    const [derived] = problemsOf(() => prepareData(specify({ derive: { logp: "log(p_meat)" } }), table));
    expect(derived).toMatchObject({ row: 3, column: "p_meat", key: ["derive", "logp"] });
  });

  test("no row left says what took them", () => {
    expect(problems({ weight: "weight" }, { weight: [0, 0, -1, 0] })).toEqual([
      {
        sentence: "weight is zero or below in all 4 rows, so none of them counts.",
        key: ["weight"],
        column: "weight",
        row: 1,
      },
    ]);
    expect(problems({ keep: "members > 99" })).toEqual([
      { sentence: "None of the 4 rows satisfies keep: members > 99.", key: ["keep"] },
    ]);
    const [zero] = problems({}, { p_grains: [0, 0, 0, null] });
    expect(zero.sentence).toBe(
      "No row is left: 1 left out: a price missing in p_grains; 3 left out: a price of zero in p_grains. The upload has 4.",
    );
    expect(zero).toMatchObject({ key: ["goods"], row: 1 });
  });

  test("numbers at the edge of what doubles hold", () => {
    const [problem] = problems({}, { p_meat: [1e-320, 1e300, 1, 1] });
    expect(problem).toMatchObject({ key: ["goods"], row: 1 });
    expect(problem.sentence).toMatch(/no finite logarithm/);
  });
});

describe("the fingerprint is of the columns used", () => {
  const print = (keys: object = {}, changes: Survey = {}) => prepare(keys, changes).fingerprint;

  test("the same data have the same one, however they came", () => {
    expect(print()).toBe(print());
    expect(print()).toMatch(/^[0-9a-f]{64}$/);
    const renamed: UploadTable = { ...survey(), name: "other.csv", sha256: "f".repeat(64) };
    expect(prepareData(specify({}), renamed).fingerprint).toBe(print());
    expect(print({}, { extra: ["a", "b", "c", "d"] })).toBe(print());
    expect(print({ keep: "members > 1" }, { p_grains: [7, 2, 4, 2] })).toBe(print({ keep: "members > 1" }));
  });

  test("every column used counts", () => {
    const changes: [object, Survey][] = [
      [{}, { p_grains: [1, 2, 4, 2.0000001] }],
      [{}, { e_meat: [30, 40, 60, 21] }],
      [{}, { members: [1, 2, 3, 5] }],
      [{}, { month: [1, 2, 1, 3] }],
      [{ normalise: "none" }, {}],
      [{ weight: "weight" }, {}],
      [{ cluster: "village" }, {}],
      [{ time: "month" }, {}],
      [{ derive: { size: "log(members)" } }, {}],
      [{ keep: "members > 1" }, {}],
      [{ goods: { Cereals: TWO_GOODS.Grains, "Meat & fish": TWO_GOODS["Meat & fish"] } }, {}],
      [{ goods: { "Meat & fish": TWO_GOODS["Meat & fish"], Grains: TWO_GOODS.Grains } }, {}],
    ];
    const prints = new Set([print(), ...changes.map(([keys, change]) => print(keys, change))]);
    expect(prints.size).toBe(changes.length + 1);
  });
});

describe("worth knowing before estimating", () => {
  const flag = (about: string, keys: object, table: UploadTable) =>
    prepareData(specify(keys), table).finding.flags.find((one) => one.about === about);
  const rows = 200;
  const each = (value: (row: number) => number) => Array.from({ length: rows }, (_, row) => value(row));
  const wave = (row: number, period: number) => 1 + 0.1 * Math.sin((2 * Math.PI * row) / period);
  const base = {
    p_grains: each((row) => wave(row, 7)),
    q_grains: each((row) => (row < 4 ? 0 : 10)),
    p_meat: each((row) => wave(row, 11)),
    e_meat: each(() => 10),
    village: each((row) => row % 10),
  };

  test("zeros", () => {
    expect(flag("zeros", {}, tableOf(base))?.sentence).toBe(
      "Not bought: Grains in 2.0\u2009% of the rows used. Below 5\u2009%, so shares are taken as they are.",
    );
    const many = tableOf({ ...base, q_grains: each((row) => (row < 20 ? 0 : 1)) });
    expect(flag("zeros", {}, many)?.sentence).toMatch(/Grains in 10\.0\u2009%.*may be biased/);
    expect(flag("zeros", {}, tableOf({ ...base, q_grains: base.e_meat }))?.sentence).toMatch(/Every good is bought/);
  });

  test("outliers by village, with their rows", () => {
    const high = { ...base, p_meat: base.p_meat.map((price, row) => price * (row % 10) + 1) };
    expect(flag("outliers", { cluster: "village" }, tableOf(high))?.rows).toEqual([]);
    const one = { ...high, p_grains: base.p_grains.map((price, row) => (row === 41 ? 9 : price)) };
    const found = flag("outliers", { cluster: "village" }, tableOf(one));
    expect(found).toEqual({
      about: "outliers",
      sentence: "1 log price lies more than five median deviations from the median of their village. It is kept.",
      rows: [42],
      parts: [{ key: '["outliers","Grains"]', words: "Grains", count: 1 }],
    });
  });

  test("prices that hardly vary, and differences between villages", () => {
    const flat = tableOf({ ...base, p_meat: each(() => 2) });
    expect(flag("price variation", {}, flat)?.sentence).toBe(
      "Standard deviations of log prices run from 0 (Meat & fish) to 0.071 (Grains). So little variation in the price of Meat & fish tells next to nothing about its effects.",
    );
    const apart = tableOf({ ...base, p_grains: each((row) => 1 + (row % 10)), p_meat: each((row) => 3 + (row % 10)) });
    expect(flag("price variation", { cluster: "village" }, apart)?.sentence).toMatch(
      /Differences from one village to another account for 100\u2009% of it/,
    );
  });

  test("prices that move together", () => {
    const together = tableOf({ ...base, p_meat: base.p_grains.map((price) => price ** 2) });
    expect(flag("collinearity", {}, together)?.sentence).toMatch(/Grains and Meat & fish correlate by 1\.000/);
    const bound = Number(/above (0\.\d\d)/.exec(flag("collinearity", {}, tableOf(base))?.sentence ?? "")?.[1]);
    expect(bound).toBeGreaterThan(0);
    expect(bound).toBeLessThan(0.2);
  });

  test("printed shares that miss one within the tolerance are told and made to sum", () => {
    const totals = base.q_grains.map((quantity, row) => quantity * base.p_grains[row] + 10);
    expect(flag("shares", { total: "total" }, tableOf({ ...base, total: totals }))).toBeUndefined();
    const printed = tableOf({ ...base, total: totals.map((total, row) => (row === 9 ? total * (1 + 4e-7) : total)) });
    const found = flag("shares", { total: "total" }, printed);
    expect(found).toMatchObject({ rows: [10] });
    expect(found?.sentence).toBe("Printed shares of 1 row miss one by up to 4 × 10⁻⁷; they were divided by their sum.");
    const { shares } = prepareData(specify({ total: "total" }), printed);
    expect(shares[0][9] + shares[1][9]).toBeCloseTo(1, 15);
  });
});

test("the tuna file is used whole, its shares those of prices times quantities", async () => {
  const path = new URL("../../../reference/fixtures/tuna-weekly.csv", import.meta.url);
  const { table } = await readCsv(createReadStream(path), "tuna-weekly.csv", QUIET);
  const brands = [1, 2, 3, 4, 5, 6, 7];
  const goods = Object.fromEntries(brands.map((i) => [`brand${i}`, { price: `p${i}`, quantity: `q${i}` }]));
  const data = prepareData(specify({ goods, time: "week" }), table);
  expect(data.finding.accounting).toEqual({ uploaded: 338, leftOut: [], used: 338 });
  expect([...data.numeric.keys()]).toEqual(["week"]);
  const lines = readFileSync(path, "utf8").trim().split("\n").slice(1);
  lines.forEach((line, row) => {
    const cells = line.split(",").map(Number);
    const spent = brands.map((i) => cells[i] * cells[i + 7]);
    const total = spent.reduce((sum, one) => sum + one, 0);
    for (const i of [0, 1, 2, 3, 4, 5, 6]) {
      expect(data.shares[i][row]).toBeCloseTo(spent[i] / total, 14);
      expect(data.logPrices[i][row]).toBeCloseTo(Math.log(cells[i + 8] / data.priceScale[i]), 13);
    }
    expect(data.time?.[row]).toBe(cells[0]);
  });
});

test("cancelling stops the work", () => {
  const control = { progress() {}, cancelled: () => true };
  expect(() => prepareData(specify({}), survey(), control)).toThrow(Cancelled);
});
