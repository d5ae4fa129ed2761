import { describe, expect, test } from "vitest";
import { changeAt } from "../../shared/economics/price-change/change-at.ts";
import { integratedCost } from "../../shared/economics/price-change/integrated-cost.ts";
import { exactly } from "../support/fitted.ts";
import { integral } from "../support/quadrature.ts";

/** √(q1 q2): the linear expenditure system with nothing committed and equal marginal shares. */
const cobbDouglas = exactly("les", ["first", "second"], [0, 0, 0.5, 0.5]);
const at = (prices: number[], total: number) => ({ prices, total, demographics: [] });
const asIs = { priceScale: [1, 1], totalScale: 1, level: 0.95 };

/**
 * H. Varian, Intermediate Microeconomics, chapter 8, "Slutsky Equation", example "Calculating the Substitution Effect"
 * (title and chapter from memory; recomputed): milk, x1 = 10 + m/(10 p1), m = 120, price 3 to 2. At p2 = 1 this demand is the
 * linear expenditure system's only in x1's own price: c p1 + b (m − c p1) = 10 p1 + m/10 with b = 1/10 and c = 100/9, of the
 * other good nothing committed. Bought 14 before, 16 after, 15.3 with the money that buys the first bundle:
 * substitution +1.3, income +0.7.
 */
test("Varian's milk: Slutsky's substitution 1.3 and income 0.7", () => {
  const milk = exactly("les", ["milk", "rest"], [100 / 9, 0, 0.1, 0.9]);
  const { quantities, slutsky, total } = changeAt(
    milk,
    at([3, 1], 120),
    { prices: { milk: { to: 2 } }, expenditure: 0 },
    asIs,
  );
  expect(quantities.before.values[0]).toBeCloseTo(14, 12);
  expect(quantities.after?.values[0]).toBeCloseTo(16, 12);
  expect(quantities.slutsky?.values[0]).toBeCloseTo(15.3, 12);
  expect(slutsky?.substitution.values[0]).toBeCloseTo(1.3, 12);
  expect(slutsky?.income.values[0]).toBeCloseTo(0.7, 12);
  expect(total?.values[0]).toBeCloseTo(2, 12);
});

/**
 * H. Varian, Intermediate Microeconomics, chapter 14, "Compensating and Equivalent Variation" (chapter and title from
 * memory; recomputed in closed form): u = √(x1 x2), income 100, prices (1, 1) to (2, 1).
 */
describe("Varian's variations, decomposed", () => {
  const question = { prices: { first: { "per cent": 100 } }, expenditure: 0 };
  const { welfare, marshallian, hicks, slutsky, quantities, costOfLiving } = changeAt(
    cobbDouglas,
    at([1, 1], 100),
    question,
    asIs,
  );

  test("CV 41.42135624, EV 29.28932188, Marshallian 34.65735903", () => {
    expect(welfare?.compensating.value).toBeCloseTo(100 * (Math.SQRT2 - 1), 11);
    expect(welfare?.equivalent.value).toBeCloseTo(100 * (1 - Math.SQRT1_2), 11);
    expect(marshallian?.value).toBeCloseTo(50 * Math.LN2, 11);
  });
  test("Hicks: −14.64466094 and −10.35533906; Slutsky: −12.5 and −12.5", () => {
    expect(quantities.hicks?.values[0]).toBeCloseTo(50 / Math.SQRT2, 11);
    expect(hicks?.substitution.values[0]).toBeCloseTo(-14.64466094, 8);
    expect(hicks?.income.values[0]).toBeCloseTo(-10.35533906, 8);
    expect(slutsky?.substitution.values[0]).toBeCloseTo(-12.5, 11);
    expect(slutsky?.income.values[0]).toBeCloseTo(-12.5, 11);
  });
  test("the cost of living rises by √2; 1.5 by Laspeyres, 4/3 by Paasche", () => {
    expect(costOfLiving.atUtilityBefore?.value).toBeCloseTo(Math.SQRT2, 13);
    expect(costOfLiving.laspeyres.value).toBeCloseTo(1.5, 13);
    expect(costOfLiving.paasche?.value).toBeCloseTo(4 / 3, 13);
  });
});

/**
 * W. Nicholson & C. Snyder, Microeconomic Theory, chapter 5, hamburgers (from memory, high; recomputed): u = √(x y), prices
 * (1, 4), income 8; the first price to 4. CV 8, EV 4, ΔCS 4 ln 4 (the book prints 5.55); substitution −2, income −1.
 */
test("Nicholson and Snyder's hamburgers", () => {
  const question = { prices: { first: { to: 4 } }, expenditure: 0 };
  const { welfare, marshallian, hicks } = changeAt(cobbDouglas, at([1, 4], 8), question, asIs);
  expect(welfare?.compensating.value).toBeCloseTo(8, 12);
  expect(welfare?.equivalent.value).toBeCloseTo(4, 12);
  expect(marshallian?.value).toBeCloseTo(4 * Math.log(4), 11);
  expect(marshallian?.value).toBeCloseTo(5.55, 2);
  expect(hicks?.substitution.values[0]).toBeCloseTo(-2, 12);
  expect(hicks?.income.values[0]).toBeCloseTo(-1, 12);
});

/**
 * J. A. Hausman, "Exact Consumer's Surplus and Deadweight Loss", American Economic Review 71(4), 1981, 662–676: gasoline,
 * q = −14.22 p + 0.082 y + 4.95, y = 720, price 0.75 to 1.50. Inputs from memory (high: they reproduce the remembered 37.17);
 * values recomputed in closed form, CV = (1/δ){e^{δΔp}[q0 + α/δ] − [q1 + α/δ]}, and by another integrator. Here only demand is
 * known: cost is integrated, its formula is not used.
 */
describe("Hausman's gasoline, by integrating compensated demand", () => {
  const [alpha, delta, gamma] = [-14.22, 0.082, 4.95];
  const [y, p0, p1] = [720, 0.75, 1.5];
  const demand = ([price]: readonly number[], income: number) => [alpha * price + delta * income + gamma];
  const cv = integratedCost(demand, [p0], [p1], y) - y;
  const ev = y - integratedCost(demand, [p1], [p0], y);
  const [q0] = demand([p0], y);
  const [q1] = demand([p1], y);

  test("quantities 53.325 and 42.66", () => {
    expect(q0).toBeCloseTo(53.325, 12);
    expect(q1).toBeCloseTo(42.66, 12);
  });
  test("CV 37.16652290 (printed 37.17), EV 34.94964930", () => {
    const closed = (Math.exp(delta * (p1 - p0)) * (q0 + alpha / delta) - (q1 + alpha / delta)) / delta;
    expect(Math.abs(cv - closed)).toBeLessThan(1e-9);
    expect(cv).toBeCloseTo(37.1665229, 7);
    expect(ev).toBeCloseTo(34.9496493, 7);
  });
  test("the deadweight loss of the exact measures is far from the Marshallian triangle", () => {
    const [compensated] = demand([p1], y + cv);
    expect(compensated).toBeCloseTo(45.70765488, 8);
    const surplus = integral((price) => demand([price], y)[0], p0, p1);
    expect(surplus).toBeCloseTo(35.994375, 10);
    // Loss net of the revenue of a tax of the rise, at the compensated and at the ordinary quantity.
    const exact = cv - (p1 - p0) * compensated;
    expect(exact).toBeCloseTo(2.88578175, 7);
    expect(ev - (p1 - p0) * q1).toBeCloseTo(2.9546493, 7);
    const triangle = surplus - (p1 - p0) * q1;
    expect(triangle).toBeCloseTo(3.999375, 10);
    expect(surplus / cv).toBeGreaterThan(0.96);
    expect(triangle / exact).toBeGreaterThan(1.38);
  });
});
