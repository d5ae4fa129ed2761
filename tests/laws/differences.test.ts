import { describe, expect, test } from "vitest";
import { elasticitiesAt } from "../../shared/economics/elasticities.ts";
import { createRowChecker } from "../../shared/economics/sample.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { compensatingVariation, WelfareUndefined } from "../../shared/economics/welfare.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import type { BaseColumn } from "../../shared/systems/moment-form.ts";
import { SYSTEM_NAMES } from "../../shared/systems/names.ts";
import { fittedFrom } from "../support/fitted.ts";
import { derivative, gap, moved } from "./derivatives.ts";
import { IMPOSED, randomCase } from "./random-systems.ts";

const CASES = 40;
const ROUNDING = 1e-12;

/** Every system that explains changes: the laws of levels do not apply to it, these do. */
const NAMES = SYSTEM_NAMES.filter((name) => SYSTEMS[name].kind === "differences");

test("the systems in differences are those that say they have no share function and no cost function", () => {
  expect(NAMES).toContain("rotterdam");
  for (const name of SYSTEM_NAMES) {
    expect(SYSTEMS[name].shareFunction !== undefined).toBe(NAMES.includes(name));
    if (NAMES.includes(name)) expect("absent" in SYSTEMS[name].cost).toBe(true);
  }
});

describe.each(NAMES)("%s", (name) => {
  const system = SYSTEMS[name];

  describe.each(IMPOSED)("with %s %s imposed", (...impose) => {
    const cases = (seed: number) => {
      const random = seededRandom(seed);
      return Array.from({ length: CASES }, () => ({ ...randomCase(random, name, impose), random }));
    };

    /** A small change of prices and total, and the changes of the base columns it makes. */
    const change = (random: ReturnType<typeof seededRandom>, shares: readonly number[], demographics: number) => {
      const logPrices = shares.map(() => random.normal());
      const logTotal = random.normal();
      const volume = logTotal - shares.reduce((sum, share, j) => sum + share * logPrices[j], 0);
      const columnAt = (column: BaseColumn): number => {
        if (column.kind === "log price") return logPrices[column.good];
        if (column.kind === "log volume") return volume;
        if (column.kind === "demographic" && column.index < demographics) return 0;
        throw new RangeError(`${column.kind} is no column of a system in differences`);
      };
      return { logPrices, logTotal, columnAt };
    };

    test("C(theta) Z is the total differential that the elasticities make, share by share", () => {
      for (const { size, free, theta, point, random } of cases(21)) {
        const fitted = fittedFrom(random, name, size, impose, free, theta);
        const { shares, expenditure, uncompensated } = elasticitiesAt(fitted, point);
        const { logPrices, logTotal, columnAt } = change(random, shares, size.demographics);
        const z = system.moments.terms(size).map((term) => {
          if (term.kind === "constant") return 1;
          if (term.kind !== "column") throw new RangeError("a system in differences is linear in its columns");
          return columnAt(term.column);
        });
        const predicted = system.moments
          .coefficients(theta, size)
          .map((row) => row.reduce((sum, entry, term) => sum + entry * z[term], 0));
        const byElasticities = shares.map(
          (share, i) =>
            share * (expenditure[i] * logTotal + uncompensated[i].reduce((sum, e, j) => sum + e * logPrices[j], 0)),
        );
        expect(gap(predicted, byElasticities)).toBeLessThan(ROUNDING);
      }
    });

    test("the derivatives of C in theta are exact", () => {
      for (const { size, theta } of cases(22).slice(0, 12)) {
        const sparse = system.moments.derivatives(theta, size);
        expect(sparse.length).toBe(theta.length);
        theta.forEach((_, a) => {
          const dense = system.moments.coefficients(theta, size).map((row) => row.map(() => 0));
          for (const [good, term, value] of sparse[a]) dense[good][term] += value;
          const numerical = derivative((step) => system.moments.coefficients(moved(theta, a, step), size).flat());
          expect(gap(numerical, dense.flat())).toBeLessThan(1e-9);
        });
      }
    });

    test("the Slutsky matrix is the same at every row's observed shares, which the checker keeps", () => {
      for (const { size, free, theta, point, random } of cases(23)) {
        const fitted = fittedFrom(random, name, size, impose, free, theta);
        const { share, eigenvalues } = matrixAt(fitted, point, {
          priceScale: point.prices.map(() => 1),
          totalScale: 1,
          pointName: "a random point",
        });
        const checker = createRowChecker(fitted);
        const observed = size.meanShares!.map((mean, i) => (i === 0 ? mean - 0.1 : mean + 0.1 / (size.goods - 1)));
        checker.evaluateAtShares!(observed);
        expect(gap(Array.from(checker.shares), observed)).toBe(0);
        if (checker.statesNegativity) {
          expect(Math.abs(checker.largestEigenvalue() - eigenvalues[0].value)).toBeLessThan(ROUNDING);
        }
        if (!impose.includes("homogeneity")) continue;
        for (const row of share) expect(Math.abs(row.reduce((sum, entry) => sum + entry, 0))).toBeLessThan(ROUNDING);
      }
    });
  });

  test("welfare is refused and the reason names a system that has it", () => {
    const random = seededRandom(24);
    const { size, free, theta, point } = randomCase(random, name, ["homogeneity", "symmetry"]);
    const fitted = fittedFrom(random, name, size, ["homogeneity", "symmetry"], free, theta);
    expect(() => compensatingVariation(fitted, point, point.prices)).toThrow(WelfareUndefined);
    expect(() => compensatingVariation(fitted, point, point.prices)).toThrow("use aids");
  });
});
