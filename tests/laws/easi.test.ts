import { describe, expect, it } from "vitest";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { CostFunction, SystemSize } from "../../shared/systems/demand-system.ts";
import { easiPlaces } from "../../shared/systems/easi-layout.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import { implicitUtility } from "../support/implicit-utility.ts";
import { simulateEasi } from "../support/simulated-easi.ts";
import { gap } from "./derivatives.ts";
import { randomCase } from "./random-systems.ts";

const { easi, aids } = SYSTEMS;
const cost = easi.cost as CostFunction;
const ROUNDING = 1e-12;

describe("EASI of degree one without interactions", () => {
  const random = seededRandom(31);
  const cases = Array.from({ length: 40 }, () => {
    const { size: drawn, point, phi } = randomCase(random, "easi", ["homogeneity", "symmetry"]);
    const size: SystemSize = { ...drawn, alpha0: 0, easi: { degree: 1, interactions: [] } };
    const { matrix, offset, places } = easi.free(size, ["homogeneity", "symmetry"]);
    const free = places.map((_, f) => 0.05 * Math.tanh(20 * phi[f % phi.length]) + (f === 0 ? 0.3 : 0));
    const theta = matrix.map((row, a) => row.reduce((sum, weight, f) => sum + weight * free[f], offset[a]));
    const at = easiPlaces(size);
    const goods = Array.from({ length: size.goods }, (_, i) => i);
    const shifts = point.demographics.map((_, k) => k);
    const ofAids = [
      ...goods.map((i) => theta[at.power(i, 0)]),
      ...goods.flatMap((i) => shifts.map((k) => theta[at.demographic(i, k)])),
      ...goods.flatMap((i) => goods.map((j) => theta[at.price(i, j)])),
      ...goods.map((i) => theta[at.power(i, 1)]),
    ];
    const tilt = goods.reduce((sum, i) => sum + theta[at.power(i, 1)] * Math.log(point.prices[i]), 0);
    return { size, point, theta, ofAids, tilt };
  });

  /**
   * With α = b_0 + C z, Γ = A_0, β = b_1 the almost ideal cost is ln P + u Π p^β and EASI's is ln P + u (1 + Σ β ln p),
   * the first two terms of that product's series.
   */
  it("costs what AIDS costs but for the exponential of β'ln p", () => {
    for (const { size, point, theta, ofAids, tilt } of cases) {
      const { prices, demographics } = point;
      const ideal = (u: number) => (aids.cost as CostFunction).logCost(ofAids, size, u, prices, demographics);
      const logIndex = ideal(0);
      const u = 0.7;
      const expected = logIndex + ((ideal(u) - logIndex) * (1 + tilt)) / Math.exp(tilt);
      expect(Math.abs(cost.logCost(theta, size, u, prices, demographics) - expected)).toBeLessThan(ROUNDING);
    }
  });

  /** Both are α + Γ ln p + β·(real expenditure), EASI's ln(x/P) divided by 1 + β'ln p. */
  it("has the shares of AIDS at ln(x/P)/(1 + β'ln p)", () => {
    for (const { size, point, theta, ofAids, tilt } of cases) {
      const logIndex = (aids.cost as CostFunction).logCost(ofAids, size, 0, point.prices, point.demographics);
      const total = Math.exp(logIndex + (Math.log(point.total) - logIndex) / (1 + tilt));
      const expected = aids.slopes(ofAids, size, { ...point, total }).shares;
      expect(gap(easi.slopes(theta, size, point).shares, expected)).toBeLessThan(ROUNDING);
    }
  });
});

it("money in other units shifts utility: Engel curves of any degree are polynomials still", () => {
  const random = seededRandom(32);
  for (let repeat = 0; repeat < 40; repeat++) {
    const { size, theta, point } = randomCase(random, "easi", ["homogeneity", "symmetry"]);
    const { degree, power, demographic, crossed, cross, price, tilted, tilt } = easiPlaces(size);
    const shift = random.normal();
    const other = [...theta];
    for (let i = 0; i < size.goods; i++) {
      // Σ_s b_s (u* − shift)^s, sorted by powers of u*.
      for (let r = 0; r <= degree; r++) {
        let sum = 0;
        for (let s = r; s <= degree; s++) sum += theta[power(i, s)] * binomial(s, r) * (-shift) ** (s - r);
        other[power(i, r)] = sum;
      }
      for (let k = 0; k < crossed; k++) other[demographic(i, k)] -= shift * theta[cross(i, k)];
      for (let j = 0; tilted > 0 && j < size.goods; j++) other[price(i, j)] -= shift * theta[tilt(i, j)];
    }
    const moved = { ...point, total: point.total * Math.exp(shift) };
    expect(gap(easi.slopes(other, size, moved).shares, easi.slopes(theta, size, point).shares)).toBeLessThan(ROUNDING);
    const change = cost.utility(other, size, moved) - cost.utility(theta, size, point);
    expect(Math.abs(change - shift)).toBeLessThan(ROUNDING);
  }
});

it("implicit utility at observed shares is the utility that made them, errors included", () => {
  const interactions = [
    "prices with expenditure",
    "prices with demographics",
    "expenditure with demographics",
  ] as const;
  const { data, theta, size, utility } = simulateEasi({
    goods: 4,
    rows: 60,
    random: seededRandom(33),
    noise: 0.05,
    demographics: 2,
    easi: { degree: 4, interactions },
  });
  for (let t = 0; t < data.rows; t++) {
    const point = {
      prices: data.logPrices.map((column) => Math.exp(column[t])),
      total: Math.exp(data.logTotal[t]),
      demographics: [...data.numeric.values()].map((column) => column[t]),
    };
    const shares = data.shares.map((column) => column[t]);
    expect(Math.abs(implicitUtility(theta, size, point, shares) - utility[t])).toBeLessThan(ROUNDING);
  }
});

describe("where cost falls with utility", () => {
  // F_u = 1 + (ln p_1 − ln p_2) b_1 = 1 − 2·0.6 < 0
  const size: SystemSize = { goods: 2, demographics: 0, alpha0: 0, easi: { degree: 1, interactions: [] } };
  const theta = [0.5, 0.5, 0.6, -0.6, 0, 0, 0, 0];
  const prices = [Math.exp(-1), Math.exp(1)];
  const point = { prices, total: 1.5, demographics: [] };

  it("utility and cost are undefined and shares are refused", () => {
    expect(cost.utility(theta, size, point)).toBeNaN();
    expect(cost.logCost(theta, size, 0.3, prices, [])).toBeNaN();
    expect(() => easi.slopes(theta, size, point)).toThrow("not defined at ln x = 0.4055");
    const evaluator = easi.evaluator(theta, size);
    evaluator.at(prices.map(Math.log), Math.log(1.5), []);
    expect([...evaluator.shares]).toEqual([Number.NaN, Number.NaN]);
    expect(cost.utility(theta, size, { ...point, prices: [1, 1] })).toBe(Math.log(1.5));
  });

  it("a bent Engel curve may cost no more than so much", () => {
    // ln C = u − ½u² turns at u = 1, where it is ½: nothing costs more.
    const bent: SystemSize = { ...size, easi: { degree: 2, interactions: [] } };
    const curved = [0.5, 0.5, 0, -0.25, 0, 0.25, 0, 0, 0, 0];
    const at = (total: number) => cost.utility(curved, bent, { prices: [Math.E, 1 / Math.E], total, demographics: [] });
    expect(at(Math.exp(0.49))).toBeCloseTo(1 - Math.sqrt(0.02), 10);
    expect(at(Math.exp(0.51))).toBeNaN();
  });
});

function binomial(s: number, r: number): number {
  return r === 0 ? 1 : (binomial(s - 1, r - 1) * s) / r;
}
