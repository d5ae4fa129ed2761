import { describe, expect, it } from "vitest";
import {
  digitsForAll,
  plainDigits,
  printCount,
  printFixed,
  printPercent,
  printPowerOfTen,
  printProbability,
  printQuantity,
  printSize,
} from "../../../shared/tables/numbers.ts";

describe("printed numbers", () => {
  it("have U+2212 for minus and a comma for thousands", () => {
    expect(printFixed(-1234567.891, 2)).toBe("\u22121,234,567.89");
    expect(printFixed(-0.0744, 4)).toBe("\u22120.0744");
    expect(printCount(4812)).toBe("4,812");
    expect(printFixed(999.5, 0)).toBe("1,000");
    expect(printFixed(123, 1)).toBe("123.0");
  });

  it("print an exact zero as 0 and one that rounds with its decimals and no sign", () => {
    expect(printFixed(0, 4)).toBe("0");
    expect(printFixed(-0, 4)).toBe("0");
    expect(printFixed(0.00001, 4)).toBe("0.0000");
    expect(printFixed(-0.00001, 4)).toBe("0.0000");
  });

  it("have digits by kind of quantity", () => {
    expect(printQuantity(0.123456, "coefficient")).toBe("0.1235");
    expect(printQuantity(1.31849, "elasticity")).toBe("1.318");
    expect(printQuantity(184.6, "money")).toBe("184.60");
    expect(printPercent(0.99)).toBe("99.0\u2009%");
    expect(printPercent(0)).toBe("0\u2009%");
    expect(printPercent(1)).toBe("100.0\u2009%");
    expect(printPercent(0.0002)).toBe("below 0.1\u2009%");
    expect(printPercent(0.9998)).toBe("above 99.9\u2009%");
    expect(printPercent(0.002, 0)).toBe("below 1\u2009%");
  });

  it("are never in E-notation", () => {
    expect(printSize(3e-16)).toBe("3 × 10⁻¹⁶");
    expect(printSize(-4.4e-17)).toBe("\u22124 × 10⁻¹⁷");
    expect(printSize(0)).toBe("0");
    expect(printSize(0.0123)).toBe("0.012");
    expect(printSize(2.34)).toBe("2.3");
    expect(printSize(12345)).toBe("12,345");
    expect(printFixed(1.5e22, 4)).toBe("1.500 × 10²²");
    expect(printPowerOfTen(-6)).toBe("10⁻⁶");
  });

  it("say that a probability is small rather than print it as nought", () => {
    expect(printProbability(0.0531)).toBe("0.053");
    expect(printProbability(1e-9)).toBe("below 0.001");
  });

  it("turn into what programs read", () => {
    expect(Number(plainDigits(printFixed(-1234.5, 2)))).toBe(-1234.5);
  });
});

describe("digits for a table of like quantities", () => {
  it("show the largest entry with at least four digits whatever the units", () => {
    expect(digitsForAll([0.0274, -0.1])).toEqual({ decimals: 4, exponent: 0 });
    expect(digitsForAll([5321, -12])).toEqual({ decimals: 1, exponent: 0 });
    expect(digitsForAll([3.2e6, 1])).toEqual({ decimals: 0, exponent: 0 });
    expect(digitsForAll([4e-5, -1e-6])).toEqual({ decimals: 3, exponent: -6 });
    expect(digitsForAll([0, 0])).toEqual({ decimals: 4, exponent: 0 });
  });
});
