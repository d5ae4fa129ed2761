import { beforeAll, describe, expect, test } from "vitest";
import { statesNegativity } from "../../shared/economics/checks.ts";
import { slutskyEigenvalues } from "../../shared/economics/eigenvalues.ts";
import { type Elasticities, elasticitiesAt, elasticityValues } from "../../shared/economics/elasticities.ts";
import { responsesValuesAt } from "../../shared/economics/responses.ts";
import { createRowChecker } from "../../shared/economics/sample.ts";
import { matrixAt, type SlutskyAtPoint } from "../../shared/economics/slutsky.ts";
import { standardError } from "../../shared/numerics/matrix.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { Point } from "../../shared/systems/demand-system.ts";
import { type FittedCoefficients, SYSTEMS } from "../../shared/systems/index.ts";
import { type RestrictionName, SYSTEM_NAMES, type SystemName } from "../../shared/systems/names.ts";
import { fittedFrom } from "../support/fitted.ts";
import { derivative, gap, moved } from "./derivatives.ts";
import { IMPOSED, randomCase } from "./random-systems.ts";

const CASES = 60;
/** Sums of a few dozen terms of order one. */
const ROUNDING = 1e-12;

const sum = (entries: readonly number[]) => entries.reduce((total, entry) => total + entry, 0);

function unscaled(point: Point) {
  return { priceScale: point.prices.map(() => 1), totalScale: 1, pointName: "a random point" };
}

interface FittedCase {
  readonly fitted: FittedCoefficients;
  readonly point: Point;
  readonly elasticities: Elasticities;
  readonly matrix: SlutskyAtPoint;
}

/** Fitted systems at points where no share is so near zero that elasticities lose the digits tested. */
function fittedCases(name: SystemName, impose: readonly RestrictionName[]): readonly FittedCase[] {
  const random = seededRandom(1);
  const list: FittedCase[] = [];
  while (list.length < CASES) {
    const { size, free, theta, point } = randomCase(random, name, impose);
    const fitted = fittedFrom(random, name, size, impose, free, theta);
    const { shares } = SYSTEMS[name].slopes(theta, size, point);
    if (shares.some((share) => Math.abs(share) <= 0.02)) continue;
    const matrix = matrixAt(fitted, point, unscaled(point));
    list.push({ fitted, point, matrix, elasticities: elasticitiesAt(fitted, point) });
  }
  return list;
}

/** Entries, elasticities and eigenvalues without their errors, as a function of theta. */
function numbersAt(fitted: FittedCoefficients, point: Point): number[] {
  const responses = responsesValuesAt(fitted, point);
  const { expenditure, uncompensated, compensated } = elasticityValues(responses);
  const { compensated: share } = responses;
  const without = share.map((row) => row.map(() => []));
  const eigenvalues = statesNegativity(fitted) ? slutskyEigenvalues(share, without, [], fitted.goods) : [];
  const own = [...share.flat(), ...compensated.flat(), ...expenditure, ...uncompensated.flat()];
  return [...own, ...eigenvalues.map(({ value }) => value)];
}

describe.each(SYSTEM_NAMES)("%s", (name) => {
  const { heldByForm } = SYSTEMS[name];

  describe.each(IMPOSED)("with %s %s imposed", (...impose) => {
    const homogeneous = impose.includes("homogeneity") || heldByForm.includes("homogeneity");
    const symmetric = impose.includes("symmetry") || heldByForm.includes("symmetry");

    /** Made once: every law is held at all of them. */
    let cases: readonly FittedCase[];
    beforeAll(() => {
      cases = fittedCases(name, impose);
    });

    test("Engel: weighted expenditure elasticities sum to one", () => {
      for (const { elasticities } of cases) {
        const { shares, expenditure } = elasticities;
        expect(Math.abs(sum(shares.map((share, i) => share * expenditure[i])) - 1)).toBeLessThan(ROUNDING);
      }
    });

    test("Cournot: weighted price elasticities of a column sum to minus its share", () => {
      for (const { elasticities } of cases) {
        const { shares, uncompensated } = elasticities;
        for (let j = 0; j < shares.length; j++) {
          expect(Math.abs(sum(shares.map((share, i) => share * uncompensated[i][j])) + shares[j])).toBeLessThan(
            ROUNDING,
          );
        }
      }
    });

    test("Slutsky: compensated is uncompensated plus expenditure elasticity times share", () => {
      for (const { elasticities } of cases) {
        const { shares, expenditure, uncompensated, compensated } = elasticities;
        const expected = uncompensated.map((row, i) => row.map((entry, j) => entry + expenditure[i] * shares[j]));
        // Divided by shares down to 0.02, so fifty times the rounding.
        expect(gap(compensated.flat(), expected.flat())).toBeLessThan(50 * ROUNDING);
      }
    });

    test("columns of the matrix sum to nothing; rows too, and entries mirror, where the law is imposed or formal", () => {
      for (const { matrix } of cases) {
        const { checks, share } = matrix;
        expect(checks.addingUp.size).toBeLessThan(ROUNDING);
        expect(checks.homogeneity.holds).toBe(homogeneous);
        expect(checks.negativity.stated).toBe(homogeneous);
        if (homogeneous) expect(checks.homogeneity.size).toBeLessThan(ROUNDING);
        // Two goods that add up and are homogeneous have one free entry: they are symmetric of themselves.
        const twoGoods = homogeneous && share.length === 2;
        expect(checks.symmetry.holds).toBe(symmetric || twoGoods);
        if (symmetric) expect(checks.symmetry.size).toBeLessThan(ROUNDING);
      }
    });

    test("homogeneity: a row of uncompensated elasticities and the expenditure elasticity cancel", () => {
      for (const { elasticities } of homogeneous ? cases : []) {
        const { expenditure, uncompensated } = elasticities;
        for (const [i, row] of uncompensated.entries()) {
          expect(Math.abs(sum(row) + expenditure[i])).toBeLessThan(50 * ROUNDING);
        }
      }
    });

    test("the quantity form is the share form times x/(p_i p_j) in units uploaded", () => {
      for (const { fitted, point } of cases) {
        const options = { priceScale: point.prices.map((_, i) => 0.5 + i), totalScale: 7, pointName: "scaled" };
        const { share, quantity, shareErrors, quantityErrors } = matrixAt(fitted, point, options);
        const prices = point.prices.map((price, i) => price * options.priceScale[i]);
        for (const [i, row] of share.entries()) {
          for (const [j, entry] of row.entries()) {
            const factor = (point.total * 7) / (prices[i] * prices[j]);
            expect(Math.abs(quantity[i][j] / factor - entry)).toBeLessThan(ROUNDING);
            expect(Math.abs(quantityErrors[i][j] / factor - shareErrors[i][j])).toBeLessThan(ROUNDING);
          }
        }
      }
    });

    test("standard errors are those of numerical derivatives in theta", () => {
      for (const { fitted, point, matrix: exact, elasticities } of cases.slice(0, 6)) {
        const numbers = (theta: readonly number[]) => numbersAt({ ...fitted, theta }, point);
        const values = [
          ...exact.share.flat(),
          ...exact.compensated.flat(),
          ...elasticities.expenditure,
          ...elasticities.uncompensated.flat(),
          ...exact.eigenvalues.map(({ value }) => value),
        ];
        expect(gap(numbers(fitted.theta), values)).toBeLessThan(ROUNDING);
        // h = 1e-3: shares in denominators bend elasticities sharply, and eigenvalues must not cross.
        const gradients = fitted.theta.map((_, a) => derivative((step) => numbers(moved(fitted.theta, a, step)), 1e-3));
        const errors = values.map((_, at) =>
          standardError(
            fitted.covariance,
            gradients.map((gradient) => gradient[at]),
          ),
        );
        const expected = [
          ...exact.shareErrors.flat(),
          ...exact.compensatedErrors.flat(),
          ...elasticities.expenditureErrors,
          ...elasticities.uncompensatedErrors.flat(),
          ...exact.eigenvalues.map((eigenvalue) => eigenvalue.standardError),
        ];
        for (const [at, error] of errors.entries()) {
          expect(Math.abs(error - expected[at])).toBeLessThan(1e-6 * (1 + error));
        }
      }
    });

    test("the row checker finds what the matrix finds", () => {
      for (const { fitted, point, matrix } of cases) {
        const { shares, eigenvalues, checks } = matrix;
        const checker = createRowChecker(fitted);
        checker.evaluate(point.prices.map(Math.log), Math.log(point.total), point.demographics);
        expect(gap(Array.from(checker.shares), shares)).toBe(0);
        expect(checker.monotonicityHolds()).toBe(checks.monotonicity.holds);
        expect(checker.statesNegativity).toBe(checks.negativity.stated);
        if (!checker.statesNegativity) {
          expect(() => checker.largestEigenvalue()).toThrow("negativity is not stated");
          continue;
        }
        expect(Math.abs(checker.largestEigenvalue() - eigenvalues[0].value)).toBeLessThan(1e-14);
        expect(checker.negativityHolds()).toBe(checks.negativity.holds);
        expect(gap(checker.vector(), eigenvalues[0].vector)).toBeLessThan(1e-12);
      }
    });

    test("each eigenvector is one of the symmetrised matrix, of unit length and orthogonal to a common rise of prices", () => {
      for (const { matrix } of homogeneous ? cases : []) {
        const { share, eigenvalues } = matrix;
        expect(eigenvalues.length).toBe(share.length - 1);
        for (const { value, vector } of eigenvalues) {
          expect(Math.abs(sum(vector))).toBeLessThan(1e-14);
          expect(Math.abs(sum(vector.map((entry) => entry * entry)) - 1)).toBeLessThan(1e-14);
          expect(
            gap(
              symmetricImage(share, vector),
              vector.map((entry) => value * entry),
            ),
          ).toBeLessThan(1e-13);
        }
        const values = eigenvalues.map(({ value }) => value);
        expect(values).toEqual([...values].sort((a, b) => b - a));
      }
    });
  });
});

/** ½(K + K')v. */
function symmetricImage(k: SlutskyAtPoint["share"], vector: readonly number[]): number[] {
  return k.map((row, i) => sum(row.map((entry, j) => 0.5 * (entry + k[j][i]) * vector[j])));
}
