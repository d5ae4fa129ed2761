import type { ColumnAgreement } from "../../../shared/schemas/resources.ts";
import { readName } from "../../../shared/study/column-meaning.ts";
import type { TableColumn } from "./prepared-data.ts";
import type { NumberColumn } from "./resolve-roles.ts";

const KINDS = ["price", "quantity", "expenditure"] as const;
type Kind = (typeof KINDS)[number];
type OfOneGood = Record<Kind, NumberColumn[]>;

/** Two columns agree in a row where they differ by no more than this part of the second. */
const WITHIN = 0.02;
/** Of one kind and good; more are compared with nothing. */
const MOST = 3;
/** The unit at the end of a name: q_sweet_l is of the good that q_sweet is of. */
const UNIT = /_(kg|g|lbs?|oz|l|ml|litres?|liters?|kilos?|grams?|bottles?|pieces|units?|cents?)$/;

/**
 * Where an upload says one thing twice: a good's expenditure beside its price and quantity, or one quantity, price or
 * expenditure in two columns. Columns of one good are known by their names (`readName`).
 *
 * Price times quantity is held against expenditure as it stands, and where it fails in most rows times the median of
 * their ratio, which is what a difference of units would be; two columns of a kind are held against one another times
 * that median. Rows where a value is missing, or both sides are nought, are not compared.
 */
export function findAgreements(columns: readonly TableColumn[]): ColumnAgreement[] {
  return [...byGood(columns).values()].flatMap(({ price, quantity, expenditure }) => [
    ...price.flatMap((p) => quantity.flatMap((q) => expenditure.map((e) => ofProduct([p, q], e)))),
    ...[price, quantity, expenditure].flatMap((alike) => pairsOf(alike).map(([a, b]) => ofRatio([a], b))),
  ]);
}

function byGood(columns: readonly TableColumn[]): Map<string, OfOneGood> {
  const goods = new Map<string, OfOneGood>();
  for (const column of columns) {
    const read = column.type === "number" ? readName(column.name) : undefined;
    if (column.type !== "number" || read === undefined || read.meaning === "share") continue;
    const stem = read.stem.replace(UNIT, "");
    const good = goods.get(stem) ?? { price: [], quantity: [], expenditure: [] };
    if (good[read.meaning].length < MOST) good[read.meaning].push(column);
    goods.set(stem, good);
  }
  return goods;
}

function pairsOf<T>(alike: readonly T[]): [T, T][] {
  return alike.flatMap((one, place) => alike.slice(place + 1).map((other): [T, T] => [one, other]));
}

function ofProduct(of: readonly NumberColumn[], is: NumberColumn): ColumnAgreement {
  const asTheyStand = compare(of, is, 1);
  if (asTheyStand.agree * 2 >= asTheyStand.compared) return asTheyStand;
  const scaled = ofRatio(of, is);
  return scaled.agree > asTheyStand.agree ? scaled : asTheyStand;
}

const ofRatio = (of: readonly NumberColumn[], is: NumberColumn) => compare(of, is, medianRatio(of, is));

function compare(of: readonly NumberColumn[], is: NumberColumn, times: number): ColumnAgreement {
  let compared = 0;
  let agree = 0;
  for (let row = 0; row < is.values.length; row++) {
    const left = times * product(of, row);
    const right = is.values[row];
    if (!Number.isFinite(left) || Number.isNaN(right) || (left === 0 && right === 0)) continue;
    compared++;
    if (Math.abs(left - right) <= WITHIN * Math.abs(right)) agree++;
  }
  return { of: of.map(({ name }) => name), times, is: is.name, agree, compared };
}

/** One where no row has both sides above nought. */
function medianRatio(of: readonly NumberColumn[], is: NumberColumn): number {
  const ratios = new Float64Array(is.values.length);
  let count = 0;
  for (let row = 0; row < ratios.length; row++) {
    const left = product(of, row);
    if (left > 0 && is.values[row] > 0) ratios[count++] = is.values[row] / left;
  }
  const median = ratios.subarray(0, count).sort()[count >> 1];
  return Number.isFinite(median) && median > 0 ? median : 1;
}

function product(of: readonly NumberColumn[], row: number): number {
  return of.reduce((so, { values }) => so * values[row], 1);
}
