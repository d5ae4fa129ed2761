import { describe, expect, test } from "vitest";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { BlockColumns, Point, SystemSize } from "../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import type { BaseColumn, MomentForm, MomentTerm } from "../../shared/systems/moment-form.ts";
import { type InteractionName, SYSTEM_NAMES } from "../../shared/systems/names.ts";
import { logPriceIndex } from "../../shared/systems/price-indices.ts";
import { implicitUtility } from "../support/implicit-utility.ts";
import { derivative, gap, moved, repriced } from "./derivatives.ts";
import { IMPOSED, randomCase, randomPoint, stepOf, thetaOf } from "./random-systems.ts";

const CASES = 40;
/** Sums of at most a few hundred terms of order one: 1e-12 is a thousand roundings. */
const ROUNDING = 1e-12;
/** Richardson's central differences at h = 0.02: truncation h⁶ ≈ 6e-11 times sixth derivatives of order one (see derivatives.ts). */
const NUMERICAL = 1e-9;

describe.each(SYSTEM_NAMES)("%s", (name) => {
  const system = SYSTEMS[name];
  /** A system in differences has laws of its own (differences.test.ts), and must say why not these. */
  const hasNoShareFunction = () => {
    expect(system.shareFunction?.absent.includes("no level of shares")).toBe(
      system.kind === "differences" ? true : undefined,
    );
    return system.kind === "differences";
  };

  describe.each(IMPOSED)("with %s %s imposed", (...impose) => {
    const cases = (seed: number) => {
      const random = seededRandom(seed);
      return Array.from({ length: CASES }, () => randomCase(random, name, impose));
    };

    test("the layout has one place for each coefficient of each block", () => {
      for (const { size, theta } of cases(1)) {
        const layout = system.layout(size);
        expect(layout.length).toBe(theta.length);
        const columns = columnsOf(size);
        for (const block of system.blocks) {
          const places = layout.filter((place) => place.block === block.name);
          expect(places.length).toBe(size.goods * columns[block.columns]);
          expect(new Set(places.map(({ good, column }) => `${good}/${column}`)).size).toBe(places.length);
        }
      }
    });

    test("the free coefficients are the named ones of theta, and the start satisfies the restrictions", () => {
      for (const { size, free, phi, theta } of cases(2)) {
        expect(
          gap(
            free.places.map((place) => theta[place]),
            phi,
          ),
        ).toBe(0);
        const start = system.start(
          size,
          Array.from({ length: size.goods }, () => 1 / size.goods),
        );
        const back = thetaOf(
          free,
          free.places.map((place) => start[place]),
        );
        expect(gap(back, start)).toBeLessThan(1e-15);
      }
    });

    test("predicted shares add up to one at every point, their slopes to nothing", () => {
      for (const { size, theta, point } of cases(3)) {
        const { shares, total, prices } = system.slopes(theta, size, point);
        const sum = (entries: number[]) => entries.reduce((a, b) => a + b, 0);
        expect(Math.abs(sum(shares) - 1)).toBeLessThan(ROUNDING);
        expect(Math.abs(sum(total))).toBeLessThan(ROUNDING);
        for (let j = 0; j < size.goods; j++) expect(Math.abs(sum(prices.map((row) => row[j])))).toBeLessThan(ROUNDING);
      }
    });

    test("slopes are the derivatives of the shares", () => {
      if (hasNoShareFunction()) return;
      for (const { size, theta, point } of cases(4)) {
        const { shares, total, prices } = system.slopes(theta, size, point);
        const sharesNear =
          system.sharesNear?.(theta, size, point) ?? ((nearby: Point) => system.slopes(theta, size, nearby).shares);
        expect(gap(sharesNear(point), shares)).toBeLessThan(ROUNDING);
        const byTotal = derivative((step) => sharesNear({ ...point, total: point.total * Math.exp(step) }));
        expect(gap(byTotal, total)).toBeLessThan(NUMERICAL);
        for (let j = 0; j < size.goods; j++) {
          const byPrice = derivative((step) => sharesNear({ ...point, prices: repriced(point.prices, j, step) }));
          expect(
            gap(
              byPrice,
              prices.map((row) => row[j]),
            ),
          ).toBeLessThan(NUMERICAL);
        }
      }
    });

    test("derivatives of shares and slopes in theta are exact", () => {
      for (const { size, theta, point } of cases(5).slice(0, 12)) {
        const exact = system.slopeDerivatives(theta, size, point);
        const layout = system.layout(size);
        for (let a = 0; a < theta.length; a++) {
          const step = stepOf(layout[a]);
          const at = (by: number) => system.slopes(moved(theta, a, by), size, point);
          expect(
            gap(
              derivative((by) => at(by).shares, step),
              exact.shares.map((row) => row[a]),
            ),
          ).toBeLessThan(NUMERICAL);
          expect(
            gap(
              derivative((by) => at(by).total, step),
              exact.total.map((row) => row[a]),
            ),
          ).toBeLessThan(NUMERICAL);
          expect(
            gap(
              derivative((by) => at(by).prices.flat(), step),
              exact.prices.flat().map((row) => row[a]),
            ),
          ).toBeLessThan(NUMERICAL);
        }
      }
    });

    test("C(theta) Z predicts the shares, and its derivatives in theta are exact", () => {
      if (hasNoShareFunction()) return;
      for (const { size, theta, point } of cases(6).slice(0, 12)) {
        const { shares } = system.slopes(theta, size, point);
        const z = system.moments.terms(size).map((term) => termAt(term, point, shares, size, theta, system.moments));
        const predict = (coefficients: number[][]) =>
          coefficients.map((row) => row.reduce((sum, entry, term) => sum + entry * z[term], 0));
        expect(gap(predict(system.moments.coefficients(theta, size)), shares)).toBeLessThan(ROUNDING);
        const sparse = system.moments.derivatives(theta, size);
        expect(sparse.length).toBe(theta.length);
        const { local } = system.moments;
        for (const { term, of } of local?.combinations?.(theta, size) ?? []) {
          const combined = of.reduce((sum, [other, weight]) => sum + weight * z[other], 0);
          expect(Math.abs(combined - z[term])).toBeLessThan(ROUNDING);
        }
        for (let a = 0; a < theta.length; a++) {
          const dense = system.moments.coefficients(theta, size).map((row) => row.map(() => 0));
          for (const [good, term, value] of sparse[a]) dense[good][term] += value;
          if (local !== undefined) {
            // Its columns move with θ too: what is exact is the derivative of the shares predicted.
            const sharesAt = (step: number) => system.slopes(moved(theta, a, step), size, point).shares;
            expect(gap(derivative(sharesAt), predict(dense))).toBeLessThan(NUMERICAL);
            continue;
          }
          const numerical = derivative((step) => system.moments.coefficients(moved(theta, a, step), size).flat());
          expect(gap(numerical, dense.flat())).toBeLessThan(NUMERICAL);
        }
      }
    });

    test("the evaluator and the slopes are one function, and its arrays are its own", () => {
      const random = seededRandom(7);
      for (const { size, theta } of cases(7)) {
        const evaluator = system.evaluator(theta, size);
        const { shares, total, prices } = evaluator;
        for (let repeat = 0; repeat < 3; repeat++) {
          const point = randomPoint(random, size);
          evaluator.at(point.prices.map(Math.log), Math.log(point.total), point.demographics);
          const slopes = system.slopes(theta, size, point);
          expect(gap(Array.from(shares), slopes.shares)).toBe(0);
          expect(gap(Array.from(total), slopes.total)).toBe(0);
          expect(gap(Array.from(prices), slopes.prices.flat())).toBe(0);
        }
      }
    });

    test("the terms that explain a price slope sum to it", () => {
      for (const { size, theta, point } of cases(8)) {
        const { prices } = system.slopes(theta, size, point);
        for (let i = 0; i < size.goods; i++) {
          for (let j = 0; j < size.goods; j++) {
            const sum = system
              .explainPriceSlope(theta, size, point, i, j)
              .reduce((total, { sign, factors }) => total + sign * factors.reduce((a, { value }) => a * value, 1), 0);
            expect(Math.abs(sum - prices[i][j])).toBeLessThan(ROUNDING);
          }
        }
      }
    });

    test("a point or theta of the wrong length is refused with both numbers", () => {
      const { size, theta, point } = cases(9)[0];
      const long = { ...point, prices: [...point.prices, 1] };
      expect(() => system.slopes(theta, size, long)).toThrow(
        `prices has ${size.goods + 1} entries, the system has ${size.goods} goods`,
      );
      expect(() => system.slopes(theta.slice(1), size, point)).toThrow(`theta has ${theta.length - 1} coefficients`);
      expect(() => system.slopes(theta, size, { ...point, total: 0 })).toThrow("total expenditure is 0");
    });
  });

  test("restrictions that are imposed hold for every choice of free coefficients, and cost exactly as many as theory says", () => {
    const random = seededRandom(10);
    for (let repeat = 0; repeat < CASES; repeat++) {
      const { size } = randomCase(random, name, []);
      const n = size.goods;
      const count = (impose: (typeof IMPOSED)[number]) => system.free(size, impose).places.length;
      const homogeneityCosts = system.heldByForm.includes("homogeneity") ? 0 : n - 1;
      const symmetryCosts = system.heldByForm.includes("symmetry") ? 0 : ((n - 1) * (n - 2)) / 2;
      const matrices = priceMatrices(size);
      expect(count([]) - count(["homogeneity"])).toBe(homogeneityCosts * matrices);
      expect(count(["homogeneity"]) - count(["homogeneity", "symmetry"])).toBe(symmetryCosts * matrices);
      expect(system.free(size, ["symmetry"])).toEqual(system.free(size, ["homogeneity", "symmetry"]));
    }
  });

  test("under homogeneity, prices and money that rise together change no share", () => {
    if (hasNoShareFunction()) return;
    const random = seededRandom(11);
    for (let repeat = 0; repeat < CASES; repeat++) {
      const { size, theta, point } = randomCase(random, name, ["homogeneity"]);
      const factor = Math.exp(random.normal());
      const inflated = { ...point, prices: point.prices.map((price) => price * factor), total: point.total * factor };
      const shares = system.slopes(theta, size, point).shares;
      expect(gap(system.slopes(theta, size, inflated).shares, shares)).toBeLessThan(ROUNDING);
    }
  });
});

/** Columns of a block for each good; EASI has its products only where its interactions name them. */
function columnsOf({ goods, demographics, easi }: SystemSize): Record<BlockColumns, number> {
  const only = (name: InteractionName, columns: number) => (easi?.interactions.includes(name) ? columns : 0);
  return {
    one: 1,
    goods,
    demographics,
    powers: easi?.degree ?? 0,
    "demographics by expenditure": only("expenditure with demographics", demographics),
    "goods by demographics": only("prices with demographics", goods * demographics),
    "goods by expenditure": only("prices with expenditure", goods),
  };
}

/** Matrices of price effects that theory restricts: one, and EASI's A_l and B. */
function priceMatrices(size: SystemSize): number {
  const columns = columnsOf(size);
  return 1 + (columns["goods by demographics"] + columns["goods by expenditure"]) / size.goods;
}

/** Z at a point, with the index that an estimator would form were the observed shares the predicted ones. */
function termAt(
  term: MomentTerm,
  point: Point,
  shares: readonly number[],
  size: SystemSize,
  theta: readonly number[],
  form: MomentForm,
): number {
  if (term.kind === "constant") return 1;
  if (term.kind === "monomial") {
    return term.factors.reduce((product, factor) => product * columnAt(factor, point, shares, size, theta, form), 1);
  }
  if (term.kind === "product") {
    return (
      columnAt(term.left, point, shares, size, theta, form) * columnAt(term.right, point, shares, size, theta, form)
    );
  }
  return columnAt(term.column, point, shares, size, theta, form);
}

function columnAt(
  column: BaseColumn,
  point: Point,
  shares: readonly number[],
  size: SystemSize,
  theta: readonly number[],
  form: MomentForm,
): number {
  switch (column.kind) {
    case "log price":
      return Math.log(point.prices[column.good]);
    case "log total":
      return Math.log(point.total);
    case "demographic":
      return point.demographics[column.index];
    case "price":
      return point.prices[column.good];
    case "total":
      return point.total;
    case "log volume":
      throw new RangeError("volume is no function of a point");
    case "price over total":
      return point.prices[column.good] / point.total;
    case "deflated log total":
      return Math.log(point.total) - rowIndex(point, shares, size);
    case "real expenditure":
      return implicitUtility(theta, size, point, shares) ** column.power;
    case "local": {
      const filler = form.local!.filler(theta, size);
      filler.at(point.prices.map(Math.log), Math.log(point.total), point.demographics, shares);
      return filler.values[column.index];
    }
  }
}

function rowIndex(point: Point, shares: readonly number[], size: SystemSize): number {
  const column = (entries: readonly number[]) => entries.map((entry) => [entry]);
  return logPriceIndex(size.index!, column(shares), column(point.prices.map(Math.log)))[0];
}
