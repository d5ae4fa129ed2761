import { expect, test } from "vitest";
import { runSystem } from "../../../../server/engine/cells/index.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import { systemOver } from "../../../support/estimating.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";

const simulated = (rows: number, weighted = false) =>
  simulateShares({ form: "aids", goods: 4, rows, random: seededRandom(5), noise: 0.02, weighted }).data;

test("more coefficients than rows are refused before their products are formed", () => {
  const data = { ...simulated(240), time: Float64Array.from({ length: 240 }, (_, t) => t + 1) };
  const started = process.cpuUsage().user;
  expect(() => runSystem(systemOver(data, { form: "aids", season: { period: 240 } }), data)).toThrow(
    // 239 seasons, four log prices, ln x and the constant in each of three equations, and one row for each of those.
    "The data have 240 rows used; 735 free coefficients in 3 equations need at least 248.",
  );
  expect(process.cpuUsage().user - started).toBeLessThan(20e6);
});

test("a few enormous weights are as few rows as they tell, and refused with both numbers", () => {
  const data = simulated(240, true);
  const weights = Float64Array.from({ length: 240 }, (_, t) => (t < 3 ? 80 : 1e-12));
  expect(() => runSystem(systemOver(data, { form: "aids" }), { ...data, weights })).toThrow(
    /^The weights make 240 rows tell as much as 3\.0 of one weight; 18 free coefficients in 3 equations need at least 9\.$/,
  );
  const ordinary = runSystem(systemOver(data, { form: "aids" }), data);
  expect(ordinary.effectiveRows).toBeGreaterThan(100);
});
