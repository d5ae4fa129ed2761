import { expect, test } from "vitest";
import { classesOfGoods, intervalOf } from "../../../shared/economics/classes.ts";
import type { Elasticities } from "../../../shared/economics/elasticities.ts";

/** Elasticities with every error 0.1, so intervals are ±0.196 at 95 %. */
function withErrors(expenditure: number[], uncompensated: number[][], compensated: number[][]): Elasticities {
  return {
    shares: expenditure.map(() => 1 / expenditure.length),
    expenditure,
    expenditureErrors: expenditure.map(() => 0.1),
    uncompensated,
    uncompensatedErrors: uncompensated.map((row) => row.map(() => 0.1)),
    compensated,
    compensatedErrors: compensated.map((row) => row.map(() => 0.1)),
  };
}

const zeros = (n: number) => Array.from({ length: n }, () => new Array<number>(n).fill(0));

test("kinds of goods by the interval, not by the estimate", () => {
  const expenditure = [1.3, 1.1, 0.5, 0.1, -0.1, -0.4];
  const goods = ["wine", "cheese", "bread", "salt", "lard", "gruel"];
  const own = zeros(6);
  own[5][5] = 0.3;
  own[4][4] = 0.3;
  const { goods: classes } = classesOfGoods(withErrors(expenditure, own, zeros(6)), goods);
  expect(classes.map(({ kind }) => kind)).toEqual([
    "luxury",
    "undecided",
    "necessity",
    "undecided",
    "undecided",
    "inferior",
  ]);
  expect(classes.map(({ normal }) => normal)).toEqual(["yes", "yes", "yes", "undecided", "undecided", "no"]);
  expect(classes.map(({ incomeNeutral }) => incomeNeutral)).toEqual([false, false, false, true, true, false]);
  expect(classes.map(({ giffen }) => giffen)).toEqual(["no", "no", "no", "undecided", "undecided", "yes"]);
});

test("pairs: net by compensated, gross by uncompensated elasticities, nothing on the diagonal", () => {
  const net = [
    [-1, 0.3],
    [-0.3, -1],
  ];
  const gross = [
    [-1, 0.1],
    [0.3, -1],
  ];
  const classes = classesOfGoods(withErrors([1, 1], gross, net), ["a", "b"]);
  expect(classes.net).toEqual([
    [null, "substitutes"],
    ["complements", null],
  ]);
  expect(classes.gross).toEqual([
    [null, "undecided"],
    ["substitutes", null],
  ]);
});

test("intervals widen with confidence", () => {
  const [low, high] = intervalOf(2, 0.5, 0.95);
  expect(low).toBeCloseTo(2 - 1.959963984540054 * 0.5, 14);
  expect(high).toBeCloseTo(2 + 1.959963984540054 * 0.5, 14);
  expect(intervalOf(2, 0.5, 0.99)[1]).toBeGreaterThan(high);
  expect(() => intervalOf(0, 1, 95)).toThrow("a level of confidence lies between 0 and 1, not at 95");
});
