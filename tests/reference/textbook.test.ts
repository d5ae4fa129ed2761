import { describe, expect, test } from "vitest";
import { elasticitiesAt } from "../../shared/economics/elasticities.ts";
import { compensatingVariation, equivalentVariation } from "../../shared/economics/welfare.ts";
import { exactly } from "../support/fitted.ts";

/** √(q1 q2): the linear expenditure system with nothing committed and equal marginal shares. */
const cobbDouglas = exactly("les", ["first", "second"], [0, 0, 0.5, 0.5]);
const at = (prices: number[], total: number) => ({ prices, total, demographics: [] });
const quantityOfFirst = (prices: number[], total: number) =>
  (elasticitiesAt(cobbDouglas, at(prices, total)).shares[0] * total) / prices[0];

/** Closed forms, so agreement to rounding of numbers of order a hundred. */
const ROUNDING = 1e-12;

/**
 * H. Varian, Intermediate Microeconomics, chapter 14, "Compensating and Equivalent Variation": u = √(x1 x2),
 * income 100, prices (1, 1) to (2, 1). CV = 100(√2 − 1), EV = 100(1 − 1/√2), change in consumer's surplus
 * 50 ln 2. Chapter and title from memory; values recomputed in closed form.
 */
describe("Varian's compensating and equivalent variation", () => {
  const cv = compensatingVariation(cobbDouglas, at([1, 1], 100), [2, 1]);
  const ev = equivalentVariation(cobbDouglas, at([1, 1], 100), [2, 1]);

  test("quantities", () => {
    expect(quantityOfFirst([1, 1], 100)).toBeCloseTo(50, 12);
    expect(quantityOfFirst([2, 1], 100)).toBeCloseTo(25, 12);
  });
  test("closed forms", () => {
    expect(Math.abs(cv - 100 * (Math.SQRT2 - 1))).toBeLessThan(100 * ROUNDING);
    expect(Math.abs(ev - 100 * (1 - Math.SQRT1_2))).toBeLessThan(100 * ROUNDING);
    expect(cv).toBeCloseTo(41.42135624, 8);
    expect(ev).toBeCloseTo(29.28932188, 8);
  });
  test("consumer's surplus lies between them", () => {
    expect(ev).toBeLessThan(50 * Math.log(2));
    expect(50 * Math.log(2)).toBeLessThan(cv);
  });
  /** The same case decomposed by Hicks: compensated quantity 50/√2, substitution −14.64466094, income −10.35533906. */
  test("the compensated quantity", () => {
    const compensated = quantityOfFirst([2, 1], 100 + cv);
    expect(compensated - 50).toBeCloseTo(-14.64466094, 8);
    expect(25 - compensated).toBeCloseTo(-10.35533906, 8);
  });
});

/**
 * W. Nicholson & C. Snyder, Microeconomic Theory, chapter 5, examples on compensated demand and welfare loss
 * (from memory; recomputed): u = √(x y), prices (1, 4), income 8; the first price rises to 4. Expenditure
 * function 2u√(px py); CV = 8, EV = 4; elasticities −1, −0.5 compensated, 1.
 */
describe("Nicholson and Snyder's hamburgers", () => {
  const before = at([1, 4], 8);

  test("quantities before and after", () => {
    expect(quantityOfFirst([1, 4], 8)).toBeCloseTo(4, 13);
    expect(quantityOfFirst([4, 4], 8)).toBeCloseTo(1, 13);
  });
  test("welfare", () => {
    expect(Math.abs(compensatingVariation(cobbDouglas, before, [4, 4]) - 8)).toBeLessThan(10 * ROUNDING);
    expect(Math.abs(equivalentVariation(cobbDouglas, before, [4, 4]) - 4)).toBeLessThan(10 * ROUNDING);
  });
  test("the compensated quantity is 2: substitution −2, income −1", () => {
    expect(quantityOfFirst([4, 4], 8 + compensatingVariation(cobbDouglas, before, [4, 4]))).toBeCloseTo(2, 12);
  });
  test("elasticities", () => {
    const { expenditure, uncompensated, compensated } = elasticitiesAt(cobbDouglas, before);
    expect(uncompensated[0][0]).toBeCloseTo(-1, 14);
    expect(compensated[0][0]).toBeCloseTo(-0.5, 14);
    expect(expenditure[0]).toBeCloseTo(1, 14);
  });
});
