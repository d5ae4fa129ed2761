import type { LEFT_OUT_REASONS } from "../../../shared/schemas/data.ts";
import { counted } from "../../../shared/study/words.ts";
import type { DerivedColumns } from "./derive-columns.ts";
import { type EvaluatedExpression, missingIn } from "./expressions.ts";
import { type FormedGood, sumOfGoods } from "./form-goods.ts";
import type { TableColumn } from "./prepared-data.ts";
import type { NumberColumn, Roles } from "./resolve-roles.ts";

export type Reason = (typeof LEFT_OUT_REASONS)[number];

/** Shares that miss one by more than this leave their row out (methods section 1). */
const SHARES_TOLERANCE = 1e-6;

/** One ground on which rows are left out: the column it looks at, as a label names it. */
export interface Ground {
  readonly reason: Reason;
  /** What is wrong, before the column's name: "a price missing". */
  readonly fault: string;
  readonly column: string;
  readonly applies: (row: number) => boolean;
  /** Said after the label where rows fall by this ground. */
  readonly because?: string;
}

export function keepGrounds(values: Float64Array): Ground[] {
  return [{ reason: "keep", fault: "by keep", column: "", applies: (row) => values[row] === 0 }];
}

/** Every column named, each once, in the order of the specification's keys. */
export function missingGrounds(
  goods: readonly FormedGood[],
  roles: Roles,
  { derived, keep, columns }: DerivedColumns,
): Ground[] {
  const grounds = new Map<string, Ground>();
  const add = (what: string, column: string, applies: Ground["applies"]) => {
    if (grounds.has(column)) return;
    const because = whyUndefined(column, derived.get(column));
    grounds.set(column, {
      reason: "missing value",
      fault: `${what} missing`,
      column,
      applies,
      ...(because && { because }),
    });
  };
  const addColumn = (what: string, column: TableColumn | NumberColumn | undefined) => {
    if (column) add(what, column.name, missingIn(column));
  };
  for (const { name, price, expenditure, given } of goods) {
    addColumn("a price", given.price);
    addColumn("a quantity", given.quantity);
    addColumn("an expenditure", given.expenditure);
    // What follows from two columns is missing by itself only where both of them are there.
    const sources = Object.values(given).map(missingIn);
    const formed = (values: Float64Array) => (row: number) =>
      Number.isNaN(values[row]) && !sources.some((missing) => missing(row));
    if (!given.price) add("a price", `${name}, expenditure ÷ quantity`, formed(price));
    if (!given.expenditure) add("an expenditure", `${name}, price × quantity`, formed(expenditure));
  }
  addColumn("a total", roles.total);
  addColumn("a weight", roles.weight);
  addColumn("a cluster", roles.cluster);
  addColumn("a time", roles.time);
  for (const name of derived.keys()) addColumn("a value", columns.get(name));
  if (keep === undefined) return [...grounds.values()];
  // Of what keep reads, only rows that it cannot decide: what is missing may not matter to its answer.
  const undecided = (row: number) => Number.isNaN(keep.values[row]);
  for (const read of keep.reads) {
    const missing = missingIn(columns.get(read));
    add("a value", read, (row) => undecided(row) && missing(row));
  }
  if (keep.undefinedRows > 0) add("an answer of keep", "", undecided);
  return [...grounds.values()];
}

function whyUndefined(name: string, derived: EvaluatedExpression | undefined): string | undefined {
  if (derived === undefined || derived.undefinedRows === 0) return undefined;
  const { undefinedRows, firstUndefinedRow } = derived;
  return `${name} is no finite number in ${counted(undefinedRows, "row")}, first in row ${firstUndefinedRow}`;
}

export function purchaseGrounds(goods: readonly FormedGood[], { total, weight }: Roles, rows: number): Ground[] {
  const grounds: Ground[] = [];
  if (weight) {
    const { name, values } = weight;
    const reason = "weight not positive";
    grounds.push({ reason, fault: "a weight of zero", column: name, applies: (row) => values[row] === 0 });
    grounds.push({ reason, fault: "a weight below zero", column: name, applies: (row) => values[row] < 0 });
  }
  for (const { name, price, given } of goods) {
    const column = given.price?.name ?? `${name}, expenditure ÷ quantity`;
    const reason = "price not positive";
    grounds.push({ reason, fault: "a price of zero", column, applies: (row) => price[row] === 0 });
    grounds.push({ reason, fault: "a price below zero", column, applies: (row) => price[row] < 0 });
  }
  for (const { given } of goods) {
    for (const [part, column] of Object.entries({ quantity: given.quantity, expenditure: given.expenditure })) {
      if (column === undefined) continue;
      const { name, values } = column;
      const fault = `a negative ${part}`;
      grounds.push({ reason: "negative purchase", fault, column: name, applies: (row) => values[row] < 0 });
    }
  }
  return [...grounds, ...totalGrounds(goods, total, rows)];
}

function totalGrounds(goods: readonly FormedGood[], total: Roles["total"], rows: number): Ground[] {
  const sum = sumOfGoods(goods, rows);
  const reason = "total not positive";
  const spent = total?.values ?? sum;
  const positive = (row: number) => spent[row] > 0 && Number.isFinite(spent[row]);
  const nothing: Ground = {
    reason,
    fault: "bought nothing",
    column: "",
    applies: (row) => sum[row] === 0 && !positive(row),
  };
  if (total === undefined) {
    return [
      nothing,
      { reason, fault: "a total that is no positive number", column: "", applies: (row) => !positive(row) },
    ];
  }
  return [
    nothing,
    {
      reason,
      fault: "a total of zero or below",
      column: total.name,
      applies: (row) => sum[row] !== 0 && !positive(row),
    },
    {
      reason: "shares do not sum to one",
      fault: `goods do not sum to ${total.name}`,
      column: "",
      applies: (row) => !(Math.abs(sum[row] / spent[row] - 1) <= SHARES_TOLERANCE),
    },
  ];
}
