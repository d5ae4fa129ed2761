import { expect, test } from "vitest";
import { PRICE_INDEX_NAMES, type PriceIndexName } from "../../../shared/systems/names.ts";
import { logPriceIndex, priceIndexOf } from "../../../shared/systems/price-indices.ts";

/** Two goods, three rows; the numbers below follow by hand from ln 2 = λ. */
const lambda = Math.log(2);
const shares = [
  [0.5, 0.25, 0.75],
  [0.5, 0.75, 0.25],
];
const logPrices = [
  [0, lambda, 0],
  [lambda, 0, 0],
];
const at = (name: PriceIndexName) =>
  Array.from(logPriceIndex({ name, meanShares: [0.5, 0.5], meanPrices: [1, 2] }, shares, logPrices));

test("each index by hand", () => {
  const close = (name: PriceIndexName, expected: number[]) =>
    expected.forEach((value, t) => {
      expect(at(name)[t]).toBeCloseTo(value, 15);
    });
  // Σ w_k ln p_k
  close("stone", [0.5 * lambda, 0.25 * lambda, 0]);
  // Σ w_k (ln p_k − ln p̄_k), ln p̄ = (0, λ)
  close("paasche", [0, 0.25 * lambda - 0.75 * lambda, -0.25 * lambda]);
  close("laspeyres", [0, 0, -0.5 * lambda]);
  // ½ of Paasche and Laspeyres
  close("tornqvist", [0, -0.25 * lambda, -0.375 * lambda]);
});

test("with prices of mean one Paasche and Stone coincide", () => {
  const means = { meanShares: [0.5, 0.5], meanPrices: [1, 1] };
  expect(logPriceIndex({ name: "paasche", ...means }, shares, logPrices)).toEqual(
    logPriceIndex({ name: "stone", ...means }, shares, logPrices),
  );
});

test("means are of shares and of prices, not of their logs, and weighted", () => {
  const plain = priceIndexOf("tornqvist", shares, logPrices);
  expect(plain.meanShares).toEqual([0.5, 0.5]);
  expect(plain.meanPrices[0]).toBeCloseTo(4 / 3, 15);
  const weighted = priceIndexOf("tornqvist", shares, logPrices, [1, 2, 1]);
  expect(weighted.meanShares[0]).toBeCloseTo((0.5 + 0.5 + 0.75) / 4, 15);
  expect(weighted.meanPrices[0]).toBeCloseTo((1 + 4 + 1) / 4, 15);
});

test("lengths that differ are refused with both numbers", () => {
  for (const name of PRICE_INDEX_NAMES) {
    expect(() => logPriceIndex({ name, meanShares: [1], meanPrices: [1, 1] }, shares, logPrices)).toThrow(
      "mean shares has 1 goods, prices has 2",
    );
  }
});
