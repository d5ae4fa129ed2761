import { describe, expect, test } from "vitest";
import { elasticitiesAt } from "../../shared/economics/elasticities.ts";
import { measuresAt } from "../../shared/economics/price-change/measures.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { compensatingVariation, equivalentVariation } from "../../shared/economics/welfare.ts";
import { symmetricEigen } from "../../shared/numerics/eigen.ts";
import type { Point } from "../../shared/systems/demand-system.ts";
import type { FittedCoefficients } from "../../shared/systems/index.ts";
import { exactly } from "../support/fitted.ts";
import { integral } from "../support/quadrature.ts";

/**
 * Systems evaluated once in 40-digit arithmetic by closed form, numerical derivatives and the identities.
 * The digits written here are the twelve that were kept, so values of order one agree to 5e-13.
 */
const DIGITS = 5e-13;

function expectClose(actual: number[] | number[][], expected: number[] | number[][], tolerance = DIGITS): void {
  const [a, b] = [actual.flat(), expected.flat()];
  expect(a.length).toBe(b.length);
  a.forEach((entry, at) => {
    expect(Math.abs(entry - b[at]), `entry ${at}: ${entry} against ${b[at]}`).toBeLessThan(
      tolerance * Math.max(1, Math.abs(b[at])),
    );
  });
}

const UNSCALED = { priceScale: [1, 1, 1], totalScale: 1, pointName: "the golden point" };
const GOODS = ["bread", "cheese", "fruit"];

/** CV and EV of a first price a fifth dearer, as a price change cell computes them. */
function lossesOf(fitted: FittedCoefficients, point: Point): number[] {
  const question = { prices: { [fitted.goods[0]]: { "per cent": 20 } }, expenditure: 0 };
  const { compensating, equivalent } = measuresAt({ fitted, derivatives: false }, point, question);
  return [compensating?.value ?? Number.NaN, equivalent?.value ?? Number.NaN];
}

describe("almost ideal demand system, three goods", () => {
  const theta = [0.5, 0.3, 0.2, 0.06, -0.04, -0.02, -0.04, 0.05, -0.01, -0.02, -0.01, 0.03, -0.1, 0.02, 0.08];
  const fitted = exactly("aids", GOODS, theta, { alpha0: 0.2 });
  const point = { prices: [1.1, 0.9, 1.3], total: 20, demographics: [] };

  test("shares and elasticities", () => {
    const { shares, expenditure, uncompensated, compensated } = elasticitiesAt(fitted, point);
    expectClose(shares, [0.23214055286, 0.342804963033, 0.425054484107], 5e-12);
    expectClose(expenditure, [0.569226493312, 1.0583422125, 1.18821116584], 5e-12);
    expectClose(uncompensated, [
      [-0.524130647353, -0.0481191563661, 0.00302331040745],
      [-0.146128908051, -0.870964290829, -0.0412490136221],
      [-0.142040284122, -0.0777869077652, -0.968383973954],
    ]);
    expectClose(
      compensated,
      [
        [-0.391990094493, 0.147014510631, 0.244975583862],
        [0.0995552382742, -0.508159327796, 0.408604089521],
        [0.13379171283, 0.329537777017, -0.463329489847],
      ],
      5e-12,
    );
  });

  /** mpmath, 40 digits: K = Γ + ββ'm − diag(w) + ww', its eigenvalues in a Helmert basis of the directions orthogonal to ι. */
  test("eigenvalues of the share form away from the null direction", () => {
    const { eigenvalues, checks } = matrixAt(fitted, point, UNSCALED);
    expectClose(
      eigenvalues.map(({ value }) => value),
      [-0.13446639599098738, -0.32767021811875704],
      1e-15,
    );
    expect(checks.negativity.holds).toBe(true);
  });

  test("compensating and equivalent variation of a rise of the first price by a fifth", () => {
    const dearer = [1.1 * 1.2, 0.9, 1.3];
    expectClose([compensatingVariation(fitted, point, dearer)], [0.894876395274953], 1e-13);
    expectClose([equivalentVariation(fitted, point, dearer)], [0.871962423232297], 1e-13);
    expectClose(lossesOf(fitted, point), [0.894876395274953, 0.871962423232297], 1e-12);
  });

  test("the change in consumer's surplus lies between them, the costs of fixed quantities outside", () => {
    const dearer = [1.1 * 1.2, 0.9, 1.3];
    const quantityAt = (prices: number[]) => (elasticitiesAt(fitted, { ...point, prices }).shares[0] * 20) / prices[0];
    const surplus = integral((price) => quantityAt([price, 0.9, 1.3]), 1.1, 1.32);
    expectClose([surplus], [0.883326776082], 1e-12);
    expectClose([quantityAt(dearer) * 0.22], [0.841270262701], 1e-11);
    expectClose([quantityAt(point.prices) * 0.22], [0.928562211439], 1e-11);
  });
});

describe("linear expenditure system, three goods", () => {
  const fitted = exactly("les", GOODS, [10, 4, 2, 0.3, 0.5, 0.2], { imposed: [] });
  const point = { prices: [1, 2, 1.5], total: 50, demographics: [] };

  test("shares, quantities and elasticities", () => {
    const { shares, expenditure, uncompensated, compensated } = elasticitiesAt(fitted, point);
    expectClose(shares, [0.374, 0.45, 0.176]);
    expectClose(
      shares.map((share, i) => (share * 50) / point.prices[i]),
      [18.7, 11.25, 5.86666666667],
      1e-11,
    );
    expectClose(expenditure, [0.802139037433, 1.11111111111, 1.13636363636], 5e-12);
    expectClose(uncompensated, [
      [-0.625668449198, -0.128342245989, -0.048128342246],
      [-0.222222222222, -0.822222222222, -0.0666666666667],
      [-0.227272727273, -0.181818181818, -0.727272727273],
    ]);
    expectClose(compensated, [
      [-0.325668449198, 0.232620320856, 0.0930481283422],
      [0.193333333333, -0.322222222222, 0.128888888889],
      [0.197727272727, 0.329545454545, -0.527272727273],
    ]);
  });

  test("quantity form and its eigenvalues", () => {
    const { quantity, eigenvalues, checks } = matrixAt(fitted, point, UNSCALED);
    expectClose(
      quantity,
      [
        [-6.09, 2.175, 1.16],
        [2.175, -1.8125, 0.966666666667],
        [1.16, 0.966666666667, -2.06222222222],
      ],
      2e-12,
    );
    expectClose(symmetricEigen(quantity).values, [0, -2.8610983799, -7.10362384233], 1e-11);
    // mpmath, 40 digits, as above: K = (bb' − diag(b))·29/50.
    expectClose(
      eigenvalues.map(({ value }) => value),
      [-0.1345005518797414, -0.2250994481202586],
      1e-15,
    );
    expect(checks.negativity.holds).toBe(true);
    expect(checks.symmetry).toMatchObject({ holds: true, status: "by form" });
  });

  test("compensating and equivalent variation of a rise of the first price by a fifth", () => {
    expectClose([compensatingVariation(fitted, point, [1.2, 2, 1.5])], [3.63037908473849], 1e-13);
    expectClose([equivalentVariation(fitted, point, [1.2, 2, 1.5])], [3.437143013025], 1e-12);
    expectClose(lossesOf(fitted, point), [3.63037908473849, 3.437143013025], 1e-12);
  });

  /** Frisch (1959, Econometrica 27): e_ij = δ_ij η_i/ω − η_i w_j (1 + η_j/ω) under directly additive preferences; ω = −50/29. */
  test("elasticities are those of Frisch's scheme", () => {
    const { shares, expenditure, uncompensated } = elasticitiesAt(fitted, point);
    const omega = -50 / 29;
    expectClose(
      uncompensated,
      expenditure.map((own, i) =>
        expenditure.map((other, j) => (i === j ? own / omega : 0) - own * shares[j] * (1 + other / omega)),
      ),
    );
  });

  /** Calibration from (w, η, ω): b = wη, p c/x = w + b/ω; w = (.40, .35, .25), η = (.6, 1.1, 1.5), ω = −2. */
  test("calibrated from shares, expenditure elasticities and Frisch parameter it gives them back", () => {
    const w = [0.4, 0.35, 0.25];
    const eta = [0.6, 1.1, 1.5];
    const b = w.map((share, i) => share * eta[i]);
    const c = w.map((share, i) => share + b[i] / -2);
    expectClose(b, [0.24, 0.385, 0.375], 1e-15);
    expectClose(c, [0.28, 0.1575, 0.0625], 1e-15);
    const calibrated = exactly("les", GOODS, [...c, ...b]);
    const { shares, expenditure } = elasticitiesAt(calibrated, { prices: [1, 1, 1], total: 1, demographics: [] });
    expectClose(shares, w, 1e-15);
    expectClose(expenditure, eta, 1e-14);
  });
});
