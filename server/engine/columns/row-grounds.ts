import type { LEFT_OUT_REASONS } from "../../../shared/schemas/data.ts";
import { counted } from "../../../shared/study/words.ts";
import type { DerivedColumns } from "./derive-columns.ts";
import type { EvaluatedExpression } from "./expressions.ts";
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

export function missingGrounds(
  goods: readonly FormedGood[],
  roles: Roles,
  { derived, keep, columns }: DerivedColumns,
): Ground[] {
  const grounds = new Map<string, Ground>();
  const add = (what: string, column: string, values: Float64Array) => {
    const because = whyUndefined(column, derived.get(column));
    const applies = (row: number) => Number.isNaN(values[row]);
    if (!grounds.has(column)) {
      grounds.set(column, {
        reason: "missing value",
        fault: `${what} missing`,
        column,
        applies,
        ...(because && { because }),
      });
    }
  };
  for (const { name, price, expenditure, given } of goods) {
    if (given.price) add("a price", given.price.name, price);
    if (given.quantity) add("a quantity", given.quantity.name, given.quantity.values);
    if (given.expenditure) add("an expenditure", given.expenditure.name, expenditure);
    const { quantity } = given;
    if (!given.price) addFormed("a price", `${name}, expenditure ÷ quantity`, price, given.expenditure, quantity);
    if (!given.expenditure)
      addFormed("an expenditure", `${name}, price × quantity`, expenditure, given.price, quantity);
  }
  if (roles.total) add("a total", roles.total.name, roles.total.values);
  if (roles.weight) add("a weight", roles.weight.name, roles.weight.values);
  if (roles.cluster) addAny(roles.cluster, "a cluster");
  if (roles.time) add("a time", roles.time.name, roles.time.values);
  for (const [name, { values }] of derived) add("a value", name, values);
  for (const read of keep?.reads ?? []) {
    const column = columns.get(read);
    // Only rows that keep cannot decide: what is missing may not matter to its answer.
    if (column && keep) addUndecided(column, keep.values);
  }
  if (keep && keep.undefinedRows > 0) add("an answer of keep", "", keep.values);
  return [...grounds.values()];

  /** A part that follows from two others is missing by itself only where both of them are there. */
  function addFormed(
    what: string,
    column: string,
    values: Float64Array,
    one?: NumberColumn,
    other?: NumberColumn,
  ): void {
    const isThere = (source: NumberColumn | undefined, row: number) => !Number.isNaN(source?.values[row]);
    const applies = (row: number) => Number.isNaN(values[row]) && isThere(one, row) && isThere(other, row);
    grounds.set(column, { reason: "missing value", fault: `${what} missing`, column, applies });
  }
  function addAny(column: TableColumn, what: string): void {
    if (column.type === "number") add(what, column.name, column.values);
    else
      grounds.set(
        column.name,
        missingText(column, what, (row) => column.codes[row] < 0),
      );
  }
  function addUndecided(column: TableColumn, answers: Float64Array): void {
    const isMissing = (row: number) =>
      column.type === "number" ? Number.isNaN(column.values[row]) : column.codes[row] < 0;
    if (grounds.has(column.name)) return;
    grounds.set(
      column.name,
      missingText(column, "a value", (row) => Number.isNaN(answers[row]) && isMissing(row)),
    );
  }
  function missingText(column: TableColumn, what: string, applies: (row: number) => boolean): Ground {
    return { reason: "missing value", fault: `${what} missing`, column: column.name, applies };
  }
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
