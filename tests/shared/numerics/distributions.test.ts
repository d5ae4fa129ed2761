import { expect, test } from "vitest";
import {
  chiSquareTail,
  fTail,
  normalTwoSidedTail,
  tQuantile,
  tTwoSidedTail,
} from "../../../shared/numerics/distributions.ts";
import { normalQuantile } from "../../../shared/numerics/normal.ts";

/** Expected values from mpmath 40-digit arithmetic (regularised gammainc and betainc, erfinv, findroot), as the nearest double. */
function expectRelative(actual: number, expected: number, tolerance: number): void {
  expect(Math.abs(actual / expected - 1), `${actual} against ${expected}`).toBeLessThan(tolerance);
}

test.each([
  [0.5, 1, 0.4795001221869535],
  [3.841458820694124, 1, 0.05000000000000006],
  [10.37876481, 3, 0.015606265956592551],
  [40, 10, 1.6944743930067385e-5],
  [200, 3, 4.2185411071920426e-43],
  [900, 40, 8.168029978662965e-163],
  [0.001, 2, 0.9995001249791693],
])("the χ² tail at %f on %i", (x, df, tail) => {
  // Far in the tail e^{−x/2} multiplies the rounding of x/2, 450 at most here: 450 × 2e-16.
  expectRelative(chiSquareTail(x, df), tail, 2e-13);
});

test.each([
  [3.087592862, 3, 18, 0.05338436123065526],
  [1, 5, 5, 0.5],
  [50, 4, 22, 9.876155844892095e-11],
  [0.1, 13, 4, 0.9993630474134633],
  [2.5, 1, 300, 0.11489999086184288],
])("the F tail at %f on (%i, %i)", (f, a, b, tail) => {
  expectRelative(fTail(f, a, b), tail, 1e-13);
});

test.each([
  [0.975, 20, 2.0859634472658644],
  [0.95, 1, 6.313751514675038],
  [0.995, 3.5, 5.085702223091257],
  [0.999, 1000, 3.0984021639129224],
  [0.975, 2, 4.302652729749462],
])("the t quantile of %f on %f", (p, df, quantile) => {
  expectRelative(tQuantile(p, df), quantile, 1e-12);
  expectRelative(tTwoSidedTail(quantile, df), 2 * (1 - p), 1e-12);
});

test.each([
  [0.975, 1.9599639845400538],
  [0.95, 1.6448536269514722],
  [0.995, 2.5758293035489004],
  [1e-10, -6.361340902404057],
  [0.3, -0.5244005127080408],
])("the normal quantile of %f", (p, quantile) => {
  expectRelative(normalQuantile(p), quantile, 1e-14);
  expectRelative(normalTwoSidedTail(quantile), 2 * Math.min(p, 1 - p), 1e-12);
});

test("at and below zero a tail is everything; impossible degrees of freedom are refused", () => {
  expect(chiSquareTail(0, 3)).toBe(1);
  expect(fTail(-1, 2, 3)).toBe(1);
  expect(normalQuantile(0.5)).toBe(0);
  expect(() => chiSquareTail(1, 0)).toThrow("degrees of freedom must be positive, not 0");
  expect(() => fTail(1, 2, -1)).toThrow("denominator degrees of freedom must be positive, not -1");
});
