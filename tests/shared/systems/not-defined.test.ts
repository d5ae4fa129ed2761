import { expect, test } from "vitest";
import { createRowChecker } from "../../../shared/economics/sample.ts";
import type { Point } from "../../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";

const logs = ({ prices }: Point) => prices.map(Math.log);

test("where the linear system has no index its evaluator leaves NaN, and defines the next point again", () => {
  const theta = [0.4, 0.3, 0.3, ...new Array<number>(9).fill(0), -0.2, 0.05, 0.15];
  const index = { name: "paasche" as const, meanShares: [0.4, 0.3, 0.3], meanPrices: [1e-6, 1, 1e6] };
  const size = { goods: 3, demographics: 0, alpha0: 0, index };
  const evaluator = SYSTEMS["la-aids"].evaluator(theta, size);
  evaluator.at([0, 0, 0], 0, []);
  expect([...evaluator.shares].every(Number.isNaN)).toBe(true);
  const near = { prices: [1e-6, 1, 1e6], total: 1, demographics: [] };
  evaluator.at(logs(near), 0, []);
  expect([...evaluator.shares]).toEqual(SYSTEMS["la-aids"].slopes(theta, size, near).shares);
});

test("the quadratic system is not defined where 1 + λ(p) y ≤ 0, though it has shares there, unless no law gives it utility", () => {
  const theta = [0.5, 0.5, 0, 0, 0, 0, 0, 0, 0.3, -0.3];
  const fitted = { form: "quaids" as const, goods: ["a", "b"], demographics: [], alpha0: 0, theta };
  // λ(p) = 0.3 (ln p_1 − ln p_2) and b(p) = 1, ln a(p) = ½(ln p_1 + ln p_2) = 0: 1 + λ(p) y = 1 − 0.6 ln x.
  const logPrices = [-1, 1];
  const definedAt = (imposed: ("homogeneity" | "symmetry")[], logTotal: number) => {
    const checker = createRowChecker({ ...fitted, imposed });
    checker.evaluate(logPrices, logTotal, []);
    expect(Number.isFinite(checker.lowestShare())).toBe(true);
    return checker.isDefined();
  };
  const both = ["homogeneity", "symmetry"] as const;
  const { cost } = SYSTEMS.quaids;
  if ("absent" in cost) throw new Error("the quadratic system has a cost function");
  for (const logTotal of [1.6, 1.66, 1.67, 3]) {
    const point = { prices: logPrices.map(Math.exp), total: Math.exp(logTotal), demographics: [] };
    const utility = cost.utility(theta, { goods: 2, demographics: 0, alpha0: 0 }, point);
    expect(definedAt([...both], logTotal)).toBe(Number.isFinite(utility));
    expect(definedAt([...both], logTotal)).toBe(logTotal < 1 / 0.6);
  }
  expect(definedAt([], 3)).toBe(true);
});
