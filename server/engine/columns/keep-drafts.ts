import type { RowsPage } from "../../../shared/schemas/rows.ts";
import type { PreparedData } from "./prepared-data.ts";
import type { MappedGood } from "./resolve-roles.ts";

type Keep = NonNullable<RowsPage["keep"]>;

const PLAIN_NAME = /^[A-Za-z_][A-Za-z0-9_]*$/;
const WORDS: ReadonlySet<string> = new Set([
  "and",
  "or",
  "not",
  "mod",
  "to",
  "in",
  "xor",
  "true",
  "false",
  "null",
  "end",
]);
const LONGEST = 400;

/** A column as an expression names it. */
function named(column: string): string {
  return PLAIN_NAME.test(column) && !WORDS.has(column) ? column : `col(${JSON.stringify(column)})`;
}

/** A condition that leaves out those who bought none of a good. */
export function draftPurchase({ expenditure, quantity }: MappedGood, count: number): Keep | undefined {
  const column = expenditure ?? quantity;
  return column && count > 0 ? { expression: `${named(column.name)} > 0`, leavesOut: count } : undefined;
}

/**
 * A condition that leaves out the prices beyond all that are not in the list. Prices within that range stay although
 * they are in the list: where medians differ from cluster to cluster, no bound of the price alone would leave them out.
 */
export function draftBounds(
  { price, quantity, expenditure }: MappedGood,
  prices: Float64Array,
  listed: Int32Array,
  { rowNumbers }: PreparedData,
): Keep | undefined {
  const inList = new Set(listed);
  let lowest = Number.POSITIVE_INFINITY;
  let highest = Number.NEGATIVE_INFINITY;
  for (const number of rowNumbers) {
    if (inList.has(number - 1)) continue;
    lowest = Math.min(lowest, prices[number - 1]);
    highest = Math.max(highest, prices[number - 1]);
  }
  if (!(lowest <= highest)) return undefined;
  const written =
    price !== undefined
      ? named(price.name)
      : quantity && expenditure && `${named(expenditure.name)} / ${named(quantity.name)}`;
  const [low, high] = [rounded(lowest, Math.floor), rounded(highest, Math.ceil)];
  const below = listed.filter((row) => prices[row] < low).length;
  const above = listed.filter((row) => prices[row] > high).length;
  const bounds = [below > 0 && `${written} >= ${low}`, above > 0 && `${written} <= ${high}`].filter(Boolean);
  const expression = bounds.join(" and ");
  if (bounds.length === 0 || expression.length > LONGEST) return undefined;
  return { expression, leavesOut: below + above };
}

/** To four digits, away from what is to be kept. */
function rounded(value: number, round: (value: number) => number): number {
  const unit = 10 ** (Math.floor(Math.log10(Math.abs(value))) - 3);
  const near = Number((round(value / unit) * unit).toPrecision(4));
  return Number.isFinite(near) ? near : value;
}
