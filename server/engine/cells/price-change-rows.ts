import { ROW_GAPS, type RowChange, type RowGap, rowChange } from "../../../shared/economics/price-change/row-change.ts";
import type { PriceQuestion } from "../../../shared/schemas/price-change.ts";
import type { FittedCoefficients } from "../../../shared/systems/index.ts";
import { Cancelled } from "../run.ts";
import { task } from "../threads/map-in-order.ts";
import { type NamedRows, namedRows } from "./price-change-named.ts";

/** The rows used, parted into groups, and what is asked of them: everything a thread needs. */
export interface ChangedRows {
  readonly fitted: FittedCoefficients;
  readonly question: PriceQuestion;
  readonly priceScale: readonly number[];
  readonly totalScale: number;
  readonly logPrices: readonly Float64Array[];
  readonly logTotal: Float64Array;
  readonly demographics: readonly Float64Array[];
  readonly shares: readonly Float64Array[];
  readonly weights?: Float64Array;
  readonly adults?: Float64Array;
  readonly rowNumbers: Int32Array;
  /** Whether the system has a cost function. */
  readonly exact: boolean;
  /** Of each row, its group. */
  readonly codes: Int32Array;
  readonly groups: number;
  /** Lowest and highest price of each good in the sample, units of estimation. */
  readonly priceRange: { readonly low: readonly number[]; readonly high: readonly number[] };
}

const MONEY = ["compensating", "equivalent", "secondOrder", "revenue", "paidByBuyers", "raised"] as const;

/** Where each sum of a group stands: counts and weights, money, then quantities by good. */
const SUMS = [
  "rows",
  "weight",
  "undefinedRows",
  "undefinedWeight",
  ...ROW_GAPS,
  "outsideSystem",
  "outsideHousehold",
  "expenditure",
  "perAdult",
  ...MONEY,
] as const;
export type SumName = (typeof SUMS)[number];

export const sumPlace = Object.fromEntries(SUMS.map((name, at) => [name, at])) as Readonly<Record<SumName, number>>;
/** Quantities before, their changes and the part that is substitution follow, n each. */
export const goodPlace = (n: number, which: 0 | 1 | 2, good: number): number => SUMS.length + which * n + good;
export const sumsOf = (n: number): number => SUMS.length + 3 * n;

export interface RowRange {
  readonly from: number;
  readonly to: number;
}

/** What a range of rows adds up to. */
export interface ChangedSums {
  /** Group by group, `sumsOf(n)` each. */
  readonly sums: Float64Array;
  readonly named: NamedRows;
  /** By good: rows above the sample's prices and the highest new price, rows below and the lowest. */
  readonly unseen: Float64Array;
}

const ROWS_BETWEEN_POLLS = 1024;

/** The sums over a range of rows; the same whatever the thread. */
export const sumChangedRows = task(
  import.meta.url,
  "sumChangedRows",
  (rows: ChangedRows, { from, to }: RowRange, control): ChangedSums => {
    const n = rows.logPrices.length;
    const width = sumsOf(n);
    const sums = new Float64Array(rows.groups * width);
    const unseen = newUnseen(n);
    const named = namedRows(rows.fitted.goods);
    const row = rowChange(rows.fitted, rows.question, rows.priceScale);
    const logPrices = new Float64Array(n);
    const spent = new Float64Array(n);
    const own = new Float64Array(rows.demographics.length);
    for (let t = from; t < to; t++) {
      if (t % ROWS_BETWEEN_POLLS === 0 && control.cancelled())
        throw new Cancelled("cancelled while going over the rows");
      for (let i = 0; i < n; i++) {
        logPrices[i] = rows.logPrices[i][t];
        spent[i] = rows.shares[i][t];
      }
      for (let k = 0; k < own.length; k++) own[k] = rows.demographics[k][t];
      const total = Math.exp(rows.logTotal[t]);
      row.at(logPrices, rows.logTotal[t], own, spent);
      const weight = rows.weights ? rows.weights[t] : 1;
      const at = rows.codes[t] * width;
      if (row.gap !== undefined) {
        addGap(sums, at, row.gap, weight);
        named.add(rows.rowNumbers[t], total * rows.totalScale, row);
        continue;
      }
      addRow(sums, at, row, { weight, total, adults: rows.adults ? rows.adults[t] : 1 });
      noteUnseen(unseen, row, rows.priceRange);
      const outside = named.add(rows.rowNumbers[t], total * rows.totalScale, row);
      if (outside.system) sums[at + sumPlace.outsideSystem]++;
      if (outside.household) sums[at + sumPlace.outsideHousehold]++;
    }
    return { sums, named: named.result(), unseen };
  },
);

function addGap(sums: Float64Array, at: number, gap: RowGap, weight: number): void {
  sums[at + sumPlace.undefinedRows]++;
  sums[at + sumPlace.undefinedWeight] += weight;
  sums[at + sumPlace[gap]]++;
}

interface Own {
  readonly weight: number;
  readonly total: number;
  readonly adults: number;
}

function addRow(sums: Float64Array, at: number, row: RowChange, { weight, total, adults }: Own): void {
  sums[at + sumPlace.rows]++;
  sums[at + sumPlace.weight] += weight;
  sums[at + sumPlace.expenditure] += weight * total;
  sums[at + sumPlace.perAdult] += (weight * total) / adults;
  sums[at + sumPlace.compensating] += weight * row.compensating;
  sums[at + sumPlace.equivalent] += weight * row.equivalent;
  sums[at + sumPlace.secondOrder] += weight * row.secondOrder;
  sums[at + sumPlace.revenue] += weight * row.revenue;
  sums[at + sumPlace.paidByBuyers] += weight * row.paidByBuyers;
  sums[at + sumPlace.raised] += weight * row.raised;
  const n = row.before.length;
  const goods = at + SUMS.length;
  for (let i = 0; i < n; i++) {
    sums[goods + i] += weight * row.before[i];
    sums[goods + n + i] += weight * row.change[i];
    sums[goods + 2 * n + i] += weight * row.substitution[i];
  }
}

export function newUnseen(n: number): Float64Array {
  const unseen = new Float64Array(4 * n);
  for (let i = 0; i < n; i++) {
    unseen[4 * i + 1] = Number.NEGATIVE_INFINITY;
    unseen[4 * i + 3] = Number.POSITIVE_INFINITY;
  }
  return unseen;
}

function noteUnseen(unseen: Float64Array, { pricesAfter }: RowChange, { low, high }: ChangedRows["priceRange"]): void {
  for (let i = 0; i < pricesAfter.length; i++) {
    const price = pricesAfter[i];
    if (price > high[i]) {
      unseen[4 * i]++;
      if (price > unseen[4 * i + 1]) unseen[4 * i + 1] = price;
    } else if (price < low[i]) {
      unseen[4 * i + 2]++;
      if (price < unseen[4 * i + 3]) unseen[4 * i + 3] = price;
    }
  }
}
