import { expect, test } from "vitest";
import type { Point } from "../../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { PRICE_INDEX_NAMES } from "../../../shared/systems/names.ts";
import { logPriceIndex } from "../../../shared/systems/price-indices.ts";

const system = SYSTEMS["la-aids"];
const theta = [0.5, 0.3, 0.2, 0.06, -0.04, -0.02, -0.04, 0.05, -0.01, -0.02, -0.01, 0.03, -0.1, 0.02, 0.08];
const sizeWith = (name: (typeof PRICE_INDEX_NAMES)[number], meanPrices = [1, 1, 1]) => ({
  goods: 3,
  demographics: 0,
  alpha0: 0,
  index: { name, meanShares: [0.4, 0.35, 0.25], meanPrices },
});

test("at mean prices the deflated total is the total, whatever the index", () => {
  const point: Point = { prices: [1, 1, 1], total: 2, demographics: [] };
  for (const name of PRICE_INDEX_NAMES) {
    const { shares } = system.slopes(theta, sizeWith(name), point);
    [0.5, 0.3, 0.2].forEach((alpha, i) => {
      expect(shares[i]).toBeCloseTo(alpha + theta[12 + i] * Math.log(2), 15);
    });
  }
});

/** The index of a row whose observed shares are the predicted ones, put into the share equations, predicts them again. */
test("predicted shares are the fixed point of their own index", () => {
  const point: Point = { prices: [1.2, 0.8, 1.1], total: 1.5, demographics: [] };
  const logs = point.prices.map(Math.log);
  for (const name of PRICE_INDEX_NAMES) {
    const size = sizeWith(name, [1.05, 0.9, 1]);
    const { shares } = system.slopes(theta, size, point);
    const [logIndex] = logPriceIndex(
      size.index,
      shares.map((share) => [share]),
      logs.map((log) => [log]),
    );
    const again = shares.map(
      (_, i) =>
        theta[i] +
        logs.reduce((sum, log, j) => sum + theta[3 + 3 * i + j] * log, 0) +
        theta[12 + i] * (Math.log(1.5) - logIndex),
    );
    again.forEach((share, i) => {
      expect(share).toBeCloseTo(shares[i], 14);
    });
  }
});

/** Chalfant's (1987) elasticities, −δ_ij + (γ_ij − β_i w_j)/w_i, at the base point by hand: w = α. */
test("slopes are Chalfant's", () => {
  const { prices, total } = system.slopes(theta, sizeWith("tornqvist"), {
    prices: [1, 1, 1],
    total: 1,
    demographics: [],
  });
  expect(prices[0][1]).toBeCloseTo(-0.04 + 0.1 * 0.3, 15);
  expect(prices[2][2]).toBeCloseTo(0.03 - 0.08 * 0.2, 15);
  expect(total).toEqual([-0.1, 0.02, 0.08]);
});

test("evaluation without an index, or with means of another length, is refused", () => {
  const point: Point = { prices: [1, 1, 1], total: 1, demographics: [] };
  expect(() => system.slopes(theta, { goods: 3, demographics: 0, alpha0: 0 }, point)).toThrow("none were given");
  expect(() => system.slopes(theta, sizeWith("stone", [1, 1]), point)).toThrow(
    "mean prices has 2 entries, the system has 3 goods",
  );
});

test("prices so far from the sample's that the index's own shares have no solution are refused", () => {
  const steep = [...theta.slice(0, 12), -0.2, 0.05, 0.15];
  const far = sizeWith("paasche", [1e-6, 1, 1e6]);
  // 1 + Σ β_k d_k with d = (ln 10⁶, 0, −ln 10⁶).
  expect(1 - 0.35 * Math.log(1e6)).toBeLessThan(-3.8);
  expect(() => system.slopes(steep, far, { prices: [1, 1, 1], total: 1, demographics: [] })).toThrow(
    "1 + a Σ β_k d_k must be above 0 and is 3.835 below it",
  );
  const near = system.slopes(steep, far, { prices: [1e-6, 1, 1e6], total: 1, demographics: [] });
  expect(near.shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 14);
});
