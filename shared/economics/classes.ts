import { normalQuantile } from "../numerics/normal.ts";
import type { Elasticities } from "./elasticities.ts";

export type Interval = readonly [low: number, high: number];
export type Verdict = "yes" | "no" | "undecided";

/** What a good is, by confidence intervals and not by point estimates alone (methods 3.2). */
export interface GoodClass {
  readonly good: string;
  /** By η_i: above 1, between 0 and 1, below 0; undecided when the interval crosses a bound. */
  readonly kind: "luxury" | "necessity" | "inferior" | "undecided";
  readonly interval: Interval;
  /** ∂q_i/∂x > 0. */
  readonly normal: Verdict;
  /** The interval of η_i covers 0. */
  readonly incomeNeutral: boolean;
  /** ε_ii > 0 with η_i < 0. */
  readonly giffen: Verdict;
}

/** How two goods stand to each other. */
export type PairClass = "substitutes" | "complements" | "undecided";

export interface GoodClasses {
  readonly level: number;
  readonly goods: GoodClass[];
  /** By ε*_ij, i ≠ j; null on the diagonal. */
  readonly net: (PairClass | null)[][];
  /** By ε_ij, i ≠ j; null on the diagonal. */
  readonly gross: (PairClass | null)[][];
}

/** Estimate ± z·standard error at a level of confidence such as 0.95. */
export function intervalOf(estimate: number, standardError: number, level: number): Interval {
  if (!(level > 0 && level < 1)) throw new RangeError(`a level of confidence lies between 0 and 1, not at ${level}`);
  const width = normalQuantile(0.5 + level / 2) * standardError;
  return [estimate - width, estimate + width];
}

/** Intervals of elasticities, however they came about: expenditure (n), uncompensated and compensated (n × n). */
export interface ElasticityIntervals {
  readonly expenditure: Interval[];
  readonly uncompensated: Interval[][];
  readonly compensated: Interval[][];
}

/** Estimate ± z·standard error of every elasticity. */
export function normalIntervals(elasticities: Elasticities, level: number): ElasticityIntervals {
  const { expenditure, expenditureErrors, uncompensated, uncompensatedErrors } = elasticities;
  const ofMatrix = (estimates: number[][], errors: number[][]) =>
    estimates.map((row, i) => row.map((estimate, j) => intervalOf(estimate, errors[i][j], level)));
  return {
    expenditure: expenditure.map((estimate, i) => intervalOf(estimate, expenditureErrors[i], level)),
    uncompensated: ofMatrix(uncompensated, uncompensatedErrors),
    compensated: ofMatrix(elasticities.compensated, elasticities.compensatedErrors),
  };
}

/** Classes of goods and of pairs at a point, with confidence `level`. */
export function classesOfGoods(elasticities: Elasticities, goods: readonly string[], level = 0.95): GoodClasses {
  return classesByIntervals(normalIntervals(elasticities, level), goods, level);
}

/** The same from intervals of that level. */
export function classesByIntervals(
  { expenditure, uncompensated, compensated }: ElasticityIntervals,
  goods: readonly string[],
  level: number,
): GoodClasses {
  return {
    level,
    goods: goods.map((good, i) => {
      const interval = expenditure[i];
      return {
        good,
        kind: kindOf(interval),
        interval,
        normal: interval[0] > 0 ? "yes" : interval[1] < 0 ? "no" : "undecided",
        incomeNeutral: interval[0] <= 0 && interval[1] >= 0,
        giffen: giffenBy(uncompensated[i][i], interval),
      };
    }),
    net: pairsBy(compensated),
    gross: pairsBy(uncompensated),
  };
}

function kindOf([low, high]: Interval): GoodClass["kind"] {
  if (low > 1) return "luxury";
  if (high < 0) return "inferior";
  return low > 0 && high < 1 ? "necessity" : "undecided";
}

/** Yes when both parts are certain, no when either is certainly false. */
function giffenBy([ownLow, ownHigh]: Interval, [low, high]: Interval): Verdict {
  if (ownLow > 0 && high < 0) return "yes";
  return ownHigh < 0 || low > 0 ? "no" : "undecided";
}

function pairsBy(intervals: readonly Interval[][]): (PairClass | null)[][] {
  return intervals.map((row, i) =>
    row.map(([low, high], j) => {
      if (i === j) return null;
      return low > 0 ? "substitutes" : high < 0 ? "complements" : "undecided";
    }),
  );
}
