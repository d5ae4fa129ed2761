import type { Columns } from "./expressions.ts";
import { pickRows } from "./pick-rows.ts";
import type { IncompleteColumn } from "./prepared-data.ts";
import type { Roles } from "./resolve-roles.ts";

/**
 * The columns of numbers a system may use as demographics: all that are neither price, quantity, expenditure,
 * total nor weight, and have a number in every row used. Those that lack some are told apart with how many.
 */
export function numericColumns(
  columns: Columns,
  { goods, total, weight }: Roles,
  rowIndices: Int32Array,
): { numeric: Map<string, Float64Array>; incomplete: Map<string, IncompleteColumn> } {
  const taken = new Set<string>();
  for (const { price, quantity, expenditure } of goods) {
    for (const column of [price, quantity, expenditure]) if (column) taken.add(column.name);
  }
  for (const column of [total, weight]) if (column) taken.add(column.name);
  const numeric = new Map<string, Float64Array>();
  const incomplete = new Map<string, IncompleteColumn>();
  for (const [name, column] of columns) {
    if (column.type !== "number" || taken.has(name)) continue;
    const values = pickRows(column.values, rowIndices);
    let missing = 0;
    for (const value of values) if (Number.isNaN(value)) missing++;
    if (missing === 0) numeric.set(name, values);
    else incomplete.set(name, { missing, firstRow: rowIndices[values.findIndex(Number.isNaN)] + 1 });
  }
  return { numeric, incomplete };
}
