import { describe, expect, test } from "vitest";
import { AggregateGradients, AggregateResponses } from "../../shared/economics/aggregate.ts";
import { elasticitiesAt, elasticitiesOf, elasticityValues } from "../../shared/economics/elasticities.ts";
import { type ResponseOptions, responsesAt, slopesAt } from "../../shared/economics/responses.ts";
import { standardError } from "../../shared/numerics/matrix.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { Point } from "../../shared/systems/demand-system.ts";
import { type FittedCoefficients, SYSTEMS, systemOf } from "../../shared/systems/index.ts";
import { SYSTEM_NAMES, type SystemName } from "../../shared/systems/names.ts";
import { fittedFrom } from "../support/fitted.ts";
import { derivative, gap, moved, repriced } from "./derivatives.ts";
import { IMPOSED, randomCase, randomPoint } from "./random-systems.ts";

const CASES = 8;
const ROWS = 5;
/** Sums of a few dozen terms of order one, divided by shares down to 0.02. */
const ROUNDING = 5e-11;

const sum = (entries: readonly number[]) => entries.reduce((total, entry) => total + entry, 0);

interface Group {
  readonly fitted: FittedCoefficients;
  readonly points: Point[];
  readonly weights: number[];
}

function groups(name: SystemName, impose: (typeof IMPOSED)[number], seed: number): Group[] {
  const random = seededRandom(seed);
  const list: Group[] = [];
  while (list.length < CASES) {
    const { size, free, theta } = randomCase(random, name, impose);
    const fitted = fittedFrom(random, name, size, impose, free, theta);
    const points = Array.from({ length: ROWS }, () => randomPoint(random, size));
    const weights = points.map(({ total }) => (0.5 + random.uniform()) * total);
    const { shares } = aggregate({ fitted, points, weights }).responses;
    if (shares.every((share) => share > 0.02)) list.push({ fitted, points, weights });
  }
  return list;
}

function aggregate({ fitted, points, weights }: Group, options?: ResponseOptions) {
  const responses = new AggregateResponses(fitted.goods.length);
  const gradients = new AggregateGradients(fitted.goods.length, fitted.theta.length);
  points.forEach((point, t) => {
    responses.add(responsesAt(fitted, point, options).responses, weights[t]);
    const { slopes, derivatives } = slopesAt(fitted, point, options);
    gradients.add(slopes, derivatives, weights[t]);
  });
  return { responses: responses.result(), gradients: gradients.result() };
}

const observedShares = (goods: number, seed: number) => {
  const raw = Array.from({ length: goods }, (_, i) => 1 + ((i * 7 + seed) % 5));
  return raw.map((entry) => entry / sum(raw));
};

describe.each(SYSTEM_NAMES)("%s, over rows", (name) => {
  const { heldByForm } = SYSTEMS[name];

  test.each(IMPOSED)("Engel, Cournot, homogeneity and symmetry between aggregates, %s %s imposed", (...impose) => {
    const homogeneous = impose.includes("homogeneity") || heldByForm.includes("homogeneity");
    const symmetric = impose.includes("symmetry") || heldByForm.includes("symmetry");
    for (const group of groups(name, impose, 1)) {
      const { responses } = aggregate(group);
      const { shares, expenditure, uncompensated, compensated } = elasticityValues(responses);
      expect(Math.abs(sum(shares) - 1)).toBeLessThan(ROUNDING);
      expect(Math.abs(sum(shares.map((share, i) => share * expenditure[i])) - 1)).toBeLessThan(ROUNDING);
      for (let j = 0; j < shares.length; j++) {
        const column = sum(shares.map((share, i) => share * uncompensated[i][j]));
        expect(Math.abs(column + shares[j])).toBeLessThan(ROUNDING);
        if (homogeneous) expect(Math.abs(sum(uncompensated[j]) + expenditure[j])).toBeLessThan(ROUNDING);
        for (let i = 0; i < j && symmetric; i++) {
          expect(Math.abs(shares[i] * compensated[i][j] - shares[j] * compensated[j][i])).toBeLessThan(ROUNDING);
        }
      }
    }
  });

  test("they are the rows' elasticities weighted by expenditure on the good", () => {
    for (const group of groups(name, ["homogeneity", "symmetry"], 2)) {
      const together = elasticityValues(aggregate(group).responses);
      const rows = group.points.map((point) => elasticitiesAt(group.fitted, point));
      for (let i = 0; i < together.shares.length; i++) {
        const spent = rows.map(({ shares }, t) => group.weights[t] * shares[i]);
        const averaged = (of: (row: (typeof rows)[number]) => number) =>
          sum(rows.map((row, t) => spent[t] * of(row))) / sum(spent);
        expect(averaged(({ expenditure }) => expenditure[i])).toBeCloseTo(together.expenditure[i], 9);
        together.uncompensated[i].forEach((entry, j) => {
          expect(averaged(({ uncompensated }) => uncompensated[i][j])).toBeCloseTo(entry, 9);
        });
        together.compensated[i].forEach((entry, j) => {
          expect(averaged(({ compensated }) => compensated[i][j])).toBeCloseTo(entry, 9);
        });
      }
    }
  });

  test("standard errors are those of numerical derivatives in theta", () => {
    for (const group of groups(name, ["homogeneity", "symmetry"], 3).slice(0, 3)) {
      const { fitted } = group;
      const { responses, gradients } = aggregate(group);
      const exact = elasticitiesOf(responses, gradients, fitted.covariance);
      const flat = (theta: readonly number[]) => {
        const values = elasticityValues(aggregate({ ...group, fitted: { ...fitted, theta } }).responses);
        return [...values.expenditure, ...values.uncompensated.flat(), ...values.compensated.flat()];
      };
      const byTheta = fitted.theta.map((_, a) => derivative((step) => flat(moved(fitted.theta, a, step)), 2e-3));
      const numerical = byTheta[0].map((_, at) =>
        standardError(
          fitted.covariance,
          byTheta.map((row) => row[at]),
        ),
      );
      const errors = [
        ...exact.expenditureErrors,
        ...exact.uncompensatedErrors.flat(),
        ...exact.compensatedErrors.flat(),
      ];
      errors.forEach((error, at) => {
        expect(Math.abs(error - numerical[at])).toBeLessThan(1e-7 * (1 + numerical[at]));
      });
    }
  });
});

describe.each(SYSTEM_NAMES)("%s, at observed shares", (name) => {
  test.each(IMPOSED)("Engel, Cournot and homogeneity hold with the observed shares, %s %s imposed", (...impose) => {
    const homogeneous = impose.includes("homogeneity") || SYSTEMS[name].heldByForm.includes("homogeneity");
    for (const { fitted, points } of groups(name, impose, 4)) {
      const observed = observedShares(fitted.goods.length, points.length);
      const { shares, expenditure, uncompensated, compensated } = elasticitiesAt(fitted, points[0], { observed });
      expect(shares).toEqual(observed);
      expect(Math.abs(sum(shares.map((share, i) => share * expenditure[i])) - 1)).toBeLessThan(ROUNDING);
      for (let j = 0; j < shares.length; j++) {
        const column = sum(shares.map((share, i) => share * uncompensated[i][j]));
        expect(Math.abs(column + shares[j])).toBeLessThan(ROUNDING);
        if (homogeneous) expect(Math.abs(sum(uncompensated[j]) + expenditure[j])).toBeLessThan(ROUNDING);
        for (let i = 0; i < shares.length; i++) {
          expect(compensated[i][j]).toBeCloseTo(uncompensated[i][j] + expenditure[i] * shares[j], 10);
        }
      }
    }
  });

  test("standard errors hold the observed shares fixed", () => {
    for (const { fitted, points } of groups(name, ["homogeneity", "symmetry"], 5).slice(0, 3)) {
      const observed = observedShares(fitted.goods.length, 3);
      expectErrors(fitted, points[0], { observed });
    }
  });
});

describe("Stone's index moving with the shares", () => {
  /** At points where every share is above 0.05, so that its logarithm has derivatives of order one. */
  const stone = (seed: number) =>
    groups("la-aids", ["homogeneity", "symmetry"], seed).flatMap(({ fitted: found, points }) => {
      const fitted = { ...found, index: "stone" as const };
      const { system, size } = systemOf(fitted);
      const point = points.find((at) => system.slopes(fitted.theta, size, at).shares.every((share) => share > 0.05));
      return point ? [{ fitted, point }] : [];
    });

  /** Green & Alston (1990): A is Chalfant's matrix; all written as they write it, the inverse by elimination. */
  test("is Green and Alston's (I + BC)⁻¹(A + I) − I and ι + (I + BC)⁻¹B", () => {
    for (const { fitted, point } of stone(6)) {
      const held = elasticitiesAt(fitted, point);
      const exact = elasticitiesAt(fitted, point, { index: "exact" });
      const n = held.shares.length;
      const b = held.expenditure.map((eta) => eta - 1);
      const c = held.shares.map((share, j) => share * Math.log(point.prices[j]));
      const iPlusBc = b.map((row, i) => c.map((entry, j) => row * entry + (i === j ? 1 : 0)));
      const aPlusI = held.uncompensated.map((row, i) => row.map((entry, j) => entry + (i === j ? 1 : 0)));
      const solved = solve(
        iPlusBc,
        aPlusI.map((row, i) => [...row, b[i]]),
      );
      expect(
        gap(
          exact.expenditure,
          solved.map((row) => 1 + row[n]),
        ),
      ).toBeLessThan(1e-12);
      const expected = solved.flatMap((row, i) => row.slice(0, n).map((entry, j) => entry - (i === j ? 1 : 0)));
      expect(gap(exact.uncompensated.flat(), expected)).toBeLessThan(1e-11);
    }
  });

  test("is the derivative of the shares that the implicit system predicts", () => {
    for (const { fitted, point } of stone(7)) {
      const { system, size } = systemOf(fitted);
      const logQuantities = (at: Point) => {
        const { shares } = system.slopes(fitted.theta, size, at);
        return shares.map((share, i) => Math.log((share * at.total) / at.prices[i]));
      };
      const exact = elasticitiesAt(fitted, point, { index: "exact" });
      const byTotal = derivative((step) => logQuantities({ ...point, total: point.total * Math.exp(step) }), 0.01);
      expect(gap(exact.expenditure, byTotal)).toBeLessThan(1e-8);
      for (let j = 0; j < point.prices.length; j++) {
        const byPrice = derivative(
          (step) => logQuantities({ ...point, prices: repriced(point.prices, j, step) }),
          0.01,
        );
        expect(
          gap(
            exact.uncompensated.map((row) => row[j]),
            byPrice,
          ),
        ).toBeLessThan(1e-8);
      }
    }
  });

  test("keeps Engel, Cournot and homogeneity, predicted or observed shares, and has exact errors", () => {
    for (const { fitted, point } of stone(8)) {
      for (const options of [{}, { observed: observedShares(fitted.goods.length, 2) }]) {
        const { shares, expenditure, uncompensated } = elasticitiesAt(fitted, point, { index: "exact", ...options });
        expect(Math.abs(sum(shares.map((share, i) => share * expenditure[i])) - 1)).toBeLessThan(ROUNDING);
        shares.forEach((share, j) => {
          const column = sum(shares.map((other, i) => other * uncompensated[i][j]));
          expect(Math.abs(column + share)).toBeLessThan(ROUNDING);
          expect(Math.abs(sum(uncompensated[j]) + expenditure[j])).toBeLessThan(ROUNDING);
        });
      }
    }
    for (const { fitted, point } of stone(9).slice(0, 2)) {
      expectErrors(fitted, point, { index: "exact" });
      expectErrors(fitted, point, { index: "exact", observed: observedShares(fitted.goods.length, 4) });
    }
  });

  test("at unit prices the index does not move: both are the same", () => {
    for (const { fitted, point } of stone(10)) {
      const unit = { ...point, prices: point.prices.map(() => 1) };
      const [held, exact] = (["held", "exact"] as const).map((index) => elasticitiesAt(fitted, unit, { index }));
      expect(gap(held.uncompensated.flat(), exact.uncompensated.flat())).toBeLessThan(1e-13);
    }
  });
});

test("with the index's weights at the observed shares the matrix of LA-AIDS is symmetric when Γ is", () => {
  for (const { fitted, points } of groups("la-aids", ["homogeneity", "symmetry"], 11)) {
    const observed = observedShares(fitted.goods.length, 1);
    const { compensated } = responsesAt(fitted, points[0], { observed }).responses;
    compensated.forEach((row, i) => {
      row.forEach((entry, j) => {
        expect(entry).toBeCloseTo(compensated[j][i], 12);
      });
    });
  }
});

function expectErrors(fitted: FittedCoefficients, point: Point, options: ResponseOptions): void {
  const exact = elasticitiesAt(fitted, point, options);
  const flat = (theta: readonly number[]) => {
    const { expenditure, uncompensated, compensated } = elasticitiesAt({ ...fitted, theta }, point, options);
    return [...expenditure, ...uncompensated.flat(), ...compensated.flat()];
  };
  const byTheta = fitted.theta.map((_, a) => derivative((step) => flat(moved(fitted.theta, a, step)), 2e-3));
  const errors = [...exact.expenditureErrors, ...exact.uncompensatedErrors.flat(), ...exact.compensatedErrors.flat()];
  errors.forEach((error, at) => {
    const numerical = standardError(
      fitted.covariance,
      byTheta.map((row) => row[at]),
    );
    expect(Math.abs(error - numerical)).toBeLessThan(1e-7 * (1 + numerical));
  });
}

/** X with A X = B by Gauss elimination; A is near the identity. */
function solve(a: readonly number[][], b: readonly number[][]): number[][] {
  const rows = a.map((row, i) => [...row, ...b[i]]);
  const n = rows.length;
  for (let column = 0; column < n; column++) {
    const pivot = rows[column];
    for (let i = 0; i < n; i++) {
      if (i === column) continue;
      const factor = rows[i][column] / pivot[column];
      for (let j = column; j < rows[i].length; j++) rows[i][j] -= factor * pivot[j];
    }
  }
  return rows.map((row, i) => row.slice(n).map((entry) => entry / row[i]));
}
