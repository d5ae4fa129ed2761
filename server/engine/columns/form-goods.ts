import type { GoodPart, MappedGood, NumberColumn } from "./resolve-roles.ts";

/** A good's price and expenditure in every row of the upload. */
export interface FormedGood {
  readonly name: string;
  /** NaN where there is none. Rows with a negative purchase have 1: they fall for that reason, not for their price. */
  readonly price: Float64Array;
  readonly expenditure: Float64Array;
  /** The columns named, by part. */
  readonly given: Partial<Record<GoodPart, NumberColumn>>;
}

const finite = (value: number) => (Number.isFinite(value) ? value + 0 : Number.NaN);

/** The third of price, quantity and expenditure follows from the two a good names. */
export function formGood({ name, price, quantity, expenditure }: MappedGood, rows: number): FormedGood {
  const given = { ...(price && { price }), ...(quantity && { quantity }), ...(expenditure && { expenditure }) };
  if (price && expenditure) return { name, price: price.values, expenditure: expenditure.values, given };
  if (price && quantity) {
    const spent = new Float64Array(rows);
    for (let row = 0; row < rows; row++) spent[row] = finite(price.values[row] * quantity.values[row]);
    return { name, price: price.values, expenditure: spent, given };
  }
  if (!quantity || !expenditure) throw new Error(`${name} has fewer than two of price, quantity and expenditure`);
  const unitValue = new Float64Array(rows);
  for (let row = 0; row < rows; row++) {
    const bought = quantity.values[row];
    const spent = expenditure.values[row];
    // Nothing bought leaves no price to be seen: it is missing, whatever the row says was spent.
    unitValue[row] = bought < 0 || spent < 0 ? 1 : bought > 0 ? finite(spent / bought) : Number.NaN;
  }
  return { name, price: unitValue, expenditure: expenditure.values, given };
}

/** Total expenditure as the sum over goods. */
export function sumOfGoods(goods: readonly FormedGood[], rows: number): Float64Array {
  const sum = new Float64Array(rows);
  for (const { expenditure } of goods) for (let row = 0; row < rows; row++) sum[row] += expenditure[row];
  return sum;
}
