import type { Dual } from "../../../shared/economics/price-change/dual.ts";
import { type HouseholdMeasures, householdMeasures } from "../../../shared/economics/price-change/household.ts";
import { Cancelled, type RunControl } from "../run.ts";
import { mapInOrder, task } from "../threads/map-in-order.ts";
import type { ChangedRows } from "./price-change-rows.ts";

/** Products that the derivatives of all groups may come to: a second or two. Further rows enter the estimates alone. */
const MOST_PRODUCTS = 1.5e7;
/** However few the goods, a row's derivatives take some tenths of a millisecond. */
const MOST_ROWS = 6000;
/** No group's derivatives rest on fewer rows than these, if it has them. */
const FEWEST_SAMPLED = 500;
const ROWS_A_PIECE = 128;

/** The sums a derivative is taken of: money, then changes and substitution by good. */
export const derivedSums = (n: number): number => 6 + 2 * n;
export const DERIVED = {
  compensating: 0,
  equivalent: 1,
  secondOrder: 2,
  revenue: 3,
  paidByBuyers: 4,
  raised: 5,
  change: (_: number, good: number) => 6 + good,
  substitution: (n: number, good: number) => 6 + n + good,
} as const;

/** Mean derivatives in θ of one group: `derivedSums(n)` rows of k. */
export type MeanDerivatives = Float64Array;

/** Sums of weights and of weighted derivatives of some rows, group by group. */
interface DerivativeSums {
  readonly weights: Float64Array;
  readonly gradients: readonly (Float64Array | undefined)[];
  readonly rows: number;
}

/**
 * The mean derivative of every sum of every group, over all its rows up to a budget; beyond it over every m-th row of the
 * group, which moves a standard error by about 1/√rows of itself.
 */
export function meanDerivatives(
  rows: ChangedRows,
  members: readonly Int32Array[],
  control: RunControl,
): { means: MeanDerivatives[]; used: number } {
  const n = rows.logPrices.length;
  const k = rows.fitted.theta.length;
  const of = members.reduce((sum, group) => sum + group.length, 0);
  const stride = Math.max(Math.ceil((of * n * n * k) / MOST_PRODUCTS), Math.ceil(of / MOST_ROWS));
  const pieces = members.flatMap((group) => {
    const every = Math.max(1, Math.min(stride, Math.floor(group.length / FEWEST_SAMPLED)));
    const sampled = group.filter((_, at) => at % every === every >> 1);
    const count = Math.ceil(sampled.length / ROWS_A_PIECE);
    return Array.from({ length: count }, (_, at) => sampled.slice(at * ROWS_A_PIECE, (at + 1) * ROWS_A_PIECE));
  });
  const parts = mapInOrder(control, sumDerivatives, rows, pieces, (done) =>
    control.progress({ step: "taking derivatives", fraction: done / pieces.length }),
  );
  const means = members.map((_, g) => {
    const mean = new Float64Array(derivedSums(n) * k);
    let weight = 0;
    for (const part of parts) {
      const own = part.gradients[g];
      if (own === undefined) continue;
      weight += part.weights[g];
      for (let a = 0; a < mean.length; a++) mean[a] += own[a];
    }
    return mean.map((entry) => (weight === 0 ? 0 : entry / weight));
  });
  return { means, used: parts.reduce((sum, part) => sum + part.rows, 0) };
}

/** Weighted derivatives of some rows, by group. */
export const sumDerivatives = task(
  import.meta.url,
  "sumDerivatives",
  (rows: ChangedRows, members: Int32Array, control): DerivativeSums => {
    const n = rows.logPrices.length;
    const k = rows.fitted.theta.length;
    const weights = new Float64Array(rows.groups);
    const gradients: (Float64Array | undefined)[] = Array.from({ length: rows.groups });
    let used = 0;
    for (const t of members) {
      if (control.cancelled()) throw new Cancelled("cancelled while taking derivatives");
      const measures = measuresOf(rows, t);
      if (measures === undefined) continue;
      used++;
      const weight = rows.weights ? rows.weights[t] : 1;
      const group = rows.codes[t];
      gradients[group] ??= new Float64Array(derivedSums(n) * k);
      weights[group] += weight;
      listed(measures, n).forEach((dual, at) => {
        if (dual) addScaled(gradients[group]!, at * k, weight, dual.gradient);
      });
    }
    return { weights, gradients, rows: used };
  },
);

/** Of a row in the means; those without an answer are in none of them. */
function measuresOf(rows: ChangedRows, t: number): HouseholdMeasures | undefined {
  const point = {
    prices: rows.logPrices.map((column) => Math.exp(column[t])),
    total: Math.exp(rows.logTotal[t]),
    demographics: rows.demographics.map((column) => column[t]),
  };
  const spent = rows.shares.map((column) => column[t]);
  try {
    const measures = householdMeasures(
      { fitted: rows.fitted, derivatives: true },
      point,
      spent,
      rows.question,
      rows.priceScale,
    );
    return rows.exact && measures.compensating === undefined ? undefined : measures;
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}

function listed(measures: HouseholdMeasures, n: number): (Dual | undefined)[] {
  const { compensating, equivalent, secondOrder, tax, change, substitution } = measures;
  const none = Array.from({ length: n }, () => undefined);
  return [
    compensating,
    equivalent,
    secondOrder,
    tax.revenue,
    tax.paidByBuyers,
    tax.raised,
    ...change,
    ...(substitution ?? none),
  ];
}

function addScaled(into: Float64Array, from: number, weight: number, values: readonly number[]): void {
  for (let a = 0; a < values.length; a++) into[from + a] += weight * values[a];
}
