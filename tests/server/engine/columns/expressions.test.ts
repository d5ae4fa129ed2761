import { describe, expect, test } from "vitest";
import { type Columns, evaluateExpression } from "../../../../server/engine/columns/expressions.ts";
import { parseExpression } from "../../../../server/engine/columns/parse-expression.ts";
import { column, problemsOf } from "./tables.ts";

const columns: Columns = new Map(
  [
    column("members", [1, 2, null, 14]),
    column("head_age", [30, 65, 41, 17]),
    column("zero", [0, 0, 0, 0]),
    column("price of milk", [1.5, 2.5, 3.5, 4.5]),
    column("p.dairy", [9, 8, 7, 6]),
    column("région", ["north", "south", null, "north"]),
    column("constructor", [1, 1, 1, 1]),
  ].map((one) => [one.name, one]),
);

const evaluate = (source: string) => evaluateExpression(parseExpression(source), columns, 4);
const results = (source: string) =>
  Array.from(evaluate(source).values, (value) => (Number.isNaN(value) ? null : value));
const sentences = (source: string) => problemsOf(() => evaluate(source)).map((problem) => problem.sentence);

describe("what an expression may say", () => {
  test.each<[string, (number | null)[]]>([
    ["members + 1", [2, 3, null, 15]],
    ["-members^2", [-1, -4, null, -196]],
    ["2^3^2", [512, 512, 512, 512]],
    ["(head_age - 30) / 5 * 2", [0, 14, 4.4, -5.2]],
    ["members <= 12", [1, 1, null, 0]],
    ["18 <= head_age < 65", [1, 0, 1, 0]],
    ["not (members > 1) or head_age == 65", [1, 1, null, 0]],
    ["members > 1 and head_age > 60", [0, 1, 0, 0]],
    ["members > 1 or head_age > 40", [0, 1, 1, 1]],
    ["head_age >= 65 ? 1 : head_age < 18 ? 2 : 3", [3, 1, 3, 2]],
    ["members > 5 ? 1 : 0", [0, 0, null, 1]],
    ["min(members, head_age, 10)", [1, 2, null, 10]],
    ["max(2, head_age) - abs(-1)", [29, 64, 40, 16]],
    ["round(head_age / 7, 1)", [4.3, 9.3, 5.9, 2.4]],
    ["round(-2.5) + round(2.5)", [0, 0, 0, 0]],
    ["mod(head_age - 31, 12)", [11, 10, 10, 10]],
    ["floor(2.5) + ceil(2.5) + sign(-3)", [4, 4, 4, 4]],
    ["sqrt(4) + cbrt(27) + log10(100) + log2(8) + exp(0) + log1p(0) + expm1(0)", [11, 11, 11, 11]],
    ["ln(members) - log(members)", [0, 0, null, 0]],
    ["missing(members)", [0, 0, 1, 0]],
    ["true", [1, 1, 1, 1]],
    ['col("price of milk") * 2', [3, 5, 7, 9]],
    ['col("p.dairy")', [9, 8, 7, 6]],
    ['région == "north"', [1, 0, null, 1]],
    ["'south' != région", [1, 0, null, 1]],
    ["missing(région)", [0, 0, 1, 0]],
    ["constructor + 1", [2, 2, 2, 2]],
    ["head_age > 20 # grown up", [1, 1, 1, 0]],
  ])("%s", (source, expected) => {
    const found = results(source);
    found.forEach((value, row) => {
      if (value === null || expected[row] === null) expect(value).toBe(expected[row]);
      else expect(value).toBeCloseTo(expected[row], 12);
    });
  });

  test("functions are those of arithmetic", () => {
    const { values } = evaluate("log(members) + sin(head_age) - cos(pi)");
    expect(values[0]).toBe(Math.log(1) + Math.sin(30) - Math.cos(Math.PI));
    expect(values[3]).toBe(Math.log(14) + Math.sin(17) + 1);
  });

  test("a result that is no finite number is missing, and told apart from a missing value read", () => {
    expect(evaluate("1 / zero")).toMatchObject({ undefinedRows: 4, firstUndefinedRow: 1 });
    expect(evaluate("log(members - 2)")).toMatchObject({ undefinedRows: 2, firstUndefinedRow: 1 });
    expect(evaluate("members + 1")).toMatchObject({ undefinedRows: 0, reads: ["members"] });
    expect(results("1 / zero > 2")).toEqual([null, null, null, null]);
    expect(results("sqrt(-1)")).toEqual([null, null, null, null]);
    expect(results("10^400")).toEqual([null, null, null, null]);
  });

  test("a sum of very many columns needs no brackets", () => {
    expect(results(Array.from({ length: 90 }, () => "zero").join("+"))).toEqual([0, 0, 0, 0]);
  });

  test("zero has one sign", () => {
    expect(Object.is(evaluate("-zero").values[0], 0)).toBe(true);
  });
});

describe("what is refused, by what it is", () => {
  test.each<[string, RegExp]>([
    ["membres > 2", /There is no column membres\. The nearest is members/],
    ["lg(members)", /lg is no function .* The nearest is l/],
    ["sqroot(members)", /sqroot is no function/],
    ["members = 3", /assigns; to compare, write ==/],
    ["f(x) = x", /defines a function/],
    ["members; zero", /several expressions/],
    ["members\nzero", /several expressions/],
    ["[1, 2]", /is a list/],
    ["{a: 1}", /is an object/],
    ["1:3", /is a range/],
    ["members[1]", /asks for a part of/],
    ["p.dairy", /a column of that name is written col\("p\.dairy"\)/],
    ["members.constructor", /asks for a part of members/],
    ['members.constructor("return process")()', /./],
    ["2 members", /write \* to multiply/],
    ["5 cm", /write \* to multiply/],
    ["members % 2", /% is no operation .* mod/],
    ["members!", /! is no operation/],
    ["members'", /' is no operation/],
    ["members xor zero", /xor is no operation/],
    ["members to cm", /to is no operation/],
    ["eval('1')", /eval is no function/],
    ["import('fs')", /import is no function/],
    ["createUnit('a')", /createUnit is no function/],
    ["toString()", /toString is no function/],
    ["hasOwnProperty('a')", /hasOwnProperty is no function/],
    ["log(members, 2)", /log takes 1 value, and has 2/],
    ["round()", /round takes 1 to 2 values, and has 0/],
    ["col(members)", /col takes the name of a column in quotes/],
    ["col('a', 'b')", /col takes the name/],
    ["'north' + 1", /The text "north" can only be compared/],
    ["région + 1", /région is a column of texts; compare it with a text, such as région == "north"/],
    ["région < 'north'", /./],
    ["région == 'nroth'", /No row of région says "nroth"\. The nearest is "north"/],
    ["members == 'north'", /can only be compared with a text column/],
    ["NaN", /not a finite number; missing\(column\)/],
    ["null", /not a finite number/],
    ["1e999", /not a finite number/],
    ["", /empty/],
    ["members +", /cannot be read as an expression/],
    ["((members)", /cannot be read as an expression/],
    ["members > 'a", /cannot be read/],
    ["__proto__", /There is no column __proto__/],
    ["toString", /There is no column toString/],
    ["process.exit()", /cannot be called/],
    [`${"(".repeat(60)}1${")".repeat(60)}`, /nests at most 40 deep; this one reaches 60/],
    ["-".repeat(480).concat("1"), /nests at most 260 deep; this one reaches 261/],
    [`1${"+1".repeat(300)}`, /at most 500 characters; this one has 601/],
  ])("%s", (source, sentence) => {
    expect(sentences(source).join(" ")).toMatch(sentence);
  });

  test("every fault at once", () => {
    expect(sentences("sine(1) + nosuch(2) + (a = 1)")).toHaveLength(3);
    expect(sentences("alpha + beta_2 + région")).toHaveLength(3);
  });
});
