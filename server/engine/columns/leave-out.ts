import { LEFT_OUT_REASONS, type RowAccounting } from "../../../shared/schemas/data.ts";
import { counted, listWords } from "../../../shared/study/words.ts";
import type { DerivedColumns } from "./derive-columns.ts";
import type { EvaluatedExpression } from "./expressions.ts";
import { type FormedGood, sumOfGoods } from "./form-goods.ts";
import type { TableColumn } from "./prepared-data.ts";
import type { Roles } from "./resolve-roles.ts";

type Reason = (typeof LEFT_OUT_REASONS)[number];

/** Shares that miss one by more than this leave their row out (methods section 1). */
export const SHARES_TOLERANCE = 1e-6;
const MOST_ROWS_NAMED = 200;
const SLICES = 100;

/** One ground on which rows are left out: the column it looks at, as a label names it. */
interface Ground {
  readonly reason: Reason;
  /** What is wrong, before the column's name: "a price missing". */
  readonly fault: string;
  readonly column: string;
  readonly applies: (row: number) => boolean;
  /** Said after the label where rows fall by this ground. */
  readonly because?: string;
}

export interface LeftOut {
  /** 0 for a row used, else one more than the place of its reason in `LEFT_OUT_REASONS`. */
  readonly reasonOf: Uint8Array;
  readonly accounting: RowAccounting;
}

/** Count every row under the first reason that applies, in the order of `LEFT_OUT_REASONS`. */
export function leaveOut(
  rows: number,
  goods: readonly FormedGood[],
  roles: Roles,
  { derived, keep, columns }: DerivedColumns,
): LeftOut {
  const grounds = [
    ...(keep ? keepGrounds(keep.values) : []),
    ...missingGrounds(goods, roles, { derived, keep, columns }),
    ...purchaseGrounds(goods, roles, rows),
  ];
  const reasonOf = new Uint8Array(rows);
  const leftOut: RowAccounting["leftOut"] = [];
  LEFT_OUT_REASONS.forEach((reason, place) => {
    const own = grounds.filter((ground) => ground.reason === reason);
    const concerned = new Set<Ground>();
    for (const ground of own) {
      for (let row = 0; row < rows; row++) {
        if ((reasonOf[row] !== 0 && reasonOf[row] !== place + 1) || !ground.applies(row)) continue;
        reasonOf[row] = place + 1;
        concerned.add(ground);
      }
    }
    if (concerned.size === 0) return;
    const label = keep && reason === "keep" ? `Left out by keep: ${keep.source}` : labelOf(reason, [...concerned]);
    leftOut.push({ reason, label, ...whereIn(reasonOf, place + 1) });
  });
  const used = rows - leftOut.reduce((sum, { count }) => sum + count, 0);
  return { reasonOf, accounting: { uploaded: rows, leftOut, used } };
}

function whereIn(reasonOf: Uint8Array, code: number) {
  const rows: number[] = [];
  const strip: number[] = new Array(SLICES).fill(0);
  let count = 0;
  for (let row = 0; row < reasonOf.length; row++) {
    if (reasonOf[row] !== code) continue;
    count++;
    if (rows.length < MOST_ROWS_NAMED) rows.push(row + 1);
    strip[Math.floor((row * SLICES) / reasonOf.length)]++;
  }
  return { count, rows, strip };
}

/** What the grounds have in common, and the columns while they are few enough to name. */
function labelOf(reason: Reason, grounds: readonly Ground[]): string {
  const faults = new Set(grounds.map(({ fault }) => fault));
  const general: Record<Reason, string> = {
    keep: "by keep",
    "missing value": "a value missing",
    "weight not positive": "a weight of zero or below",
    "price not positive": "a price of zero or below",
    "negative purchase": "a negative purchase",
    "total not positive": "bought nothing",
    "shares do not sum to one": "goods do not sum to the total",
  };
  const fault = faults.size === 1 ? [...faults][0] : general[reason];
  const columns = [...new Set(grounds.map(({ column }) => column))].filter((column) => column !== "");
  const where = columns.length > 0 && columns.length <= 3 ? ` in ${listWords(columns)}` : "";
  const because = grounds.flatMap((ground) => (ground.because ? [ground.because] : []));
  return `Left out: ${fault}${where}${because.length > 0 ? ` (${because.join("; ")})` : ""}`;
}

function keepGrounds(values: Float64Array): Ground[] {
  return [{ reason: "keep", fault: "by keep", column: "", applies: (row) => values[row] === 0 }];
}

function missingGrounds(
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
    if (!given.price) add("a price", `${name}, expenditure ÷ quantity`, price);
    if (!given.expenditure) add("an expenditure", `${name}, price × quantity`, expenditure);
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

function purchaseGrounds(goods: readonly FormedGood[], { total, weight }: Roles, rows: number): Ground[] {
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
