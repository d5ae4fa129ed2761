import { describe, expect, test } from "vitest";
import { theoryChecksAt } from "../../../shared/economics/checks.ts";
import { compareMatrices } from "../../../shared/economics/compare.ts";
import { directionInWords, goodsOfDirection } from "../../../shared/economics/eigenvalues.ts";
import { formulaParts } from "../../../shared/economics/formula.ts";
import { createRowChecker } from "../../../shared/economics/sample.ts";
import { matrixAt } from "../../../shared/economics/slutsky.ts";
import { seededRandom } from "../../../shared/numerics/random.ts";
import { type MatrixAtPoint, matrixAtPoint } from "../../../shared/schemas/slutsky.ts";
import { type FittedSystem, fittedSystem } from "../../../shared/schemas/system.ts";
import { randomCase } from "../../laws/random-systems.ts";
import { exactly, fittedFrom } from "../../support/fitted.ts";
import { ownTime } from "../../support/own-time.ts";

const GOODS = ["grains", "dairy", "sweet drinks"];
/** α, Γ and β of an almost ideal system whose base point is easy by hand. */
const THETA = [0.5, 0.3, 0.2, 0.06, -0.04, -0.02, -0.04, 0.05, -0.01, -0.02, -0.01, 0.03, -0.1, 0.02, 0.08];
const BASE = { prices: [1, 1, 1], total: 1, demographics: [] };
const TWO = { prices: [1.2, 0.9], total: 1.1, demographics: [] };
const twoScales = { priceScale: [1, 1], totalScale: 1, pointName: "row 1" };
const options = (pointName = "base point") => ({ priceScale: [2, 4, 5], totalScale: 100, pointName });

describe("matrixAt", () => {
  const fitted = exactly("aids", GOODS, THETA);
  const at = matrixAt(fitted, BASE, options());

  /** At p = 1, x = 1 with α₀ = 0: k_ij = γ_ij − α_i δ_ij + α_i α_j (Moschini 1998, European Economic Review 42, p. 351). */
  test("the base point by hand", () => {
    expect(at.shares).toEqual([0.5, 0.3, 0.2]);
    const byHand = [
      [0.06 - 0.5 + 0.25, -0.04 + 0.15, -0.02 + 0.1],
      [-0.04 + 0.15, 0.05 - 0.3 + 0.09, -0.01 + 0.06],
      [-0.02 + 0.1, -0.01 + 0.06, 0.03 - 0.2 + 0.04],
    ];
    for (const [i, row] of byHand.entries()) {
      for (const [j, entry] of row.entries()) {
        expect(at.share[i][j]).toBeCloseTo(entry, 15);
        expect(at.compensated[i][j]).toBeCloseTo(entry / [0.5, 0.3, 0.2][i], 14);
        expect(at.quantity[i][j]).toBeCloseTo((entry * 100) / ([2, 4, 5][i] * [2, 4, 5][j]), 13);
      }
    }
  });

  test("two eigenvalues whose sum is the trace, and the laws in one place", () => {
    expect(at.eigenvalues.length).toBe(2);
    expect(at.eigenvalues[0].value + at.eigenvalues[1].value).toBeCloseTo(-0.19 - 0.16 - 0.13, 14);
    expect(at.checks).toEqual(theoryChecksAt(fitted, BASE, "base point"));
    expect(at.checks.negativity).toEqual({
      stated: true,
      largest: at.eigenvalues[0].value,
      standardError: 0,
      holds: true,
    });
    expect(at.checks.monotonicity).toEqual({ holds: true, lowest: 0.2, highest: 0.5 });
  });

  test("is a finding by its schema, from a fitted system by its schema", () => {
    const random = seededRandom(5);
    for (const form of ["aids", "la-aids", "les"] as const) {
      const { size, free, theta, point } = randomCase(random, form, ["homogeneity", "symmetry"]);
      const drawn = fittedFrom(random, form, size, ["homogeneity", "symmetry"], free, theta);
      const parsed: FittedSystem = fittedSystem.parse(drawn);
      const scales = { priceScale: point.prices, totalScale: 3, pointName: "mean" };
      const found: MatrixAtPoint = matrixAt(parsed, point, scales);
      expect(matrixAtPoint.parse(found)).toEqual(found);
    }
  });

  test("negativity that fails is said to fail", () => {
    const wrong = exactly(
      "aids",
      GOODS,
      THETA.map((entry, at) => (at >= 3 && at < 12 ? 8 * entry : entry)),
    );
    const { negativity } = matrixAt(wrong, BASE, options()).checks;
    expect(negativity.holds).toBe(false);
    expect(negativity.largest).toBeGreaterThan(0.1);
  });

  test("without homogeneity there are no eigenvalues and negativity is not stated", () => {
    const unrestricted = exactly("aids", GOODS, THETA, { imposed: [] });
    const free = matrixAt(unrestricted, BASE, options());
    expect(free.eigenvalues).toEqual([]);
    expect(free.checks.negativity).toEqual({ stated: false });
    expect(free.checks.homogeneity.status).toBe("free");
  });

  test("far from the sample, where entries are large, laws that hold by form are judged in proportion", () => {
    const les = exactly("les", GOODS, [0.3, 0.2, 0.1, 0.37, 0.41, 0.22], { imposed: [] });
    const far = matrixAt(les, { prices: [1e6, 3e-3, 7e4], total: 0.37, demographics: [] }, options());
    expect(Math.max(...far.share.flat().map(Math.abs))).toBeGreaterThan(1e5);
    expect(far.checks.symmetry).toMatchObject({ status: "by form", holds: true });
    expect(far.checks.homogeneity).toMatchObject({ status: "by form", holds: true });
    expect(far.checks.tolerance).toBeGreaterThan(1e-3);
    expect(far.checks.negativity.holds).toBe(false);
  });

  test("of two goods, homogeneity imposes symmetry too", () => {
    const two = ["bread", "milk"];
    const theta = [0.4, 0.6, 0.05, -0.05, -0.05, 0.05, 0.1, -0.1];
    const { symmetry } = matrixAt(exactly("aids", two, theta, { imposed: ["homogeneity"] }), TWO, twoScales).checks;
    expect(symmetry).toMatchObject({ status: "imposed", holds: true });
    const three = matrixAt(exactly("aids", GOODS, THETA, { imposed: ["homogeneity"] }), BASE, options());
    expect(three.checks.symmetry.status).toBe("free");
    const free = matrixAt(exactly("aids", two, [...theta.slice(0, 6), 0.1, -0.1], { imposed: [] }), TWO, twoScales);
    expect(free.checks.symmetry.status).toBe("free");
  });

  test("refusals name the thing and both numbers", () => {
    expect(() => matrixAt(fitted, BASE, { ...options(), priceScale: [1] })).toThrow(
      "priceScale has 1 entries, the system has 3 goods",
    );
    expect(() => matrixAt({ ...fitted, covariance: [[1]] }, BASE, options())).toThrow(
      "the covariance has 1 rows, the almost ideal demand system has 15 coefficients",
    );
    const zero = exactly("aids", GOODS, [0.8, 0.2, 0, ...THETA.slice(3)]);
    expect(() => matrixAt(zero, BASE, options())).toThrow("the predicted share of sweet drinks is 0");
  });
});

describe("directions in words", () => {
  test("largest entry on each side, a second one when nearly as large", () => {
    expect(directionInWords([-0.1, -0.6, 0.7], GOODS)).toBe("sweet drinks against dairy");
    expect(directionInWords([0.42, 0.4, -0.82], GOODS)).toBe("grains and dairy against sweet drinks");
    expect(goodsOfDirection([-0.7, 0.1, 0.6], GOODS)).toEqual(["grains", "sweet drinks"]);
  });
});

describe("compareMatrices", () => {
  const fitted = exactly("aids", GOODS, THETA);
  const sealed = matrixAt(fitted, BASE, options());

  test("the same coefficients give the same matrix, exactly", () => {
    const passed: typeof sealed = JSON.parse(JSON.stringify(sealed));
    expect(compareMatrices(passed, matrixAt(fitted, BASE, options()))).toEqual({
      matrix: 0,
      quantity: 0,
      standardErrors: 0,
      eigenvalues: 0,
      checks: 0,
      verdictsAgree: true,
      largest: 0,
    });
  });

  test("a change in one part is found in that part", () => {
    const touched = structuredClone(sealed);
    touched.shareErrors[1][2] += 1e-5;
    touched.quantity[0][0] *= 1 + 1e-3;
    touched.checks.symmetry.holds = false;
    const found = compareMatrices(touched, sealed);
    expect(found.matrix).toBe(0);
    expect(found.standardErrors).toBeCloseTo(1e-5, 12);
    expect(found.quantity).toBeGreaterThan(1e-4);
    expect(found.largest).toBe(found.quantity);
    expect(found.verdictsAgree).toBe(false);
  });

  test.each([
    ["addingUp", { holds: false }],
    ["homogeneity", { holds: false }],
    ["homogeneity", { status: "free" }],
    ["symmetry", { holds: false }],
    ["symmetry", { status: "by form" }],
    ["negativity", { holds: false }],
    ["negativity", { stated: false }],
    ["monotonicity", { holds: false }],
  ] as const)("a sealed verdict on %s that differs is told: %o", (law, change) => {
    const checks = { ...sealed.checks, [law]: { ...sealed.checks[law], ...change } };
    expect(compareMatrices({ ...sealed, checks }, sealed).verdictsAgree).toBe(false);
  });

  test("matrices of different sizes are refused", () => {
    const two = matrixAt(
      exactly("les", ["a", "b"], [0, 0, 0.5, 0.5]),
      { ...BASE, prices: [1, 1] },
      {
        ...options(),
        priceScale: [1, 1],
      },
    );
    expect(() => compareMatrices(sealed, two)).toThrow("shares: 3 columns are sealed, 2 were recomputed");
  });
});

describe("formulaParts", () => {
  test("k_ij = μ_ij + (w_i + μ_i) w_j with its numbers, at the base point", () => {
    const parts = formulaParts(exactly("aids", GOODS, THETA), BASE, 1, 2);
    expect(parts).toMatchObject({ own: false, share: 0.3, totalSlope: 0.02, otherShare: 0.2 });
    expect(parts.priceSlope).toBeCloseTo(-0.01 - 0.02 * 0.2, 15);
    expect(parts.value).toBeCloseTo(-0.01 + 0.06, 15);
    expect(parts.priceSlopeTerms).toEqual([
      { sign: 1, factors: [{ symbol: "γ_ij", value: -0.01 }] },
      {
        sign: -1,
        factors: [
          { symbol: "β_i", value: 0.02 },
          { symbol: "α_j", value: 0.2 },
        ],
      },
    ]);
  });

  test("on the diagonal the own share is taken off, and value is the matrix's entry", () => {
    const fitted = exactly("les", GOODS, [0.1, 0.2, 0.1, 0.3, 0.5, 0.2]);
    const point = { ...BASE, prices: [1.1, 0.9, 1.2] };
    const { share } = matrixAt(fitted, point, options());
    for (const [i, row] of share.entries()) {
      for (const [j, entry] of row.entries()) {
        const parts = formulaParts(fitted, point, i, j);
        expect(parts.value).toBe(entry);
        expect(parts.own).toBe(i === j);
      }
    }
  });
});

/**
 * Twelve goods, a hundred thousand rows: about half a second on an ordinary machine. The bound is ten times that, for
 * machines that do other things too: it catches a slip of an order of magnitude and nothing finer.
 */
test("the row checker is fast", () => {
  const n = 12;
  const random = seededRandom(12);
  const alpha = Array.from({ length: n }, () => 1 / n);
  const fitted = exactly(
    "aids",
    alpha.map((_, i) => `good ${i}`),
    [...alpha, ...new Array(n * n).fill(0), ...new Array(n).fill(0)],
  );
  const checker = createRowChecker(fitted);
  const logPrices = new Float64Array(n);
  let held = 0;
  const check = () => {
    for (let row = 0; row < 100_000; row++) {
      for (let j = 0; j < n; j++) logPrices[j] = random.uniform() - 0.5;
      checker.evaluate(logPrices, 0, []);
      if (checker.largestEigenvalue() <= 1e-8) held++;
    }
  };
  expect(ownTime(check, 1)).toBeLessThan(5000);
  // Once to warm up, once timed.
  expect(held).toBe(200_000);
});
